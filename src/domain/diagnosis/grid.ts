import type { Evidence } from './evidence';
import type { Scene } from './scene';
import type { Trial } from './trial';
import { setTrial, trialOhms } from './trial';

/** How finely modes are cut: the step of ln R shown that one node may span, and the most nodes. */
export interface Fineness {
  readonly step: number;
  readonly most: number;
}

/** For screening pairs, for pairs of two widely seen modes, and for the final weight of all others. */
export const COARSE: Fineness = { step: 0.8, most: 8 };
export const MEDIUM: Fineness = { step: 0.55, most: 10 };
export const FINE: Fineness = { step: 0.4, most: 16 };

/** Width of a node's log-normal as a fraction of the step between nodes: smooth, and hardly blurred. */
const KERNEL = 0.45;
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
  const { corners } = trial;
  corner(scene, evidence, trial, j, k, 0, 0);
  corner(scene, evidence, trial, j, k, 1, 1);
  const width = widest(evidence, corners, 0, 3);
  if (k < 0) return [cut(scene, j, width, fineness), NONE];
  // Between its ends a reading only rises: where both together move it little, so does each.
  if (width <= fineness.step)
    return [cut(scene, j, width, fineness), cut(scene, k, width, fineness)];
  corner(scene, evidence, trial, j, k, 1, 0);
  corner(scene, evidence, trial, j, k, 0, 1);
  const widthJ = Math.max(widest(evidence, corners, 0, 1), widest(evidence, corners, 2, 3));
  const widthK = Math.max(widest(evidence, corners, 0, 2), widest(evidence, corners, 1, 3));
  return [cut(scene, j, widthJ, fineness), cut(scene, k, widthK, fineness)];
}

/** Writes what every reading shows with both modes at these ends (0 low, 1 high) to the trial's corners. */
function corner(
  scene: Scene,
  evidence: Evidence,
  trial: Trial,
  j: number,
  k: number,
  endJ: number,
  endK: number,
): void {
  const lnJ = endJ === 0 ? scene.modes[j]!.low : scene.modes[j]!.high;
  const lnK = k < 0 ? 0 : endK === 0 ? scene.modes[k]!.low : scene.modes[k]!.high;
  setTrial(scene, trial, j, lnJ, k, lnK);
  const { corners } = trial;
  const at = (endJ + 2 * endK) * evidence.count;
  for (let r = 0; r < evidence.count; r++) {
    const shown = Math.log(trialOhms(evidence, trial, r) + evidence.floor[r]!);
    const top = evidence.y[r]! + 1;
    corners[at + r] = evidence.over[r] === 1 && shown > top ? top : shown;
  }
}

function widest(evidence: Evidence, corners: Float64Array, from: number, to: number): number {
  const { count, deviation } = evidence;
  let width = 0;
  for (let r = 0; r < count; r++) {
    const step = Math.abs(corners[from * count + r]! - corners[to * count + r]!);
    // Not a number where both are infinite: nothing moves there.
    if (step > width && step > UNSEEN * deviation[r]!) width = step;
  }
  return width;
}

/** True when the single mode cut last shows what the healthy network shows, over all its range. */
export function looksHealthy(evidence: Evidence, { corners }: Trial): boolean {
  const { count, healthy, deviation, over, y } = evidence;
  for (let r = 0; r < count; r++) {
    const top = over[r] === 1 ? y[r]! + 1 : Infinity;
    const base = Math.min(healthy[r]!, top);
    const noticed = UNSEEN * deviation[r]!;
    for (const at of [r, 3 * count + r])
      if (corners[at] !== base && !(Math.abs(corners[at]! - base) <= noticed)) return false;
  }
  return true;
}

function cut(scene: Scene, mode: number, width: number, fineness: Fineness): Nodes {
  const { low, high, mode: name } = scene.modes[mode]!;
  if (width === 0) return { at: [name === 'open' ? GONE : (low + high) / 2], spread: 0 };
  const count = Math.min(fineness.most, Math.max(1, Math.ceil(width / fineness.step)));
  const step = (high - low) / count;
  const at = Array.from({ length: count }, (_, i) => low + (i + 0.5) * step);
  return { at, spread: step * KERNEL };
}
