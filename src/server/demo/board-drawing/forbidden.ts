/** Where on a floor no part may stand. */
import type { Box, Point } from './geometry';
import { goesThrough } from './footprint';
import type { Floor } from './floors/floor';
import type { Part } from './types';

const around = ({ x, y }: Point, r: number): Box => ({
  x0: x - r,
  y0: y - r,
  x1: x + r,
  y1: y + r,
});

/** Areas the part may not cover: screws, slots, switch, display and its lines, the board's name. */
export function forbidden(floor: Floor, part: Part): Box[] {
  const { wafer, display, brain, print } = floor;
  const boxes = floor.screws.map((screw) => around(screw, 4));
  for (const [p, q, width] of floor.slots)
    boxes.push({
      x0: Math.min(p.x, q.x) - width,
      y0: Math.min(p.y, q.y) - width,
      x1: Math.max(p.x, q.x) + width,
      y1: Math.max(p.y, q.y) + width,
    });
  for (const { at: jack } of floor.jacks)
    boxes.push({ x0: jack.x - 5, y0: jack.y - 9.4, x1: jack.x + 5, y1: jack.y });
  // Wires lead off over the board's edge.
  for (const { at: end, turn, ends } of floor.wires) {
    const y = ends.length * 3.5;
    const [x0, x1] = turn === 180 ? [0, end.x] : [end.x, floor.width];
    boxes.push({ x0, y0: end.y - y, x1, y1: end.y + y });
  }
  if (wafer && goesThrough(part)) boxes.push(around(wafer.at, wafer.radius + 0.5));
  else if (wafer?.kind === 'rotary') boxes.push(around(wafer.at, wafer.radius * 0.3));
  if (display) {
    const { x, y0, y1 } = display;
    boxes.push({ x0: x - 5, y0: y0 - 2, x1: x + 4, y1: y1 + 2 });
    if (brain) boxes.push({ ...around(brain.at, brain.size / 2 + 3), x1: x });
  }
  const half = Math.max(...print.lines.map((line) => line.length)) * 0.95;
  boxes.push({
    x0: print.at.x - half,
    y0: print.at.y - 1.6,
    x1: print.at.x + half,
    y1: print.at.y + 1.6,
  });
  return boxes;
}
