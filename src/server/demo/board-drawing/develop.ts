/**
 * Puts the layers together as a lamp and a camera would: the board on the bench, its relief in raking light, shadows,
 * the lamp's own reflection in the mask, the lens's fall-off, the sensor's grain.
 */
import { grainFrom, sheetFrom } from './noise';

export type Layers = {
  width: number;
  height: number;
  /** RGB. */
  bench: Buffer;
  /** RGBA. */
  board: Buffer;
  /** RGBA. */
  bodies: Buffer;
  /** One byte a pixel: how high; how dark; how dark. */
  relief: Buffer;
  cast: Buffer;
  contact: Buffer;
  /** The board's own shadow on the bench. */
  under: Buffer;
};

export type Light = {
  /** Where the lamp mirrors in the mask, as shares of the picture, and how strongly. */
  glare: { x: number; y: number; strength: number };
  /** Red, green, blue: the warmth of the light and the exposure. */
  balance: readonly [number, number, number];
  seed: number;
};

/** Stray light lifts the blacks, the whites roll off. */
function toned(level: number): number {
  const lifted = 7 + level * 0.965;
  if (lifted <= 0) return 0;
  return lifted < 205 ? lifted : 205 + 50 * (1 - Math.exp((205 - lifted) / 50));
}

/** RGB pixels of the finished photograph. */
export function developed(layers: Layers, { glare, balance, seed }: Light): Buffer {
  const { width, height, bench, board, bodies, relief, cast, contact, under } = layers;
  const out = Buffer.allocUnsafe(width * height * 3);
  const noise = sheetFrom(seed);
  const grain = grainFrom(seed + 1);
  const [kr, kg, kb] = balance;
  let roll = (seed * 2654435761) >>> 0;
  for (let y = 0; y < height; y++) {
    const v = (y + 0.5) / height - 0.5;
    const gv = ((y / height - glare.y) * height) / width;
    roll = (Math.imul(roll, 1664525) + 1013904223) >>> 0;
    let g0 = roll >>> 16;
    const low = (y > 0 ? y - 1 : y) * width;
    const high = (y < height - 1 ? y + 1 : y) * width;
    for (let x = 0; x < width; x++) {
      const i = y * width + x;
      const i3 = i * 3;
      const i4 = i * 4;
      const u = (x + 0.5) / width - 0.5;
      const gu = x / width - glare.x;
      const a = board[i4 + 3] ?? 0;
      let r = 0;
      let g = 0;
      let b = 0;
      if (a < 255) {
        const dark = 1 - ((under[i] ?? 0) / 255) * 0.72;
        r = (bench[i3] ?? 0) * dark;
        g = (bench[i3 + 1] ?? 0) * dark;
        b = (bench[i3 + 2] ?? 0) * dark;
      }
      if (a > 0) {
        // Light from the upper left: what rises towards it is bright, what falls away is dark.
        const slope =
          (relief[high + (x < width - 1 ? x + 1 : x)] ?? 0) -
          (relief[low + (x > 0 ? x - 1 : x)] ?? 0);
        const near = Math.exp(-(gu * gu * 9 + gv * gv * 16));
        const cloud = noise(x * 0.011, y * 0.011) * 0.025 + noise(x * 0.5, y * 0.5) * 0.02;
        const k = 1 + slope * (0.0016 + near * 0.0022) + cloud;
        const shine = glare.strength * near * (255 + slope * 0.9);
        const share = a / 255;
        r = r * (1 - share) + ((board[i4] ?? 0) * k + shine) * share;
        g = g * (1 - share) + ((board[i4 + 1] ?? 0) * k + shine) * share;
        b = b * (1 - share) + ((board[i4 + 2] ?? 0) * k + shine * 1.03) * share;
      }
      const shade = (1 - ((cast[i] ?? 0) / 255) * 0.62) * (1 - ((contact[i] ?? 0) / 255) * 0.5);
      r *= shade;
      g *= shade;
      b *= shade;
      const c = bodies[i4 + 3] ?? 0;
      if (c > 0) {
        const share = c / 255;
        r = r * (1 - share) + (bodies[i4] ?? 0) * share;
        g = g * (1 - share) + (bodies[i4 + 1] ?? 0) * share;
        b = b * (1 - share) + (bodies[i4 + 2] ?? 0) * share;
      }
      const fall = 1.03 - (u * u + v * v) * 0.52;
      g0 = (g0 + 1) & 0xffff;
      const luma = (grain[g0] ?? 0) * 0.055;
      const tint = (grain[(g0 + 21013) & 0xffff] ?? 0) * 0.03;
      r = r * kr * fall + luma + tint;
      g = g * kg * fall + luma;
      b = b * kb * fall + luma - tint;
      out[i3] = toned(r);
      out[i3 + 1] = toned(g);
      out[i3 + 2] = toned(b);
    }
  }
  return out;
}
