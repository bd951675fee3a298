import type { Network, Probe } from '@/domain/network/types';
import type { Incident } from '@/domain/parts/kinds';
import type { Evidence } from './evidence';
import { evidenceOf } from './evidence';
import type { Joint } from './joint';
import { newJoint } from './joint';
import type { Observation } from './meter';
import { partModes } from './modes';
import type { Priors } from './priors';
import { priorsOf } from './priors';
import type { Scene } from './scene';
import { sceneOf } from './scene';
import type { Trial } from './trial';
import { newTrial } from './trial';
import type { SeenFault } from './types';

/** Everything that weighing hypotheses needs, set up once for one set of readings. */
export interface Workshop {
  readonly scene: Scene;
  readonly evidence: Evidence;
  readonly priors: Priors;
  readonly trial: Trial;
  readonly joint: Joint;
}

/**
 * Solves the network where the readings were taken and sets the priors.
 * @throws RangeError when a probe names a net that is not in the network.
 */
export function openWorkshop(
  network: Network,
  probes: readonly Probe[],
  observations: readonly Observation[],
  incident: Incident,
  seen?: readonly SeenFault[],
): Workshop {
  const modes = partModes(network);
  const scene = sceneOf(network, modes, probes);
  const evidence = evidenceOf(scene, observations);
  const priors = priorsOf(network, modes, incident, seen);
  return { scene, evidence, priors, trial: newTrial(scene), joint: newJoint(scene) };
}
