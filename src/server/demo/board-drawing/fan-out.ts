/** The lines that leave the chip: to the display, to the nets of the network, and stubs that small parts hang on. */
import type { Chance } from '../chance';
import { at, plus, turned, type Point } from './geometry';
import type { Floor } from './floors/floor';
import type { Track, Via } from './types';

const THIN = 0.22;

export type FanOut = {
  tracks: Track[];
  vias: Via[];
  /** Where small parts are wanted, by the net they hang on. */
  ends: { net: string; at: Point }[];
};

/** Distance between neighbouring legs. */
const legPitch = (size: number, legs: number) => (size * 0.86) / (legs - 1);

/** The tip of a leg: sides 0 left, 1 top, 2 right, 3 bottom, counted along the side. */
function legTip(floor: Floor, side: number, index: number, out = 1.5): Point {
  const { brain } = floor;
  if (!brain) return at(0, 0);
  const along = (index - (brain.legs - 1) / 2) * legPitch(brain.size, brain.legs);
  return plus(brain.at, turned(at(-brain.size / 2 - out, -along), side * 90));
}

function toDisplay(floor: Floor, fan: FanOut): void {
  const { brain, display } = floor;
  if (!brain || !display) return;
  const { legs } = brain;
  const middle = (legs - 1) / 2;
  const x = display.x - 5.2;
  const step = (display.y1 - display.y0) / (legs - 1);
  const room = x - 1.2 - legTip(floor, 2, 0).x;
  const lane = Math.min(0.55, (room - 1) / (middle + 1));
  for (let i = 0; i < legs; i++) {
    const from = legTip(floor, 2, i);
    const to = at(x, display.y0 + i * step);
    // The outermost line turns off first, so that none crosses another.
    const turn = from.x + 0.8 + (middle - Math.abs(i - middle)) * lane;
    const rise = to.y - from.y;
    const cut = Math.min(lane * 0.9, Math.abs(rise) / 2) * Math.sign(rise);
    const net = `display-${i}`;
    const points = [
      from,
      at(turn - Math.abs(cut), from.y),
      at(turn, from.y + cut),
      at(turn, to.y - cut),
      at(turn + Math.abs(cut), to.y),
      to,
    ];
    fan.tracks.push({ net, layer: 0, width: THIN, points });
    fan.vias.push({ net, at: to });
    fan.tracks.push({ net, layer: 1, width: THIN * 1.4, points: [to, at(display.x, to.y)] });
  }
}

/** From the legs to the left to the points where the nets of the network come in. */
function toNets(floor: Floor, fan: FanOut): Set<number> {
  const { brain } = floor;
  const used = new Set<number>();
  if (!brain) return used;
  for (const [i, net] of brain.nets.entries()) {
    const goal = at(
      brain.at.x - brain.size / 2 - 3.6,
      brain.at.y + (i - (brain.nets.length - 1) / 2) * 3.81 + 1,
    );
    const index = Math.round(
      (brain.at.y - goal.y) / legPitch(brain.size, brain.legs) + (brain.legs - 1) / 2,
    );
    const from = legTip(floor, 0, index);
    const drop = goal.y - from.y;
    used.add(index);
    fan.tracks.push({
      net,
      layer: 0,
      width: THIN,
      points: [from, at(goal.x + Math.abs(drop), from.y), goal],
    });
  }
  return used;
}

function stubs(floor: Floor, fan: FanOut, used: Set<number>, chance: Chance): void {
  const { brain, display } = floor;
  if (!brain) return;
  const sides = display ? [0, 1, 3] : [0, 1, 2, 3];
  for (const side of sides)
    for (let i = 0; i < brain.legs; i++) {
      if (side === 0 && [i - 1, i, i + 1, i + 2].some((n) => used.has(n))) continue;
      if (i % 3 === 2 && chance.next() < 0.8) continue;
      const long = i % 2 === 0 ? chance.between(2.2, 3) : chance.between(0.9, 1.5);
      const from = legTip(floor, side, i);
      const to = legTip(floor, side, i, 1.5 + long);
      const net = `leg-${side}-${i}`;
      fan.tracks.push({ net, layer: 0, width: THIN, points: [from, to] });
      if (i % 2 === 0 && i % 4 === 0) fan.ends.push({ net, at: to });
      else fan.vias.push({ net, at: to });
    }
}

export function fanOut(floor: Floor, chance: Chance): FanOut {
  const fan: FanOut = { tracks: [], vias: [], ends: [] };
  toDisplay(floor, fan);
  stubs(floor, fan, toNets(floor, fan), chance);
  return fan;
}
