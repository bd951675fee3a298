import { MISPROBE } from './assumptions';
import type { Evidence } from './evidence';
import { LOG_ROOT_TAU, normalCdf } from './normal';
import { boundAt } from './tolerance-bound';
import type { Trial } from './trial';
import { LEAST_PREDICTED } from './trial';

const LOG_SOUND = Math.log(1 - MISPROBE);

/**
 * ln likelihood of the readings in a trial, its two faults spread log-normally by these standard deviations
 * of ln Ω. Readings err independently here, tolerances included; what the spread faults have in common is
 * kept by passing their estimate from reading to reading (Kalman 1960, two states). A reading better
 * explained by a misprobe is set aside at the misprobe's own weight. Leaves the estimated shift of both faults'
 * ln Ω in the trial.
 *
 * @param doubt filled with the chance that each reading is a misprobe, where given.
 */
export function screen(
  evidence: Evidence,
  trial: Trial,
  spreadJ: number,
  spreadK: number,
  doubt?: Float64Array,
): number {
  let meanJ = 0;
  let meanK = 0;
  let pjj = spreadJ * spreadJ;
  let pkk = spreadK * spreadK;
  let pjk = 0;
  let total = 0;
  const { order, toPart } = evidence;
  const row = trial.row;
  for (let i = 0; i < order.length; i++) {
    const r = order[i]!;
    const s = evidence.setting[r]!;
    const base = evidence.ohms[r]!;
    const over = evidence.over[r]!;
    const misprobe = evidence.misprobe[r]!;
    if (base === Infinity) {
      total += over === 1 ? LOG_SOUND : evidence.logMisprobe[r]!;
      if (doubt !== undefined) doubt[r] = over === 1 ? 0 : 1;
      continue;
    }
    const zj = toPart[r * row + trial.j]!;
    const zk = toPart[r * row + trial.k]!;
    const k12 = trial.k12[s]!;
    const drop = trial.k11[s]! * zj * zj + 2 * k12 * zj * zk + trial.k22[s]! * zk * zk;
    const ohms = Math.max(base - drop, LEAST_PREDICTED);
    const part = ohms + evidence.floor[r]!;
    const f = Math.log(part);
    const newZj = trial.jj[s]! * zj + trial.jk[s]! * zk;
    const newZk = trial.kj[s]! * zj + trial.kk[s]! * zk;
    const sj = (trial.siemensJ[s]! * newZj * newZj) / part;
    const sk = (trial.siemensK[s]! * newZk * newZk) / part;
    const byJ = pjj * sj + pjk * sk;
    const byK = pjk * sj + pkk * sk;
    const scale = ohms / part;
    const tolerance = boundAt(evidence.bounds, r, f) * scale * scale;
    const variance = evidence.variance[r]! + tolerance + sj * byJ + sk * byK;
    const error = evidence.y[r]! - f - sj * meanJ - sk * meanK;
    if (over === 1) {
      const past = normalCdf(-error / Math.sqrt(variance));
      total += Math.log((1 - MISPROBE) * past + misprobe);
      if (doubt !== undefined) doubt[r] = misprobe / ((1 - MISPROBE) * past + misprobe);
      continue;
    }
    const square = (error * error) / variance;
    const density =
      square > 80
        ? 0
        : ((1 - MISPROBE) * Math.exp(-0.5 * square - LOG_ROOT_TAU)) / Math.sqrt(variance);
    total += Math.log(density + misprobe);
    if (doubt !== undefined) doubt[r] = misprobe / (density + misprobe);
    if (density < misprobe) continue;
    meanJ += (byJ * error) / variance;
    meanK += (byK * error) / variance;
    pjj -= (byJ * byJ) / variance;
    pkk -= (byK * byK) / variance;
    pjk -= (byJ * byK) / variance;
  }
  trial.shiftJ = meanJ;
  trial.shiftK = meanK;
  return total;
}
