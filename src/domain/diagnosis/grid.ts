import type { Evidence } from './screen';
import type { Scene } from './scene';
import type { Trial } from './trial';
import { setTrial, trialOhms } from './trial';

/** How finely modes are cut: the step of ln R shown that one node may span, and the most nodes. */
export interface Fineness {
  readonly step: number;
  readonly most: number;
}

/** For screening pairs, and for the final weight. */
export const COARSE: Fineness = { step: 0.8, most: 8 };
export const FINE: Fineness = { step: 0.4, most: 16 };

/** Width of a node's log-normal as a fraction of the step between nodes: smooth, and hardly blurred. */
const KERNEL = 0.4;
/** A shift of the reading below this many of the meter's standard deviations moves nothing. */
const UNSEEN = 0.1;
/** At one node an open part is taken as good as gone, ln Ω. */
const GONE = Math.log(1e10);

/** The nodes of one mode in one hypothesis: equal weights, ln Ω, and their common spread. */
export interface Nodes {
  readonly at: readonly number[];
  readonly spread: number;
}

const NONE: Nodes = { at: [0], spread: 0 };

/** The nodes of up to two modes, chosen by how far the readings can move over their ranges. */
export function nodesFor(
  scene: Scene,
  evidence: Evidence,
  trial: Trial,
  j: number,
  k: number,
  fineness: Fineness,
): [Nodes, Nodes] {
  const [low, high] = [0, 1].map((end) => corner(scene, evidence, trial, j, k, end, end));
  if (k < 0) return [cut(scene, j, widest(evidence, low!, high!), fineness), NONE];
  const [right, left] = [
    corner(scene, evidence, trial, j, k, 1, 0),
    corner(scene, evidence, trial, j, k, 0, 1),
  ];
  const widthJ = Math.max(widest(evidence, low!, right), widest(evidence, left, high!));
  const widthK = Math.max(widest(evidence, low!, left), widest(evidence, right, high!));
  return [cut(scene, j, widthJ, fineness), cut(scene, k, widthK, fineness)];
}

function corner(
  scene: Scene,
  evidence: Evidence,
  trial: Trial,
  j: number,
  k: number,
  endJ: number,
  endK: number,
): Float64Array {
  const end = (mode: number, which: number): number =>
    mode < 0 ? 0 : which === 0 ? scene.modes[mode]!.low : scene.modes[mode]!.high;
  setTrial(scene, trial, j, end(j, endJ), k, end(k, endK));
  return Float64Array.from(evidence.observations, (seen, r) => {
    const shown = Math.log(trialOhms(scene, trial, r) + seen.floor);
    return seen.over ? Math.min(shown, seen.y + 1) : shown;
  });
}

function widest(evidence: Evidence, from: Float64Array, to: Float64Array): number {
  let width = 0;
  evidence.observations.forEach((seen, r) => {
    const step = from[r] === to[r] ? 0 : Math.abs(to[r]! - from[r]!);
    if (step > UNSEEN * Math.sqrt(seen.variance)) width = Math.max(width, step);
  });
  return width;
}

function cut(scene: Scene, mode: number, width: number, fineness: Fineness): Nodes {
  const { low, high, mode: name } = scene.modes[mode]!;
  if (width === 0) return { at: [name === 'open' ? GONE : (low + high) / 2], spread: 0 };
  const count = Math.min(fineness.most, Math.max(1, Math.ceil(width / fineness.step)));
  const step = (high - low) / count;
  const at = Array.from({ length: count }, (_, i) => low + (i + 0.5) * step);
  return { at, spread: step * KERNEL };
}
