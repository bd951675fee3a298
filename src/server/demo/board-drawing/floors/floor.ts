/** What a floor says: a board's outline and the things that cannot be moved. */
import { at, type Point } from '../geometry';
import type { Mask } from '../types';

export type Floor = {
  /** Chooses among the layouts the search could find. */
  seed: number;
  width: number;
  height: number;
  outline: Point[];
  /** Slots sawn for creepage: from, to, width. */
  slots: [Point, Point, number][];
  screws: Point[];
  jacks: { net: string; at: Point; print: string }[];
  /** Wires soldered in that leave the board. */
  wires: { ref: string; at: Point; turn: number; ends: { net: string; colour: string }[] }[];
  /** Parts that stand where they stand. */
  fixed: Readonly<Record<string, { at: Point; turn: number }>>;
  /** Where the switch is: its contacts are gold on the back. */
  wafer: { at: Point; radius: number; kind: 'rotary' | 'slide' } | null;
  brain: {
    at: Point;
    size: number;
    legs: number;
    blob: boolean;
    nets: string[];
    print: string[];
  } | null;
  /** The row of gold pads the display stands on, from top to bottom along the right edge of the back. */
  display: { x: number; y0: number; y1: number } | null;
  ground: string;
  /** Left of this there is high voltage and no ground area. */
  groundFrom: number;
  mask: Mask;
  backMask: Mask | null;
  /** A single-sided board: no copper in front. */
  plainFront: boolean;
  through: boolean;
  bench: 'mat' | 'beech' | 'slate';
  discs: { mov: string; ptc: string };
  print: { at: Point; lines: string[] };
};

/** The polygon with its corners rounded off. */
export function rounded(corners: readonly Point[], radius: number): Point[] {
  return corners.flatMap((corner, i) => {
    const before = corners[(i + corners.length - 1) % corners.length] ?? corner;
    const after = corners[(i + 1) % corners.length] ?? corner;
    const reach = (to: Point) => {
      const length = Math.hypot(to.x - corner.x, to.y - corner.y) || 1;
      const share = Math.min(0.5, radius / length);
      return at(corner.x + (to.x - corner.x) * share, corner.y + (to.y - corner.y) * share);
    };
    const [p, q] = [reach(before), reach(after)];
    return [0, 0.2, 0.4, 0.6, 0.8, 1].map((t) => {
      const k = (1 - t) * (1 - t);
      const l = 2 * t * (1 - t);
      return at(k * p.x + l * corner.x + t * t * q.x, k * p.y + l * corner.y + t * t * q.y);
    });
  });
}

export const polygon = (...flat: number[]): Point[] =>
  Array.from({ length: flat.length / 2 }, (_, i) => at(flat[i * 2] ?? 0, flat[i * 2 + 1] ?? 0));
