/** What the board lies on: a rubber mat, a beech top, a grey laminate. Drawn once, cut anew for each picture. */
import sharp from 'sharp';
import { enlarged } from './enlarge';
import { sheetFrom, type Sheet } from './noise';

export type BenchTop = 'mat' | 'beech' | 'slate';

const WIDTH = 1500;
const HEIGHT = 1100;

type Shader = (x: number, y: number, noise: Sheet) => readonly [number, number, number];

const mat: Shader = (x, y, noise) => {
  const pebble = noise(x * 0.42, y * 0.42) * 5 + noise(x * 0.16 + 9, y * 0.16) * 3;
  const worn = noise(x * 0.006, y * 0.009) * 7 + noise(x * 0.021, y * 0.017 + 40) * 3;
  const scratch = Math.max(0, noise(x * 0.012 + y * 0.05, y * 0.9 - x * 0.3) - 0.86) * 60;
  const k = pebble + worn + scratch;
  return [92 + k, 116 + k, 128 + k * 0.95];
};

const beech: Shader = (x, y, noise) => {
  const bend = noise(x * 0.0022, y * 0.004) * 34;
  const rings =
    noise(x * 0.0016 + 70, (y + bend) * 0.034) * 0.6 + noise(x * 0.003, (y + bend) * 0.11) * 0.4;
  const fibre = noise(x * 0.012, (y + bend * 0.4) * 0.85);
  const fleck = noise(x * 0.045 + 20, y * 0.5 + 7);
  const k = rings * 13 + fibre * 5 - Math.max(0, fleck - 0.55) * 58;
  const plank = Math.abs(((y + 210) % 520) - 260) > 258 ? -38 : 0;
  return [196 + k + plank, 160 + k * 1.02 + plank, 118 + k * 0.9 + plank];
};

const slate: Shader = (x, y, noise) => {
  const grain = noise(x * 0.5, y * 0.5) * 4 + noise(x * 0.21, y * 0.21 + 80) * 5;
  const fleck = noise(x * 0.33 + 11, y * 0.33 + 5) > 0.78 ? 17 : 0;
  const cloud = noise(x * 0.008, y * 0.01) * 6;
  const k = grain + cloud + fleck;
  return [176 + k, 177 + k, 172 + k * 0.95];
};

const SHADERS: Readonly<Record<BenchTop, Shader>> = { mat, beech, slate };
const sheets = new Map<BenchTop, Buffer>();

function sheetOf(top: BenchTop): Buffer {
  const known = sheets.get(top);
  if (known) return known;
  const noise = sheetFrom(77);
  const shader = SHADERS[top];
  const pixels = Buffer.alloc(WIDTH * HEIGHT * 3);
  for (let y = 0, i = 0; y < HEIGHT; y++)
    for (let x = 0; x < WIDTH; x++) {
      const [r, g, b] = shader(x, y, noise);
      pixels[i++] = Math.max(0, Math.min(255, r));
      pixels[i++] = Math.max(0, Math.min(255, g));
      pixels[i++] = Math.max(0, Math.min(255, b));
    }
  sheets.set(top, pixels);
  return pixels;
}

/** A piece of the bench of this many pixels, a little out of focus; `seed` chooses which. */
export async function benchTop(
  top: BenchTop,
  width: number,
  height: number,
  seed: number,
): Promise<Uint8Array> {
  const [w, h] = [1000, Math.round((1000 * height) / width)];
  const left = (seed * 7919) % (WIDTH - w);
  const above = (seed * 6007) % (HEIGHT - h);
  const pixels = await sharp(sheetOf(top), { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
    .extract({ left, top: above, width: w, height: h })
    .raw()
    .toBuffer();
  return enlarged({ pixels, width: w, height: h }, width, height, 3);
}
