/**
 * Puts the layers together as a lamp and a camera would: the board on the bench, its relief in raking light, shadows,
 * the lamp's own reflection in the mask, the lens's fall-off, the sensor's grain.
 */
import { grainFrom, sheetFrom } from './noise';

export type Layers = {
  width: number;
  height: number;
  /** RGB. */
  bench: Uint8Array;
  /** RGBA. */
  board: Buffer;
  /** RGBA. */
  bodies: Buffer;
  /** One byte a pixel: how high the board's surface stands. */
  relief: Uint8Array;
  /** One byte a pixel: the light that reaches the board, and the bench. */
  shade: { board: Uint8Array; bench: Uint8Array };
};

export type Light = {
  /** Where the lamp mirrors in the mask, as shares of the picture, and how strongly. */
  glare: { x: number; y: number; strength: number };
  /** Red, green, blue: the warmth of the light and the exposure. */
  balance: readonly [number, number, number];
  seed: number;
};

/** Light changes slowly over the picture: it is worked out for squares of this many pixels. */
const SQUARE = 8;

/** Stray light lifts the blacks, the whites roll off: levels of a linear scale to those of the file. */
const TONES = Uint8Array.from({ length: 1024 }, (_, level) => {
  const lifted = 7 + level * 0.965;
  return lifted < 205 ? lifted : 205 + 50 * (1 - Math.exp((205 - lifted) / 50));
});
const toned = (level: number): number =>
  TONES[level < 0 ? 0 : level > 1023 ? 1023 : level | 0] ?? 0;

/** How near each square is to the lamp's reflection, how cloudy the mask is there, how much light the lens lets in. */
function lightOver({ width, height }: Layers, { glare, seed }: Light) {
  const columns = Math.ceil(width / SQUARE);
  const rows = Math.ceil(height / SQUARE);
  const noise = sheetFrom(seed);
  const near = new Float32Array(columns * rows);
  const cloud = new Float32Array(columns * rows);
  const fall = new Float32Array(columns * rows);
  for (let row = 0; row < rows; row++)
    for (let column = 0; column < columns; column++) {
      const [x, y] = [(column + 0.5) * SQUARE, (row + 0.5) * SQUARE];
      const gu = x / width - glare.x;
      const gv = ((y / height - glare.y) * height) / width;
      const [u, v] = [x / width - 0.5, y / height - 0.5];
      const i = row * columns + column;
      near[i] = Math.exp(-(gu * gu * 9 + gv * gv * 16));
      cloud[i] = 1 + noise(x * 0.011, y * 0.011) * 0.03;
      fall[i] = 1.03 - (u * u + v * v) * 0.52;
    }
  return { columns, near, cloud, fall };
}

/** RGB pixels of the finished photograph. */
export function developed(layers: Layers, light: Light): Buffer {
  const { width, height, bench, board, bodies, relief, shade } = layers;
  const { columns, near, cloud, fall } = lightOver(layers, light);
  const out = Buffer.allocUnsafe(width * height * 3);
  const grain = grainFrom(light.seed + 1);
  const [kr, kg, kb] = light.balance;
  const strength = light.glare.strength;
  let roll = (light.seed * 2654435761) >>> 0;
  for (let y = 0; y < height; y++) {
    roll = (Math.imul(roll, 1664525) + 1013904223) >>> 0;
    let g0 = roll >>> 16;
    const above = (y > 0 ? y - 1 : y) * width;
    const below = (y < height - 1 ? y + 1 : y) * width;
    const squares = ((y / SQUARE) | 0) * columns;
    for (let x = 0; x < width; x++) {
      const i = y * width + x;
      const i3 = i * 3;
      const i4 = i * 4;
      const square = squares + ((x / SQUARE) | 0);
      g0 = (g0 + 1) & 0xffff;
      const speck = grain[g0] ?? 0;
      const tint = (grain[(g0 + 21013) & 0xffff] ?? 0) * 0.03;
      const a = board[i4 + 3] ?? 0;
      let r = 0;
      let g = 0;
      let b = 0;
      if (a < 255) {
        const reached = (shade.bench[i] ?? 0) / 255;
        r = (bench[i3] ?? 0) * reached;
        g = (bench[i3 + 1] ?? 0) * reached;
        b = (bench[i3 + 2] ?? 0) * reached;
      }
      if (a > 0) {
        // Light from the upper left: what rises towards it is bright, what falls away is dark.
        const slope =
          (relief[below + (x < width - 1 ? x + 1 : x)] ?? 0) -
          (relief[above + (x > 0 ? x - 1 : x)] ?? 0);
        const shone = near[square] ?? 0;
        const k = (cloud[square] ?? 1) + slope * (0.0028 + shone * 0.0036) + tint * 0.006;
        const shine = strength * shone * (255 + slope * 1.4);
        const share = a / 255;
        const reached = (shade.board[i] ?? 0) / 255;
        r += (((board[i4] ?? 0) * k + shine) * reached - r) * share;
        g += (((board[i4 + 1] ?? 0) * k + shine) * reached - g) * share;
        b += (((board[i4 + 2] ?? 0) * k + shine * 1.03) * reached - b) * share;
      }
      const c = bodies[i4 + 3] ?? 0;
      if (c > 0) {
        const share = c / 255;
        r += ((bodies[i4] ?? 0) - r) * share;
        g += ((bodies[i4 + 1] ?? 0) - g) * share;
        b += ((bodies[i4 + 2] ?? 0) - b) * share;
      }
      const lens = fall[square] ?? 1;
      const luma = speck * 0.055;
      out[i3] = toned(r * kr * lens + luma + tint);
      out[i3 + 1] = toned(g * kg * lens + luma);
      out[i3 + 2] = toned(b * kb * lens + luma - tint);
    }
  }
  return out;
}
