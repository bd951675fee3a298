import { LOG_ROOT_TAU } from './normal';
import type { Evidence } from './screen';
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
  const readings = readingTable(evidence);
  const order = byMisfit(scene, evidence);
  let most = 0;
  for (const r of order) most += readings.inside[r]!;

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
    for (const r of order) {
      const aim = scene.aims[r]!;
      const at = aim.setting * 2;
      const zj = aim.toPart[partJ]!;
      const zk = aim.toPart[partK]!;
      const [jj, jk, kk] = [zj * zj, zj * zk, zk * zk];
      const low = aim.ohms - (k11[at]! * jj + k12[at]! * jk + k22[at]! * kk);
      const high = aim.ohms - (k11[at + 1]! * jj + k12[at + 1]! * jk + k22[at + 1]! * kk);
      let near = 0;
      if (high < readings.value[r]!) near = high;
      else if (!readings.over[r] && low > readings.value[r]!) near = low;
      else continue;
      total -= readings.inside[r]!;
      total += outside(evidence, readings, r, Math.max(near, 1e-6));
      if (total < least) return total;
    }
    return total;
  };
  return { bound };
}

interface ReadingTable {
  readonly value: Float64Array;
  readonly over: Uint8Array;
  readonly inside: Float64Array;
  readonly least: Float64Array;
}

function readingTable({ observations }: Evidence): ReadingTable {
  return {
    value: Float64Array.from(observations, (o) => Math.exp(o.y) - o.floor),
    over: Uint8Array.from(observations, (o) => (o.over ? 1 : 0)),
    inside: Float64Array.from(observations, (o) =>
      o.over ? 0 : -0.5 * Math.log(o.variance) - LOG_ROOT_TAU,
    ),
    least: Float64Array.from(observations, (o) => Math.log(o.misprobe)),
  };
}

function outside(evidence: Evidence, readings: ReadingTable, r: number, near: number): number {
  const seen = evidence.observations[r]!;
  if (near === Infinity) return readings.least[r]!;
  const shown = Math.log(near + seen.floor);
  const variance = seen.variance + boundAt(evidence.bounds, r, shown);
  const misfit = (-0.5 * (seen.y - shown) ** 2) / variance;
  const density = seen.over ? misfit : misfit - 0.5 * Math.log(variance) - LOG_ROOT_TAU;
  return Math.max(density, readings.least[r]!);
}

/** Readings that the healthy network explains worst come first: they rule most pairs out at once. */
function byMisfit(scene: Scene, { observations }: Evidence): Int32Array {
  const misfit = observations.map((seen, r) => {
    const shown = Math.log(scene.aims[r]!.ohms + seen.floor);
    if (seen.over) return Math.max(0, seen.y - shown);
    return shown === Infinity ? 1e9 : Math.abs(seen.y - shown);
  });
  return Int32Array.from([...misfit.keys()].sort((a, b) => misfit[b]! - misfit[a]!));
}
