/** A crystal in its can, a sounder, a row of pins. */
import { at, num, times } from '../geometry';
import { lettered } from '../lettering';
import { lit } from '../paint';
import type { Body } from '../types';
import { circle, ellipsePath, line, moved, path, rect, type Brush } from './brush';
import { walls } from './tall';

type Crystal = Extract<Body, { look: 'crystal' }>;

export function drawCrystal({ length, width, print }: Crystal, brush: Brush): string {
  const r = width / 2;
  const rim = `M${num(-length / 2 + r)} ${num(-r)}h${num(length - width)}a${num(r)} ${num(r)} 0 0 1 0 ${num(width)}h${num(-(length - width))}a${num(r)} ${num(r)} 0 0 1 0 ${num(-width)}z`;
  return [
    path(rim, '#8d9092'),
    path(
      rim,
      brush.paints.cylinder({ colour: '#b4b7b8', gloss: 0.5, spread: 0.22 }, brush.turn, r),
      'transform="scale(.93 .86)"',
    ),
    lettered(print, { x: 0, y: 0, height: 1.25, colour: '#54585a', opacity: 0.75 }),
  ].join('');
}

/** A sounder: a black drum with its hole. */
export function drawBuzzer(diameter: number, brush: Brush): string {
  const r = diameter / 2;
  const top = times(brush.lean, 8);
  const wall = [0, 0.25, 0.5, 0.75].map((k) =>
    circle(top.x * k, top.y * k, r, lit('#242528', 0.5 + k * 0.3)),
  );
  const face = [
    circle(
      0,
      0,
      r,
      brush.paints.dome({ colour: '#2c2d30', gloss: 0.3, spread: 0.2 }, brush.turn, r, 0.85),
    ),
    circle(0, 0, r * 0.88, brush.paints.plane('#2a2b2e', brush.turn, 0.22)),
    circle(0, 0, r * 0.2, '#070707'),
    path(
      ellipsePath(0.05, 0.07, r * 0.2, r * 0.2),
      'none',
      'stroke="#6d6f73" stroke-opacity=".5" stroke-width=".1"',
    ),
    lettered('+', { x: r * 0.6, y: 0, height: 1.2, colour: '#8b8e91', opacity: 0.7 }),
  ];
  return wall.join('') + moved(face.join(''), top.x, top.y);
}

/** A row of square gilt pins in black plastic. */
export function drawHeader(pins: number, brush: Brush): string {
  const wide = pins * 2.54;
  const low = times(brush.lean, 2.5);
  const high = times(brush.lean, 8.5);
  const posts = Array.from({ length: pins }, (_, i) => {
    const x = (i - (pins - 1) / 2) * 2.54;
    const foot = at(x + low.x, low.y);
    const tip = at(x + high.x, high.y);
    return (
      line(
        `M${num(foot.x)} ${num(foot.y)}L${num(tip.x)} ${num(tip.y)}`,
        '#8a6f33',
        0.64,
        'style="stroke-linecap:butt"',
      ) +
      rect(tip.x - 0.34, tip.y - 0.34, 0.68, 0.68, '#ddc27c', 'rx=".1"') +
      rect(tip.x - 0.2, tip.y - 0.24, 0.28, 0.28, '#fff4d0', 'fill-opacity=".8"')
    );
  });
  const block = rect(
    -wide / 2 + low.x,
    -1.25 + low.y,
    wide,
    2.5,
    brush.paints.plane('#26272a', brush.turn, 0.3),
    'rx=".2"',
  );
  return walls(wide / 2, 1.25, low, '#26272a', brush.turn) + block + posts.join('');
}
