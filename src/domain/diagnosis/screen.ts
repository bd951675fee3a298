import { MISPROBE } from './assumptions';
import type { Observation } from './meter';
import { LOG_ROOT_TAU, normalCdf } from './normal';
import type { Scene } from './scene';
import { boundAt } from './tolerance-bound';
import type { Trial } from './trial';
import { LEAST_PREDICTED } from './trial';

const LOG_SOUND = Math.log(1 - MISPROBE);

/** What the screening needs beside the scene: the readings taken, in the order of the scene's aims. */
export interface Evidence {
  readonly observations: readonly Observation[];
  /** Order in which readings are weighed: values first, the sharpest first, OL last. */
  readonly order: Int32Array;
  readonly bounds: Float64Array;
}

export function orderOf(observations: readonly Observation[]): Int32Array {
  const rank = (o: Observation): number => (o.over ? 1e6 : o.variance);
  return Int32Array.from(
    [...observations.keys()].sort((a, b) => rank(observations[a]!) - rank(observations[b]!)),
  );
}

/**
 * ln likelihood of the readings in a trial, its two faults spread log-normally by these standard deviations
 * of ln Ω. Readings err independently here, tolerances included; what the spread faults have in common is
 * kept by passing their estimate from reading to reading (Kalman 1960, two states). A reading better
 * explained by a misprobe is set aside at the misprobe's own weight.
 */
export function screen(
  scene: Scene,
  evidence: Evidence,
  trial: Trial,
  spreadJ: number,
  spreadK: number,
): number {
  let meanJ = 0;
  let meanK = 0;
  let pjj = spreadJ * spreadJ;
  let pkk = spreadK * spreadK;
  let pjk = 0;
  let total = 0;
  for (const r of evidence.order) {
    const seen = evidence.observations[r]!;
    const aim = scene.aims[r]!;
    const s = aim.setting;
    if (aim.ohms === Infinity) {
      total += seen.over ? LOG_SOUND : Math.log(seen.misprobe);
      continue;
    }
    const zj = aim.toPart[trial.j]!;
    const zk = aim.toPart[trial.k]!;
    const k12 = trial.k12[s]!;
    const drop = trial.k11[s]! * zj * zj + 2 * k12 * zj * zk + trial.k22[s]! * zk * zk;
    const ohms = Math.max(aim.ohms - drop, LEAST_PREDICTED);
    const part = ohms + seen.floor;
    const f = Math.log(part);
    const newZj = trial.jj[s]! * zj + trial.jk[s]! * zk;
    const newZk = trial.kj[s]! * zj + trial.kk[s]! * zk;
    const sj = (trial.siemensJ[s]! * newZj * newZj) / part;
    const sk = (trial.siemensK[s]! * newZk * newZk) / part;
    const byJ = pjj * sj + pjk * sk;
    const byK = pjk * sj + pkk * sk;
    const scale = ohms / part;
    const tolerance = boundAt(evidence.bounds, r, f) * scale * scale;
    const variance = seen.variance + tolerance + sj * byJ + sk * byK;
    const error = seen.y - f - sj * meanJ - sk * meanK;
    if (seen.over) {
      const past = normalCdf(-error / Math.sqrt(variance));
      total += Math.log((1 - MISPROBE) * past + seen.misprobe);
      continue;
    }
    const square = (error * error) / variance;
    const density =
      square > 80
        ? 0
        : ((1 - MISPROBE) * Math.exp(-0.5 * square - LOG_ROOT_TAU)) / Math.sqrt(variance);
    total += Math.log(density + seen.misprobe);
    if (density < seen.misprobe) continue;
    meanJ += (byJ * error) / variance;
    meanK += (byK * error) / variance;
    pjj -= (byJ * byJ) / variance;
    pkk -= (byK * byK) / variance;
    pjk -= (byJ * byK) / variance;
  }
  return total;
}
