import type { Evidence } from './evidence';
import { LOG_ROOT_TAU } from './normal';
import type { Reach } from './reach';
import { reachBoth } from './reach';
import type { Scene } from './scene';
import { boundAt } from './tolerance-bound';

/**
 * A generous bound on the ln likelihood of every pair of two modes. By Rayleigh's monotonicity law all that
 * two faults can make a reading show lies between what it shows with both at the low ends of their ranges
 * and with both at the high ends: a value outside counts by its distance, one inside as if met exactly.
 */
export interface PairBounds {
  /** True when no reading depends on both: their gains on the healthy network then add up. */
  apart(j: number, k: number): boolean;
  /** ln likelihood bound of modes j and k, giving up once it falls below `least`. */
  bound(j: number, k: number, least: number): number;
  /** True when the pair bounded last moves no reading that depends on both: gains add up here as well. */
  still(): boolean;
}

export function pairBounds(scene: Scene, evidence: Evidence, reach: Reach): PairBounds {
  const settings = scene.settings.length;
  const row = scene.parts + 1;
  const { count, toPart, ohms } = evidence;
  const ends = endsOf(scene);
  const weigh = weigher(evidence);
  const alone = scene.modes.map((_, m) => aloneOf(scene, evidence, ends, weigh, m));
  const healthy = Float64Array.from(ohms, (base, r) => weigh.between(r, base, base));
  const total = healthy.reduce((sum, one) => sum + one, 0);
  const gain = alone.map((own) => own.reduce((sum, one, r) => sum + one - healthy[r]!, 0));
  const both = new Int32Array(2);
  const k11 = new Float64Array(settings * 2);
  const k12 = new Float64Array(settings * 2);
  const k22 = new Float64Array(settings * 2);
  const ready = new Uint8Array(settings);

  let unmoved = false;
  const together = (s: number, j: number, k: number): void => {
    const z = scene.settings[s]!.between[scene.modes[j]!.part * row + scene.modes[k]!.part]!;
    for (let end = 0; end < 2; end++) {
      const at = (j * settings + s) * 2 + end;
      const kt = (k * settings + s) * 2 + end;
      const dj = ends.delta[at]!;
      const dk = ends.delta[kt]!;
      const fj = ends.factor[at]!;
      const fk = ends.factor[kt]!;
      const inverse = 1 / Math.max(fj * fk - dj * dk * z * z, 1e-14 * fj * fk);
      const out = s * 2 + end;
      k11[out] = dj * fk * inverse;
      k12[out] = -2 * dj * dk * z * inverse;
      k22[out] = dk * fj * inverse;
    }
  };

  const bound = (j: number, k: number, least: number): number => {
    const aloneJ = alone[j]!;
    const aloneK = alone[k]!;
    let sum = total + gain[j]! + gain[k]!;
    unmoved = true;
    for (let word = 0; word < 2; word++)
      for (let bits = both[word]!; bits !== 0; bits &= bits - 1) {
        const r = 31 - Math.clz32(bits & -bits) + 30 * word;
        if (r < count) sum += weigh.inside[r]! - aloneJ[r]! - aloneK[r]! + healthy[r]!;
      }
    if (sum < least) return sum;
    const partJ = scene.modes[j]!.part;
    const partK = scene.modes[k]!.part;
    ready.fill(0);
    for (let word = 0; word < 2; word++)
      for (let bits = both[word]!; bits !== 0; bits &= bits - 1) {
        const r = 31 - Math.clz32(bits & -bits) + 30 * word;
        if (r >= count) continue;
        const s = evidence.setting[r]!;
        if (ready[s] === 0) together(s, j, k);
        ready[s] = 1;
        const zj = toPart[r * row + partJ]!;
        const zk = toPart[r * row + partK]!;
        const jj = zj * zj;
        const jk = zj * zk;
        const kk = zk * zk;
        const at = s * 2;
        const base = ohms[r]!;
        const low = base - (k11[at]! * jj + k12[at]! * jk + k22[at]! * kk);
        const high = base - (k11[at + 1]! * jj + k12[at + 1]! * jk + k22[at + 1]! * kk);
        sum += weigh.between(r, low, high) - weigh.inside[r]!;
        if (sum < least) return sum;
        if (unmoved && weigh.moves(r, low, high, base)) unmoved = false;
      }
    return sum;
  };
  const apart = (j: number, k: number): boolean => {
    reachBoth(scene, reach, j, k, both);
    return both[0] === 0 && both[1] === 0;
  };
  return {
    apart,
    bound: (j, k, least) => {
      reachBoth(scene, reach, j, k, both);
      return bound(j, k, least);
    },
    still: () => unmoved,
  };
}

