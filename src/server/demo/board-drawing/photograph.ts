/** A photograph of a board: the file a camera would have made of it, and where each part is in it. */
import sharp from 'sharp';
import type { DemoBoard } from '../content';
import { chanceFrom } from '../chance';
import type { Wear } from './bodies/brush';
import { benchTop } from './bench-top';
import { boardLayer, reliefLayer } from './board-layer';
import { bodyLayer, bodyMiddle, marksLayer } from './body-layer';
import { developed } from './develop';
import { faceOf } from './face';
import { framed, shareOf, svgOf, type Frame } from './frame';
import { enlarged } from './enlarge';
import { at, distance, middleOf, type Point, type Side } from './geometry';
import { Paints } from './paint';
import { planOf } from './plan';
import type { Scene } from './scene';
import { shadeMaps } from './shade-maps';
import type { Part } from './types';

export type Shot = {
  board: DemoBoard;
  side: Side;
  /** Parts that are not as they left the factory. */
  wear: ReadonlyMap<string, Wear>;
  /** Pixels of the finished picture. */
  width: number;
  height: number;
  /** The parts in the middle and how many millimetres are seen across; the whole board when left out. */
  close?: { refs: readonly string[]; span: number } | undefined;
  seed: number;
};

export type Photograph = {
  jpeg: Buffer;
  /** Shares of width and height, for every part that is seen. */
  places: Map<string, Point>;
};

/** The sensor is a little coarser than the picture: edges come out soft, as they do. */
const SENSOR = 0.8;

function frameFor(shot: Shot, scene: Omit<Scene, 'frame' | 'paints'>): Frame {
  const chance = chanceFrom(shot.seed * 31 + 5);
  const { face } = scene;
  const [width, height] = [Math.round(shot.width * SENSOR), Math.round(shot.height * SENSOR)];
  const whole = Math.max(face.width, (face.height * width) / height) * chance.between(1.1, 1.15);
  const wander = () => chance.between(-1, 1) * whole * 0.008;
  const parts = scene.plan.parts.filter((part) => shot.close?.refs.includes(part.ref));
  const target =
    parts.length > 0
      ? middleOf(parts.map((part) => face.flip(bodyMiddle(part))))
      : at(face.width / 2, face.height / 2);
  const middle = at(target.x + wander(), target.y + wander());
  const tilt = shot.close ? chance.between(-7, 7) : chance.between(-2, 2);
  return framed(width, height, middle, shot.close?.span ?? whole, tilt);
}

/** Parts that fit into one close-up `reach` mm across: those near the first, then those near the next, and so on. */
export function closeTogether(
  board: DemoBoard,
  refs: readonly string[],
  reach: number,
): string[][] {
  const parts = planOf(board).parts.filter((part) => refs.includes(part.ref));
  const groups: Part[][] = [];
  for (const ref of refs) {
    const part = parts.find((p) => p.ref === ref);
    if (!part) continue;
    const near = groups.find((group) =>
      group.every((other) => distance(bodyMiddle(other), bodyMiddle(part)) < reach),
    );
    if (near) near.push(part);
    else groups.push([part]);
  }
  return groups.map((group) => group.map((part) => part.ref));
}

const raw = (svg: Buffer) => sharp(svg, { limitInputPixels: false }).ensureAlpha().raw().toBuffer();

/** The relief, drawn at half the size: copper has soft edges under the mask. */
async function reliefOf(scene: Scene, drawing: string): Promise<Uint8Array> {
  const { frame, paints } = scene;
  const { data, info } = await sharp(svgOf(frame, drawing, paints.definitions(), 0.5))
    .extractChannel(0)
    .raw()
    .toBuffer({ resolveWithObject: true });
  const { width, height } = info;
  return enlarged({ pixels: data, width, height }, frame.width, frame.height);
}

/** Takes the photograph. */
export async function photographed(shot: Shot): Promise<Photograph> {
  const plan = planOf(shot.board);
  const face = faceOf(plan, shot.side);
  const frame = frameFor(shot, { plan, face, wear: shot.wear });
  const scene: Scene = { plan, face, frame, wear: shot.wear, paints: new Paints('p') };
  const board = boardLayer(scene, marksLayer(scene));
  const bodies = bodyLayer(scene);
  const relief = reliefLayer(scene);
  const definitions = scene.paints.definitions();
  const chance = chanceFrom(shot.seed);
  const layers = {
    width: frame.width,
    height: frame.height,
    bench: await benchTop(plan.floor.bench, frame.width, frame.height, shot.seed),
    board: await raw(svgOf(frame, board, definitions)),
    bodies: await raw(svgOf(frame, bodies, definitions)),
    relief: await reliefOf(scene, relief),
    shade: await shadeMaps(scene),
  };
  const warm = chance.between(-0.025, 0.03);
  const exposure = chance.between(1.06, 1.14);
  const pixels = developed(layers, {
    glare: {
      x: chance.between(0.15, 0.4),
      y: chance.between(-0.05, 0.3),
      strength: chance.between(0.07, 0.12),
    },
    balance: [exposure * (1 + warm), exposure, exposure * (1 - warm)],
    seed: shot.seed,
  });
  const jpeg = await sharp(pixels, {
    raw: { width: frame.width, height: frame.height, channels: 3 },
  })
    .resize(shot.width, shot.height, { kernel: 'linear', fit: 'fill' })
    .jpeg({ quality: 88, chromaSubsampling: '4:2:0' })
    .toBuffer();
  return { jpeg, places: placesOf(scene) };
}

/** Every part of the board file that is seen on this side and lies in the picture. */
function placesOf({ plan, face, frame }: Scene): Map<string, Point> {
  const places = new Map<string, Point>();
  const listed = new Set(plan.board.parts.map((part) => part.ref));
  for (const part of plan.parts) {
    const seen = part.side === face.side || part.pads.some((pad) => pad.drill > 0);
    if (!seen || !listed.has(part.ref)) continue;
    const p = shareOf(frame, face.flip(part.side === face.side ? bodyMiddle(part) : part.at));
    if (p.x > 0.02 && p.x < 0.98 && p.y > 0.02 && p.y < 0.98) places.set(part.ref, p);
  }
  return places;
}
