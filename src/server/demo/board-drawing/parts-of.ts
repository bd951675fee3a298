/** All parts of a board: those of its board file, its jacks and wires, and the small fry around the chip. */
import type { DemoBoard } from '../content';
import type { Chance } from '../chance';
import { at, onCircle, type Point } from './geometry';
import type { Floor } from './floors/floor';
import { companions } from './companions';
import { packageOf } from './packages';
import { MIDDLE, stand } from './stand';
import type { Pad, Part } from './types';

/** Where a contact of the switch lies: the middle, and from there the two lands. */
function contactPlaces(floor: Floor, count: number): { at: Point; lands: [Point, Point] }[] {
  const { wafer } = floor;
  if (!wafer) return [];
  return Array.from({ length: count }, (_, i) => {
    if (wafer.kind === 'slide') {
      const middle = at(wafer.at.x + (i - (count - 1) / 2) * 6.2, wafer.at.y);
      return { at: middle, lands: [at(0, -2.2), at(0, 2.2)] };
    }
    const angle = 180 + (i - (count - 1) / 2) * 34;
    const [outer, inner] = [wafer.radius * 0.86, wafer.radius * 0.66];
    const middle = onCircle(wafer.at, (outer + inner) / 2, angle);
    const half = onCircle(MIDDLE, (outer - inner) / 2, angle);
    return { at: middle, lands: [half, at(-half.x, -half.y)] };
  });
}

function asContact(part: Part, place: { at: Point; lands: [Point, Point] }): Part {
  const pads = part.pads.map((pad, i): Pad => ({ ...pad, ...(place.lands[i] ?? MIDDLE) }));
  return { ...part, pads, at: place.at, side: 'back', fixed: true };
}

/** The parts of the board file, in its order. */
function listed(board: DemoBoard, floor: Floor): Part[] {
  const onWafer = (p: DemoBoard['parts'][number]) => p.kind === 'contact' && floor.wafer !== null;
  const places = contactPlaces(floor, board.parts.filter(onWafer).length);
  return board.parts.map((part) => {
    const fixed = floor.fixed[part.ref];
    const made = stand(part.ref, packageOf(part, floor), {
      kind: part.kind,
      protection: part.protection && part.kind !== 'zener' && part.kind !== 'clamp',
    });
    const place = onWafer(part) ? places.shift() : undefined;
    if (place) return asContact(made, place);
    return fixed ? { ...made, ...fixed, fixed: true } : made;
  });
}

function jacks(floor: Floor): Part[] {
  return floor.jacks.map(({ net, at: place, print }) => {
    const pad: Pad = { x: 0, y: 0, net, width: 13, height: 13, round: true, drill: 8 };
    const body = { look: 'jack', diameter: 8.6 } as const;
    const packed = { body, pads: [pad], width: 15, height: 15, tall: 6, remark: print };
    return stand(`J-${net}`, packed, { at: place, fixed: true });
  });
}

function wires(floor: Floor): Part[] {
  return floor.wires.map(({ ref, at: place, turn, ends }) => {
    const spacing = 7;
    const pads = ends.map(({ net }, i): Pad => ({
      x: 0,
      y: (i - (ends.length - 1) / 2) * spacing,
      net,
      width: 3.4,
      height: 3.4,
      round: true,
      drill: 1.8,
    }));
    const colours = ends.map((end) => end.colour);
    const body = { look: 'wires', colours, spacing, reach: 40 } as const;
    const packed = { body, pads, width: 6, height: spacing * ends.length, tall: 3, remark: '' };
    return stand(ref, packed, { at: place, turn, fixed: true });
  });
}

/** The chip; the nets of the network come out at points to its left, so that tracks find them. */
function brain(floor: Floor): Part[] {
  const { brain } = floor;
  if (!brain) return [];
  const { size, legs, blob, nets, print } = brain;
  const pads = nets.map((net, i): Pad => ({
    x: -size / 2 - 3.6,
    y: (i - (nets.length - 1) / 2) * 3.81 + 1,
    net,
    width: 0.5,
    height: 0.5,
    round: true,
    drill: 0,
  }));
  const body = blob
    ? ({ look: 'blob', diameter: size } as const)
    : ({ look: 'legged', width: size, height: size, legs, fourSides: true, print } as const);
  const packed = { body, pads, width: size + 7, height: size + 7, tall: 1.8, remark: '' };
  return [stand('U1', packed, { at: brain.at, fixed: true })];
}

/** Everything that is placed in the first round. */
export function mainParts(board: DemoBoard, floor: Floor, chance: Chance): Part[] {
  return [
    ...jacks(floor),
    ...wires(floor),
    ...brain(floor),
    ...listed(board, floor),
    ...companions(board, floor, chance),
  ];
}
