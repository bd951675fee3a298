import type { Evidence } from './evidence';
import type { Scene } from './scene';
import { siemensIn } from './scene';

/** The least resistance that a trial may predict, Ω: rounding never reaches zero. */
export const LEAST_PREDICTED = 1e-6;

const LEAST_DETERMINANT = 1e-14;

/**
 * Two parts (one of them may be none) at given resistances: per setting the 2×2 matrix K by which every
 * resistance drops, `R' = R − [z_j z_k] K [z_j z_k]ᵀ`, and the matrix that carries transfers over
 * (Woodbury 1950). Buffers are reused: one trial at a time.
 */
export interface Trial {
  /** Parts changed; the number of parts where none is. */
  j: number;
  k: number;
  /** True when a contact may conduct where it should be open: parts no reading touched may matter then. */
  bridging: boolean;
  /** How far the readings would move the faults' ln Ω, left by the screening. */
  shiftJ: number;
  shiftK: number;
  /** Entries per reading of the transfers: parts + 1. */
  readonly row: number;
  readonly siemensJ: Float64Array;
  readonly siemensK: Float64Array;
  readonly k11: Float64Array;
  readonly k12: Float64Array;
  readonly k22: Float64Array;
  /** z'_j = jj·z_j + jk·z_k and z'_k = kj·z_j + kk·z_k. */
  readonly jj: Float64Array;
  readonly jk: Float64Array;
  readonly kj: Float64Array;
  readonly kk: Float64Array;
  /** What the readings show at the four corners of two modes' ranges, for choosing nodes. */
  readonly corners: Float64Array;
}

export function newTrial(scene: Scene): Trial {
  const make = (): Float64Array => new Float64Array(scene.settings.length);
  return {
    j: scene.parts,
    k: scene.parts,
    bridging: false,
    shiftJ: 0,
    shiftK: 0,
    row: scene.parts + 1,
    siemensJ: make(),
    siemensK: make(),
    k11: make(),
    k12: make(),
    k22: make(),
    jj: make(),
    jk: make(),
    kj: make(),
    kk: make(),
    corners: new Float64Array(4 * scene.aims.length),
  };
}

/** Sets the trial to these resistances. */
export function setTrial(
  scene: Scene,
  trial: Trial,
  modeJ: number,
  lnJ: number,
  modeK: number,
  lnK: number,
): void {
  const j = modeJ < 0 ? scene.parts : scene.modes[modeJ]!.part;
  const k = modeK < 0 ? scene.parts : scene.modes[modeK]!.part;
  const row = scene.parts + 1;
  trial.j = j;
  trial.k = k;
  trial.bridging =
    (modeJ >= 0 && scene.modes[modeJ]!.bridges) || (modeK >= 0 && scene.modes[modeK]!.bridges);
  for (let s = 0; s < scene.settings.length; s++) {
    const setting = scene.settings[s]!;
    const newJ = modeJ < 0 ? 0 : siemensIn(setting, j, modeJ, lnJ);
    const newK = modeK < 0 ? 0 : siemensIn(setting, k, modeK, lnK);
    const dj = newJ - setting.siemens[j]!;
    const dk = newK - setting.siemens[k]!;
    const fj = setting.away[j]! + setting.ohms[j]! * newJ;
    const fk = setting.away[k]! + setting.ohms[k]! * newK;
    const z = setting.between[j * row + k]!;
    // Positive in exact arithmetic; two opens that cut the circuit leave it to rounding.
    const determinant = Math.max(fj * fk - dj * dk * z * z, LEAST_DETERMINANT * fj * fk);
    trial.siemensJ[s] = newJ;
    trial.siemensK[s] = newK;
    trial.k11[s] = (dj * fk) / determinant;
    trial.k12[s] = (-dj * dk * z) / determinant;
    trial.k22[s] = (dk * fj) / determinant;
    trial.jj[s] = fk / determinant;
    trial.jk[s] = (-dk * z) / determinant;
    trial.kj[s] = (-dj * z) / determinant;
    trial.kk[s] = fj / determinant;
  }
}

/** Resistance that a reading's aim shows in the trial, Ω. */
export function trialOhms(evidence: Evidence, trial: Trial, r: number): number {
  const setting = evidence.setting[r]!;
  const zj = evidence.toPart[r * trial.row + trial.j]!;
  const zk = evidence.toPart[r * trial.row + trial.k]!;
  const drop =
    trial.k11[setting]! * zj * zj +
    2 * trial.k12[setting]! * zj * zk +
    trial.k22[setting]! * zk * zk;
  const left = evidence.ohms[r]! - drop;
  return left > LEAST_PREDICTED ? left : LEAST_PREDICTED;
}