/** Change of conductance δ and 1 + δ·R at both ends of every mode, per setting. */
interface Ends {
  readonly delta: Float64Array;
  readonly factor: Float64Array;
}

function endsOf(scene: Scene): Ends {
  const settings = scene.settings.length;
  const delta = new Float64Array(scene.modes.length * settings * 2);
  const factor = new Float64Array(scene.modes.length * settings * 2);
  scene.modes.forEach(({ part, low, high }, m) => {
    scene.settings.forEach((setting, s) => {
      for (let end = 0; end < 2; end++) {
        const at = (m * settings + s) * 2 + end;
        const healthy = setting.siemens[part]!;
        const siemens = setting.acts[m] === 1 ? Math.exp(-(end === 0 ? low : high)) : healthy;
        delta[at] = siemens - healthy;
        factor[at] = setting.away[part]! + setting.ohms[part]! * siemens;
      }
    });
  });
  return { delta, factor };
}

/** Weights of every reading with this mode alone. */
function aloneOf(
  scene: Scene,
  evidence: Evidence,
  ends: Ends,
  weigh: Weigher,
  m: number,
): Float64Array {
  const settings = scene.settings.length;
  const { part } = scene.modes[m]!;
  const own = new Float64Array(evidence.count);
  for (let r = 0; r < evidence.count; r++) {
    const at = (m * settings + evidence.setting[r]!) * 2;
    const squared = evidence.toPart[r * (scene.parts + 1) + part]! ** 2;
    const low = evidence.ohms[r]! - (ends.delta[at]! * squared) / ends.factor[at]!;
    const high = evidence.ohms[r]! - (ends.delta[at + 1]! * squared) / ends.factor[at + 1]!;
    own[r] = weigh.between(r, low, high);
  }
  return own;
}

/** Weighs a reading against all it may show. */
interface Weigher {
  /** ln weight when it is met exactly. */
  readonly inside: Float64Array;
  /** ln weight when it may show anything from low to high, Ω. */
  between(r: number, low: number, high: number): number;
  /** True when the meter could notice anything from low to high beside the healthy resistance, Ω. */
  moves(r: number, low: number, high: number, healthy: number): boolean;
}

/** Shares of the meter's standard deviation that nobody notices. */
const UNNOTICED = 0.1;

function weigher(evidence: Evidence): Weigher {
  const { over, y, floor, variance, deviation, logMisprobe } = evidence;
  const value = y.map((one, r) => Math.exp(one) - floor[r]!);
  const inside = variance.map((one, r) =>
    over[r] === 1 ? 0 : -0.5 * Math.log(one) - LOG_ROOT_TAU,
  );
  const outside = (r: number, near: number): number => {
    const worst = logMisprobe[r]!;
    if (near === Infinity) return worst;
    const shown = Math.log(Math.max(near, 1e-6) + floor[r]!);
    const wide = variance[r]! + boundAt(evidence.bounds, r, shown);
    const misfit = (-0.5 * (y[r]! - shown) ** 2) / wide;
    if (misfit < worst - 20) return worst;
    const density = over[r] === 1 ? misfit : misfit - 0.5 * Math.log(wide) - LOG_ROOT_TAU;
    return Math.max(density, worst);
  };
  const between = (r: number, low: number, high: number): number => {
    if (high < value[r]!) return outside(r, high);
    return over[r] === 0 && low > value[r]! ? outside(r, low) : inside[r]!;
  };
  const moves = (r: number, low: number, high: number, healthy: number): boolean => {
    if (healthy === Infinity) return low !== Infinity;
    if (over[r] === 1 && low > 2 * value[r]! && healthy > 2 * value[r]!) return false;
    const step = UNNOTICED * deviation[r]! * (healthy + floor[r]!);
    return high - healthy > step || healthy - low > step;
  };
  return { inside, between, moves };
}
