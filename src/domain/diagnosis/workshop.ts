import type { Network, Probe } from '@/domain/network/types';
import type { Incident } from '@/domain/parts/kinds';
import type { Evidence } from './evidence';
import { evidenceOf } from './evidence';
import type { Given } from './given';
import { networkGiven, priorsGiven } from './given';
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
  /** The fault that this network has built in, if any. */
  readonly given: Given | undefined;
}

/** What the workshop is opened with. */
export interface Case {
  readonly network: Network;
  readonly probes: readonly Probe[];
  readonly observations: readonly Observation[];
  readonly incident: Incident;
  readonly seen: readonly SeenFault[];
}

/**
 * Solves the network where the readings were taken and sets the priors; with a given fault built in, for
 * what may have failed beside it.
 * @throws RangeError when a probe names a net that is not in the network.
 */
export function openWorkshop(one: Case, given?: Given): Workshop {
  const modes = partModes(one.network);
  const network = given === undefined ? one.network : networkGiven(one.network, modes, given);
  const scene = sceneOf(network, modes, one.probes);
  const evidence = evidenceOf(scene, one.observations);
  const plain = priorsOf(one.network, modes, one.incident, one.seen);
  const priors = given === undefined ? plain : priorsGiven(plain, modes, given);
  return { scene, evidence, priors, trial: newTrial(scene), joint: newJoint(scene), given };
}
