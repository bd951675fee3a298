import type { Scene } from './scene';

const STEP = 0.5;
const LOW = Math.log(1e-6);
const SIZE = Math.ceil((Math.log(1e15) - LOW) / STEP) + 1;

/**
 * For each aim, a bound on the variance of ln R that the healthy parts' tolerances can give, by the ln R
 * shown. In any circuit a part's share of the power is at most min(1, R/R_k, R_k/R): its voltage is at most
 * the driving one and its current at most the driving one. The screening uses the bound in place of the
 * sensitivities of every hypothesis.
 */
export function toleranceBounds(scene: Scene): Float64Array {
  const table = new Float64Array(scene.aims.length * SIZE);
  scene.aims.forEach((aim, index) => table.set(toleranceBound(scene, aim.touches), index * SIZE));
  return table;
}

/** The bound for a reading that touches these parts (all when left out). */
export function toleranceBound(scene: Scene, touches?: Uint8Array): Float64Array {
  const table = new Float64Array(SIZE);
  for (let at = 0; at < SIZE; at++) {
    const ohms = Math.exp(LOW + at * STEP);
    let squares = 0;
    let largest = 0;
    for (let k = 0; k < scene.parts; k++) {
      if (touches !== undefined && touches[k] === 0) continue;
      const ratio = ohms / scene.nominal[k]!;
      const share = Math.min(1, ratio, 1 / ratio);
      const variance = scene.spread[k]! ** 2;
      squares += share * share * variance;
      largest = Math.max(largest, share * variance);
    }
    table[at] = Math.min(squares, largest);
  }
  return table;
}

/** The bound at ln R. */
export function boundAt(table: Float64Array, aim: number, lnOhms: number): number {
  const at = Math.round((lnOhms - LOW) / STEP);
  return table[aim * SIZE + (at < 0 ? 0 : at >= SIZE ? SIZE - 1 : at)]!;
}
