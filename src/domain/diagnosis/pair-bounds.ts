import { LOG_ROOT_TAU } from './normal';
import type { Evidence } from './evidence';
import type { Scene } from './scene';
import { boundAt } from './tolerance-bound';

/**
 * A generous bound on the ln likelihood of every pair of two modes. By Rayleigh's monotonicity law all that
 * two faults can make a reading show lies between what it shows with both at the low ends of their ranges
 * and with both at the high ends: a value outside counts by its distance, one inside as if met exactly.
 */
export interface PairBounds {
  /** ln likelihood bound of modes j and k, giving up once it falls below `least`. */
  bound(j: number, k: number, least: number): number;
}

export function pairBounds(scene: Scene, evidence: Evidence): PairBounds {
  const settings = scene.settings.length;
  const modes = scene.modes.length;
  const row = scene.parts + 1;
  // Change of conductance δ and 1 + δ·R at both ends of every mode, per setting.
  const delta = new Float64Array(modes * settings * 2);
  const factor = new Float64Array(modes * settings * 2);
  scene.modes.forEach((mode, m) => {
    scene.settings.forEach((setting, s) => {
      for (let end = 0; end < 2; end++) {
        const at = (m * settings + s) * 2 + end;
        const siemens =
          setting.acts[m] === 1
            ? Math.exp(-(end === 0 ? mode.low : mode.high))
            : setting.siemens[mode.part]!;
        delta[at] = siemens - setting.siemens[mode.part]!;
        factor[at] = setting.away[mode.part]! + setting.ohms[mode.part]! * siemens;
      }
    });
  });
  const k11 = new Float64Array(settings * 2);
  const k12 = new Float64Array(settings * 2);
  const k22 = new Float64Array(settings * 2);
  const { toPart, ohms } = evidence;
  const value = evidence.y.map((y, r) => Math.exp(y) - evidence.floor[r]!);
  const inside = evidence.variance.map((variance, r) =>
    evidence.over[r] === 1 ? 0 : -0.5 * Math.log(variance) - LOG_ROOT_TAU,
  );
  const order = byMisfit(evidence);
  const most = inside.reduce((sum, one) => sum + one, 0);

  const bound = (j: number, k: number, least: number): number => {
    const partJ = scene.modes[j]!.part;
    const partK = scene.modes[k]!.part;
    for (let s = 0; s < settings; s++) {
      const z = scene.settings[s]!.between[partJ * row + partK]!;
      for (let end = 0; end < 2; end++) {
        const at = (j * settings + s) * 2 + end;
        const kt = (k * settings + s) * 2 + end;
        const dj = delta[at]!;
        const dk = delta[kt]!;
        const fj = factor[at]!;
        const fk = factor[kt]!;
        const inverse = 1 / Math.max(fj * fk - dj * dk * z * z, 1e-14 * fj * fk);
        const out = s * 2 + end;
        k11[out] = dj * fk * inverse;
        k12[out] = -2 * dj * dk * z * inverse;
        k22[out] = dk * fj * inverse;
      }
    }
    let total = most;
    for (let i = 0; i < order.length; i++) {
      const r = order[i]!;
      const at = evidence.setting[r]! * 2;
      const zj = toPart[r * row + partJ]!;
      const zk = toPart[r * row + partK]!;
      const [jj, jk, kk] = [zj * zj, zj * zk, zk * zk];
      const high = ohms[r]! - (k11[at + 1]! * jj + k12[at + 1]! * jk + k22[at + 1]! * kk);
      let near = high;
      if (high >= value[r]!) {
        if (evidence.over[r] === 1) continue;
        near = ohms[r]! - (k11[at]! * jj + k12[at]! * jk + k22[at]! * kk);
        if (near <= value[r]!) continue;
      }
      total += outside(evidence, r, near > 1e-6 ? near : 1e-6) - inside[r]!;
      if (total < least) return total;
    }
    return total;
  };
  return { bound };
}

function outside(evidence: Evidence, r: number, near: number): number {
  const worst = evidence.logMisprobe[r]!;
  if (near === Infinity) return worst;
  const shown = Math.log(near + evidence.floor[r]!);
  const variance = evidence.variance[r]! + boundAt(evidence.bounds, r, shown);
  const misfit = (-0.5 * (evidence.y[r]! - shown) ** 2) / variance;
  if (misfit < worst - 20) return worst;
  const density =
    evidence.over[r] === 1 ? misfit : misfit - 0.5 * Math.log(variance) - LOG_ROOT_TAU;
  return Math.max(density, worst);
}

/** Readings that the healthy network explains worst come first: they rule most pairs out at once. */
function byMisfit({ count, over, y, healthy }: Evidence): Int32Array {
  const misfit = (r: number): number => {
    if (over[r] === 1) return Math.max(0, y[r]! - healthy[r]!);
    return healthy[r] === Infinity ? 1e9 : Math.abs(y[r]! - healthy[r]!);
  };
  return Int32Array.from([...Array(count).keys()].sort((a, b) => misfit(b) - misfit(a)));
}
