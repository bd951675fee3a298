import type { Fineness, Nodes } from './grid';
import { MEDIUM, nodesFor } from './grid';
import type { Joint } from './joint';
import { jointLikelihood, predictJoint } from './joint';
import type { Evidence } from './evidence';
import { screen } from './screen';
import type { Scene } from './scene';
import type { Trial } from './trial';
import { setTrial } from './trial';

/** ln of the mean of exp(values), without overflow. */
function logMean(values: readonly number[]): number {
  const top = Math.max(...values);
  let sum = 0;
  for (const value of values) sum += Math.exp(value - top);
  return top + Math.log(sum / values.length);
}

function overNodes(
  scene: Scene,
  trial: Trial,
  j: number,
  k: number,
  [a, b]: [Nodes, Nodes],
  weigh: (lnJ: number, lnK: number) => number,
): number {
  const found: number[] = [];
  for (const lnJ of a.at)
    for (const lnK of b.at) {
      setTrial(scene, trial, j, lnJ, k, lnK);
      found.push(weigh(lnJ, lnK));
    }
  return logMean(found);
}

/** ln likelihood of one or two faults (k −1: none), readings taken as independent. */
export function screened(
  scene: Scene,
  evidence: Evidence,
  trial: Trial,
  j: number,
  k: number,
  fineness: Fineness,
): number {
  const nodes = nodesFor(scene, evidence, trial, j, k, fineness);
  return overNodes(scene, trial, j, k, nodes, () =>
    screen(evidence, trial, nodes[0].spread, nodes[1].spread),
  );
}

/** A pair that would take more nodes is cut less finely: a single fault is never. */
const MOST_NODES = 40;

/** What the full covariance says of a hypothesis. */
export interface Weighed {
  readonly logLikelihood: number;
  /** The resistances that fit best, ln Ω. */
  readonly lnJ: number;
  readonly lnK: number;
}

/** ln likelihood of up to two faults (−1: none) with the tolerances' full covariance. */
export function weighed(
  scene: Scene,
  evidence: Evidence,
  trial: Trial,
  joint: Joint,
  j: number,
  k: number,
  fineness: Fineness,
): Weighed {
  const none: Nodes = { at: [0], spread: 0 };
  let nodes: [Nodes, Nodes] =
    j < 0 ? [none, none] : nodesFor(scene, evidence, trial, j, k, fineness);
  if (nodes[0].at.length * nodes[1].at.length > MOST_NODES)
    nodes = nodesFor(scene, evidence, trial, j, k, MEDIUM);
  let best = { value: -Infinity, lnJ: 0, lnK: 0 };
  const logLikelihood = overNodes(scene, trial, j, k, nodes, (lnJ, lnK) => {
    predictJoint(scene, evidence, trial, nodes[0].spread, nodes[1].spread, joint);
    const value = jointLikelihood(evidence, joint);
    if (value > best.value) best = { value, lnJ, lnK };
    return value;
  });
  return { logLikelihood, lnJ: best.lnJ, lnK: best.lnK };
}
