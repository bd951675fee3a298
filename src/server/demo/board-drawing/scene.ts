/** All that is in front of the camera: one side of a board, how its parts are worn, what is framed. */
import { chanceFrom, type Chance } from '../chance';
import type { Brush, Wear } from './bodies/brush';
import type { Face } from './face';
import type { Frame } from './frame';
import { at, turned } from './geometry';
import type { Paints } from './paint';
import { seedOf, type Plan } from './plan';
import type { Part } from './types';

export type Scene = {
  plan: Plan;
  face: Face;
  frame: Frame;
  wear: ReadonlyMap<string, Wear>;
  paints: Paints;
};

/** The camera hangs this many picture widths above the board. */
const CAMERA_RISE = 2.4;

export const chanceOf = (part: Part): Chance =>
  chanceFrom(seedOf(part.ref) + Math.round(part.at.x * 8));

/** The brush a part is drawn with. */
export function brushFor({ face, frame, wear, paints }: Scene, part: Part): Brush {
  const rise = (frame.width / frame.scale) * CAMERA_RISE;
  const p = face.flip(part.at);
  const lean = at((p.x - frame.middle.x) / rise, (p.y - frame.middle.y) / rise);
  return {
    paints,
    chance: chanceOf(part),
    turn: part.turn,
    lean: turned(lean, -part.turn),
    wear: wear.get(part.ref) ?? 'good',
  };
}
