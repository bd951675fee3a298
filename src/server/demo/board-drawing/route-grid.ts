/** The grid tracks are laid on: two layers of cells, with what stands in a track's way. */
import { at, toSegment, type Point } from './geometry';
import type { Floor } from './floors/floor';
import { roomOn } from './room';
import type { Layer } from './types';

export const STEP = 0.635;

/** Copper or a hole: everything within `half` of the segment, on one layer or both. */
export type Thing = { net: string; p: Point; q: Point; half: number; layer: Layer | 'both' };

export class RouteGrid {
  readonly columns: number;
  readonly rows: number;
  readonly size: number;
  readonly things: Thing[] = [];
  /** Cells no copper may touch, for tracks of any net. */
  private readonly closed: Uint8Array;

  constructor(floor: Floor) {
    this.columns = Math.floor(floor.width / STEP) + 1;
    this.rows = Math.floor(floor.height / STEP) + 1;
    this.size = this.columns * this.rows;
    this.closed = new Uint8Array(this.size);
    const room = roomOn(floor);
    for (let cell = 0; cell < this.size; cell++) {
      const p = this.pointOf(cell);
      if (!room(p.x, p.y, 1.1)) this.closed[cell] = 1;
    }
    for (const screw of floor.screws) this.close(screw, screw, 3.8);
    for (const [p, q, width] of floor.slots) this.close(p, q, width / 2 + 0.9);
  }

  pointOf(cell: number): Point {
    return at((cell % this.columns) * STEP, Math.floor(cell / this.columns) * STEP);
  }

  cellAt({ x, y }: Point): number {
    const column = Math.max(0, Math.min(this.columns - 1, Math.round(x / STEP)));
    const row = Math.max(0, Math.min(this.rows - 1, Math.round(y / STEP)));
    return row * this.columns + column;
  }

  private close(p: Point, q: Point, reach: number): void {
    this.stamp(this.closed, 0, p, q, reach);
  }

  /** Marks the cells within `reach` of the segment, from the place `base` of a table on. */
  private stamp(table: Uint8Array, base: number, p: Point, q: Point, reach: number): void {
    const x0 = Math.max(0, Math.ceil((Math.min(p.x, q.x) - reach) / STEP));
    const x1 = Math.min(this.columns - 1, Math.floor((Math.max(p.x, q.x) + reach) / STEP));
    const y0 = Math.max(0, Math.ceil((Math.min(p.y, q.y) - reach) / STEP));
    const y1 = Math.min(this.rows - 1, Math.floor((Math.max(p.y, q.y) + reach) / STEP));
    for (let row = y0; row <= y1; row++)
      for (let column = x0; column <= x1; column++)
        if (toSegment(at(column * STEP, row * STEP), p, q) < reach)
          table[base + row * this.columns + column] = 1;
  }

  /** Where a track of this net and half width cannot run: both layers, one after the other. */
  blockedFor(net: string, half: number, clearance: (other: string) => number): Uint8Array {
    const table = new Uint8Array(this.size * 2);
    table.set(this.closed, 0);
    table.set(this.closed, this.size);
    for (const thing of this.things) {
      if (thing.net === net) continue;
      const reach = thing.half + half + clearance(thing.net);
      if (thing.layer !== 1) this.stamp(table, 0, thing.p, thing.q, reach);
      if (thing.layer !== 0) this.stamp(table, this.size, thing.p, thing.q, reach);
    }
    return table;
  }
}
