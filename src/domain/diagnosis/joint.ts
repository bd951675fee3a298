import { MISPROBE } from './assumptions';
import type { Evidence } from './evidence';
import { LOG_ROOT_TAU, normalCdf } from './normal';
import type { Scene } from './scene';
import type { Trial } from './trial';
import { trialOhms } from './trial';

/** Contributions to the standard deviation of ln R below this are left out of the covariance. */
const NEGLIGIBLE = 1e-5;

/** Buffers of the joint likelihood, for one scene. */
export interface Joint {
  readonly middle: Float64Array;
  readonly covariance: Float64Array;
  /** Standard deviation that each part gives each reading, part by part. */
  readonly shares: Float64Array;
  readonly factor: Float64Array;
  readonly solved: Float64Array;
  readonly keptAs: Int32Array;
}

export function newJoint(scene: Scene): Joint {
  const n = scene.aims.length;
  return {
    middle: new Float64Array(n),
    covariance: new Float64Array(n * n),
    shares: new Float64Array(n * (scene.parts + 1)),
    keptAs: new Int32Array(n),
    factor: new Float64Array(n * n),
    solved: new Float64Array(n),
  };
}

/** Fills the predicted middle of every reading and the covariance that tolerances and spread faults give. */
export function predictJoint(
  scene: Scene,
  evidence: Evidence,
  trial: Trial,
  spreadJ: number,
  spreadK: number,
  joint: Joint,
): void {
  const n = scene.aims.length;
  const row = scene.parts + 1;
  const { shares } = joint;
  shares.fill(0);
  for (let r = 0; r < n; r++) {
    if (evidence.ohms[r] === Infinity) {
      joint.middle[r] = Infinity;
      continue;
    }
    const s = evidence.setting[r]!;
    const { siemens, between } = scene.settings[s]!;
    const ohms = trialOhms(evidence, trial, r) + evidence.floor[r]!;
    joint.middle[r] = Math.log(ohms);
    const at = r * row;
    const zj = evidence.toPart[at + trial.j]!;
    const zk = evidence.toPart[at + trial.k]!;
    const p = trial.k11[s]! * zj + trial.k12[s]! * zk;
    const q = trial.k12[s]! * zj + trial.k22[s]! * zk;
    const list = trial.bridging ? scene.all : scene.aims[r]!.touched;
    for (let i = 0; i < list.length; i++) {
      const part = list[i]!;
      if (part === trial.j || part === trial.k) continue;
      const z =
        evidence.toPart[at + part]! -
        p * between[trial.j * row + part]! -
        q * between[trial.k * row + part]!;
      const share = ((siemens[part]! * z * z) / ohms) * scene.spread[part]!;
      if (share > NEGLIGIBLE) shares[part * n + r] = share;
    }
    const newZj = trial.jj[s]! * zj + trial.jk[s]! * zk;
    const newZk = trial.kj[s]! * zj + trial.kk[s]! * zk;
    if (trial.j < scene.parts)
      shares[trial.j * n + r] = ((trial.siemensJ[s]! * newZj * newZj) / ohms) * spreadJ;
    if (trial.k < scene.parts)
      shares[trial.k * n + r] = ((trial.siemensK[s]! * newZk * newZk) / ohms) * spreadK;
  }
  sumSquares(shares, scene.parts, n, joint.covariance);
  for (let r = 0; r < n; r++) joint.covariance[r * n + r]! += evidence.variance[r]!;
}

/** covariance = Σ over parts of share·shareᵀ, lower triangle. */
function sumSquares(
  shares: Float64Array,
  parts: number,
  n: number,
  covariance: Float64Array,
): void {
  covariance.fill(0);
  for (let part = 0; part < parts; part++) {
    const at = part * n;
    for (let r = 0; r < n; r++) {
      const share = shares[at + r]!;
      if (share === 0) continue;
      for (let q = 0; q <= r; q++) covariance[r * n + q]! += share * shares[at + q]!;
    }
  }
}

/**
 * ln likelihood of the readings as a multivariate normal in ln R with the covariance predicted last, factored
 * reading by reading (Cholesky). Each reading is weighed given those before it; one better explained by a
 * misprobe is set aside, so that it bends no other. OL is a censored reading, P(R > over range), weighed last.
 */
export function jointLikelihood(evidence: Evidence, joint: Joint): number {
  const n = evidence.count;
  const { covariance, factor, solved, middle, keptAs } = joint;
  let total = 0;
  let kept = 0;
  for (let step = 0; step < n; step++) {
    const r = evidence.order[step]!;
    const over = evidence.over[r] === 1;
    const misprobe = evidence.misprobe[r]!;
    if (middle[r] === Infinity) {
      const sound = over ? 1 - MISPROBE : 0;
      total += Math.log(sound + misprobe);
      continue;
    }
    let error = evidence.y[r]! - middle[r]!;
    let variance = covariance[r * n + r]!;
    for (let i = 0; i < kept; i++) {
      const q = keptAs[i]!;
      let sum = r > q ? covariance[r * n + q]! : covariance[q * n + r]!;
      for (let m = 0; m < i; m++) sum -= factor[kept * n + m]! * factor[i * n + m]!;
      const entry = sum / factor[i * n + i]!;
      factor[kept * n + i] = entry;
      error -= entry * solved[i]!;
      variance -= entry * entry;
    }
    // Rounding may eat a variance that readings of one point have in common: the meter's own remains.
    variance = Math.max(variance, 0.5 * evidence.variance[r]!);
    const root = Math.sqrt(variance);
    const sound = over
      ? (1 - MISPROBE) * normalCdf(-error / root)
      : ((1 - MISPROBE) * Math.exp(-0.5 * (error / root) ** 2 - LOG_ROOT_TAU)) / root;
    total += Math.log(sound + misprobe);
    if (over || sound < misprobe) continue;
    factor[kept * n + kept] = root;
    solved[kept] = error / root;
    keptAs[kept++] = r;
  }
  return total;
}
