/** One side of a board as the camera sees it: everything in the coordinates of the picture, the back mirrored. */
import { at, type Point, type Side } from './geometry';
import { padsOf, type PlacedPad } from './footprint';
import type { Plan } from './plan';
import { layerOf, type Mask, type Part, type Track } from './types';

export type Face = {
  side: Side;
  width: number;
  height: number;
  outline: Point[];
  slots: [Point, Point, number][];
  screws: Point[];
  mask: Mask;
  tracks: Track[];
  vias: { net: string; at: Point }[];
  /** Pads with copper on this side. */
  pads: (PlacedPad & { part: Part })[];
  /** Parts whose bodies stand on this side. */
  parts: Part[];
  /** From here on there is a ground area, if there is one on this side. */
  ground: { net: string; from: number; to: number } | null;
  flip(point: Point): Point;
};

export function faceOf(plan: Plan, side: Side): Face {
  const { floor } = plan;
  const back = side === 'back';
  const flip = (p: Point): Point => (back ? at(floor.width - p.x, p.y) : p);
  const layer = layerOf(side);
  const bare = floor.plainFront && !back;
  const poured = !floor.plainFront && floor.groundFrom < floor.width;
  return {
    side,
    width: floor.width,
    height: floor.height,
    outline: floor.outline.map(flip),
    slots: floor.slots.map(([p, q, w]) => [flip(p), flip(q), w]),
    screws: floor.screws.map(flip),
    mask: back && floor.backMask ? floor.backMask : floor.mask,
    tracks: bare
      ? []
      : plan.tracks
          .filter((track) => track.layer === layer)
          .map((track) => ({ ...track, points: track.points.map(flip) })),
    vias: plan.vias.map((via) => ({ ...via, at: flip(via.at) })),
    pads: plan.parts.flatMap((part) =>
      padsOf(part)
        .filter((pad) => pad.drill > 0 || layerOf(part.side) === layer)
        .map((pad) => ({ ...pad, part, at: flip(pad.at) })),
    ),
    parts: plan.parts.filter((part) => part.side === side),
    ground: poured
      ? back
        ? { net: floor.ground, from: 0, to: floor.width - floor.groundFrom }
        : { net: floor.ground, from: floor.groundFrom, to: floor.width }
      : null,
    flip,
  };
}
