/** A board as it was laid out: parts in their places, copper between them. Made once for each board. */
import type { DemoBoard } from '../content';
import { chanceFrom } from '../chance';
import { fanOut } from './fan-out';
import { floorOf } from './floors';
import type { Floor } from './floors/floor';
import { smallFry } from './companions';
import { mainParts } from './parts-of';
import { placed } from './place';
import type { Copper } from './laid-copper';
import { routed } from './route';
import { tucked } from './tuck';
import type { Part } from './types';

export type Plan = Copper & { board: DemoBoard; floor: Floor; parts: Part[] };

const plans = new WeakMap<DemoBoard, Plan>();

export const seedOf = (text: string): number =>
  [...text].reduce((sum, letter) => (sum * 31 + letter.charCodeAt(0)) >>> 0, 7);

/** Lays a board out; the same board file gives the same board. */
export function planOf(board: DemoBoard): Plan {
  const known = plans.get(board);
  if (known) return known;
  const floor = floorOf(board.code);
  const chance = chanceFrom(seedOf(board.code) + floor.seed);
  const main = placed(mainParts(board, floor, chance), floor, chance);
  const fan = fanOut(floor, chance);
  const nets = fan.ends.map((end) => end.net);
  const wanted = smallFry(board, floor, nets, chance).flatMap((part, i) => {
    const end = fan.ends[i];
    return end ? [{ part, at: end.at }] : [];
  });
  const busy = [...fan.vias, ...fan.ends].map((mark) => mark.at);
  const parts = tucked(main, wanted, floor, busy);
  const plan = { board, floor, parts, ...routed(parts, fan, floor) };
  plans.set(board, plan);
  return plan;
}
