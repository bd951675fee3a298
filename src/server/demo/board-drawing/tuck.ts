/** Puts the small parts around the chip into the gaps that are left. */
import { at, distance, overlap, type Box, type Point } from './geometry';
import type { Floor } from './floors/floor';
import { boxOf } from './footprint';
import { forbidden } from './forbidden';
import { roomOn } from './room';
import type { Part } from './types';

const GRID = 1.27;
const REACH = 10;

/** Places on the grid around a point, nearest first. */
function spotsAround(wish: Point): Point[] {
  const spots: Point[] = [];
  for (let i = -REACH; i <= REACH; i++)
    for (let j = -REACH; j <= REACH; j++)
      spots.push(
        at((Math.round(wish.x / GRID) + i) * GRID, (Math.round(wish.y / GRID) + j) * GRID),
      );
  const far = new Map(spots.map((spot) => [spot, distance(spot, wish)]));
  const farOf = (spot: Point) => far.get(spot) ?? 0;
  return spots.filter((p) => farOf(p) > 1.6 && farOf(p) < 13).sort((p, q) => farOf(p) - farOf(q));
}

/**
 * The parts with those added for which there is room near the place they are wanted at; `busy` points (vias, ends of
 * lines) are kept free.
 */
export function tucked(
  parts: readonly Part[],
  wanted: readonly { part: Part; at: Point }[],
  floor: Floor,
  busy: readonly Point[],
): Part[] {
  const room = roomOn(floor);
  const chip = floor.brain
    ? [{ at: floor.brain.at, width: floor.brain.size + 6, height: floor.brain.size + 6 }]
    : [];
  const boxes: Box[] = [
    ...parts.filter((p) => p.side === 'front' && p.ref !== 'U1').map((p) => boxOf(p, 0.4)),
    ...chip.map(({ at: c, width: w, height: h }) => ({
      x0: c.x - w / 2,
      y0: c.y - h / 2,
      x1: c.x + w / 2,
      y1: c.y + h / 2,
    })),
  ];
  const added: Part[] = [];
  for (const { part, at: wish } of wanted) {
    const shut = forbidden(floor, part);
    const fits = (tried: Part): boolean => {
      const box = boxOf(tried, 0.5);
      return (
        room(box.x0, box.y0) &&
        room(box.x1, box.y1) &&
        !shut.some((other) => overlap(box, other) > 0) &&
        !boxes.some((other) => overlap(box, other) > 0) &&
        !busy.some((p) => p.x > box.x0 && p.x < box.x1 && p.y > box.y0 && p.y < box.y1)
      );
    };
    const found = spotsAround(wish)
      .flatMap((spot) => [0, 90].map((turn) => ({ ...part, at: spot, turn })))
      .find(fits);
    if (!found) continue;
    added.push(found);
    boxes.push(boxOf(found, 0.4));
  }
  return [...parts, ...added];
}
