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
  /** Takes up two parts by one mode each; what follows is asked of their modes that bridge alike. */
  pair(j: number, k: number): void;
  /** True when no reading depends on both: their gains on the healthy network then add up. */
  apart(): boolean;
  /** ln likelihood bound of modes j and k, giving up once it falls below `least`. */
  bound(j: number, k: number, least: number): number;
  /** True when the modes bounded last move no reading that depends on both: gains add up here as well. */
  still(): boolean;
}

export function pairBounds(scene: Scene, evidence: Evidence, reach: Reach): PairBounds {
  const settings = scene.settings.length;
  const row = scene.parts + 1;
  const { count, toPart, ohms, setting } = evidence;
  const { delta, factor } = endsOf(scene);
  const weigh = weigher(evidence);
  const { inside } = weigh;
  const alone = aloneOf(scene, evidence, { delta, factor }, weigh);
  const healthy = Float64Array.from(ohms, (base, r) => weigh.between(r, base, base));
  const total = healthy.reduce((sum, one) => sum + one, 0);
  const gain = Float64Array.from(scene.modes, (_, m) =>
    healthy.reduce((sum, one, r) => sum + alone[m * count + r]! - one, 0),
  );
  const both = new Int32Array(2);
  // The readings that depend on both parts, ordered by setting, and z_j², z_j·z_k, z_k² of each.
  const reading = new Int32Array(count);
  const squares = new Float64Array(count * 3);
  const between = new Float64Array(settings);
  const byType = Int32Array.from(
    [...Array(count).keys()].sort((a, b) => setting[a]! - setting[b]!),
  );
  let shared = 0;
  let unmoved = false;

  const pair = (j: number, k: number): void => {
    reachBoth(scene, reach, j, k, both);
    const partJ = scene.modes[j]!.part;
    const partK = scene.modes[k]!.part;
    shared = 0;
    if (both[0] === 0 && both[1] === 0) return;
    for (let s = 0; s < settings; s++)
      between[s] = scene.settings[s]!.between[partJ * row + partK]!;
    for (let i = 0; i < count; i++) {
      const r = byType[i]!;
      const word = r < 30 ? both[0]! : both[1]!;
      if ((word & (1 << (r < 30 ? r : r - 30))) === 0) continue;
      const zj = toPart[r * row + partJ]!;
      const zk = toPart[r * row + partK]!;
      squares[shared * 3] = zj * zj;
      squares[shared * 3 + 1] = -2 * zj * zk;
      squares[shared * 3 + 2] = zk * zk;
      reading[shared++] = r;
    }
  };

  const bound = (j: number, k: number, least: number): number => {
    let sum = total + gain[j]! + gain[k]!;
    unmoved = true;
    for (let i = 0; i < shared; i++) {
      const r = reading[i]!;
      sum += inside[r]! - alone[j * count + r]! - alone[k * count + r]! + healthy[r]!;
    }
    if (sum < least) return sum;
    let s = -1;
    let [lowJ, lowM, lowK, highJ, highM, highK] = [0, 0, 0, 0, 0, 0];
    for (let i = 0; i < shared; i++) {
      const r = reading[i]!;
      if (setting[r] !== s) {
        s = setting[r]!;
        const z = between[s]!;
        const at = (j * settings + s) * 2;
        const kt = (k * settings + s) * 2;
        const low = 1 / determinant(delta[at]!, factor[at]!, delta[kt]!, factor[kt]!, z);
        lowJ = delta[at]! * factor[kt]! * low;
        lowM = delta[at]! * delta[kt]! * z * low;
        lowK = delta[kt]! * factor[at]! * low;
        const [dj, fj] = [delta[at + 1]!, factor[at + 1]!];
        const [dk, fk] = [delta[kt + 1]!, factor[kt + 1]!];
        const high = 1 / determinant(dj, fj, dk, fk, z);
        highJ = dj * fk * high;
        highM = dj * dk * z * high;
        highK = dk * fj * high;
      }
      const jj = squares[i * 3]!;
      const jk = squares[i * 3 + 1]!;
      const kk = squares[i * 3 + 2]!;
      const base = ohms[r]!;
      const low = base - (lowJ * jj + lowM * jk + lowK * kk);
      const high = base - (highJ * jj + highM * jk + highK * kk);
      sum += weigh.between(r, low, high) - inside[r]!;
      if (sum < least) return sum;
      if (unmoved && weigh.moves(r, low, high, base)) unmoved = false;
    }
    return sum;
  };
  return { pair, apart: () => shared === 0, bound, still: () => unmoved };
}

/** Positive in exact arithmetic; two opens that cut the circuit leave it to rounding. */
function determinant(dj: number, fj: number, dk: number, fk: number, z: number): number {
  return Math.max(fj * fk - dj * dk * z * z, 1e-14 * fj * fk);
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

/** Weights of every reading with each mode alone, mode by mode. */
function aloneOf(scene: Scene, evidence: Evidence, ends: Ends, weigh: Weigher): Float64Array {
  const settings = scene.settings.length;
  const { count } = evidence;
  const alone = new Float64Array(scene.modes.length * count);
  scene.modes.forEach(({ part }, m) => {
    for (let r = 0; r < count; r++) {
      const at = (m * settings + evidence.setting[r]!) * 2;
      const squared = evidence.toPart[r * (scene.parts + 1) + part]! ** 2;
      const low = evidence.ohms[r]! - (ends.delta[at]! * squared) / ends.factor[at]!;
      const high = evidence.ohms[r]! - (ends.delta[at + 1]! * squared) / ends.factor[at + 1]!;
      alone[m * count + r] = weigh.between(r, low, high);
    }
  });
  return alone;
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
