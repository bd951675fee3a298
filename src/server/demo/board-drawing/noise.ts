/** Tables of chance for textures and grain, the same on every machine. */
import { chanceFrom } from '../chance';

const SIZE = 256;

/** A sheet of smooth noise that repeats every 256 units: −1 to 1. */
export type Sheet = (x: number, y: number) => number;

export function sheetFrom(seed: number): Sheet {
  const chance = chanceFrom(seed);
  const table = Float32Array.from({ length: SIZE * SIZE }, () => chance.next() * 2 - 1);
  return (x, y) => {
    const xi = Math.floor(x);
    const yi = Math.floor(y);
    const fx = x - xi;
    const fy = y - yi;
    const sx = fx * fx * (3 - 2 * fx);
    const sy = fy * fy * (3 - 2 * fy);
    const x0 = xi & 255;
    const x1 = (xi + 1) & 255;
    const y0 = (yi & 255) * SIZE;
    const y1 = ((yi + 1) & 255) * SIZE;
    const a = table[y0 + x0] ?? 0;
    const b = table[y0 + x1] ?? 0;
    const c = table[y1 + x0] ?? 0;
    const d = table[y1 + x1] ?? 0;
    const top = a + (b - a) * sx;
    return top + (c + (d - c) * sx - top) * sy;
  };
}

/** Grain as a sensor adds it: bell-shaped, in sixteenths of a grey level. */
export function grainFrom(seed: number): Int8Array {
  const chance = chanceFrom(seed);
  return Int8Array.from({ length: 1 << 16 }, () => {
    const sum = chance.next() + chance.next() + chance.next() + chance.next() - 2;
    return Math.max(-127, Math.min(127, Math.round(sum * 55)));
  });
}
