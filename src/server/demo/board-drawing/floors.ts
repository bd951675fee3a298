/** The floor of each demo board: its outline and the things that cannot be moved. */
import { at, inside, type Point } from './geometry';
import type { Mask } from './types';

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
function rounded(corners: readonly Point[], radius: number): Point[] {
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

const polygon = (...flat: number[]): Point[] =>
  Array.from({ length: flat.length / 2 }, (_, i) => at(flat[i * 2] ?? 0, flat[i * 2 + 1] ?? 0));

const LB_40: Floor = {
  seed: 4,
  width: 146,
  height: 92,
  outline: rounded(
    polygon(
      0,
      4,
      4,
      0,
      50,
      0,
      52,
      3,
      60,
      3,
      62,
      0,
      142,
      0,
      146,
      4,
      146,
      88,
      142,
      92,
      62,
      92,
      60,
      89,
      52,
      89,
      50,
      92,
      4,
      92,
      0,
      88,
    ),
    1.4,
  ),
  slots: [
    [at(2.5, 25.5), at(17, 25.5), 1.6],
    [at(2.5, 46), at(14, 46), 1.6],
    [at(2.5, 66.5), at(17, 66.5), 1.6],
  ],
  screws: [at(22, 4.6), at(22, 87.4), at(110, 4.6), at(110, 87.4)],
  jacks: [
    { net: 'V', at: at(10.5, 15), print: 'V Ω' },
    { net: 'COM', at: at(10.5, 35.5), print: 'COM' },
    { net: 'MA', at: at(10.5, 56.5), print: 'mA' },
    { net: 'A', at: at(10.5, 77), print: '10A' },
  ],
  wires: [],
  fixed: {},
  wafer: { at: at(89, 46), radius: 22, kind: 'rotary' },
  brain: {
    at: at(124, 32),
    size: 14,
    legs: 25,
    blob: false,
    nets: ['IN'],
    print: ['HL4012', '2611-C'],
  },
  display: { x: 142, y0: 14, y1: 78 },
  ground: 'COM',
  groundFrom: 67,
  mask: { bare: '#124a30', copper: '#236f48', edge: '#8d9a55', silk: '#d0d6cb' },
  backMask: null,
  plainFront: false,
  through: false,
  bench: 'mat',
  discs: { mov: '#1a4583', ptc: '#a67a35' },
  print: { at: at(89, 87), lines: ['LUMEFORD LB-40', 'REV C'] },
};

const LB_22: Floor = {
  seed: 20,
  width: 120,
  height: 70,
  outline: rounded(
    polygon(
      0,
      3,
      3,
      0,
      40,
      0,
      41,
      2.5,
      47,
      2.5,
      48,
      0,
      117,
      0,
      120,
      3,
      120,
      67,
      117,
      70,
      48,
      70,
      47,
      67.5,
      41,
      67.5,
      40,
      70,
      3,
      70,
      0,
      67,
    ),
    1.2,
  ),
  slots: [
    [at(2.5, 23.5), at(13, 23.5), 1.5],
    [at(2.5, 46.5), at(13, 46.5), 1.5],
  ],
  screws: [at(19, 4), at(19, 66), at(90, 4), at(90, 66)],
  jacks: [
    { net: 'V', at: at(9.5, 12.5), print: 'V Ω' },
    { net: 'COM', at: at(9.5, 35), print: 'COM' },
    { net: 'A', at: at(9.5, 57.5), print: '10A' },
  ],
  wires: [],
  fixed: {},
  wafer: { at: at(66, 35), radius: 20, kind: 'rotary' },
  brain: { at: at(99, 28), size: 12, legs: 16, blob: true, nets: ['IN'], print: [] },
  display: { x: 116, y0: 12, y1: 58 },
  ground: 'COM',
  groundFrom: 47,
  mask: { bare: '#143a66', copper: '#245b93', edge: '#9c9a6a', silk: '#cfd6d8' },
  backMask: null,
  plainFront: false,
  through: false,
  bench: 'beech',
  discs: { mov: '#c9931c', ptc: '#7f7d77' },
  print: { at: at(66, 64), lines: ['LB-22 B'] },
};

const CX_7: Floor = {
  seed: 23,
  width: 132,
  height: 60,
  outline: rounded(
    polygon(
      0,
      5,
      5,
      0,
      96,
      0,
      104,
      6,
      120,
      10,
      132,
      18,
      132,
      40,
      118,
      46,
      108,
      58,
      104,
      60,
      34,
      60,
      32,
      57,
      26,
      57,
      24,
      60,
      5,
      60,
      0,
      55,
    ),
    2.2,
  ),
  slots: [[at(2.5, 30), at(15, 30), 1.6]],
  screws: [at(22, 5), at(22, 52), at(98, 6), at(98, 54)],
  jacks: [
    { net: 'V', at: at(10.5, 14.5), print: 'V Ω' },
    { net: 'COM', at: at(10.5, 45.5), print: 'COM' },
  ],
  wires: [],
  fixed: { L1: { at: at(124, 29), turn: 0 }, NT1: { at: at(114, 17), turn: 0 } },
  wafer: { at: at(72, 46), radius: 14, kind: 'slide' },
  brain: {
    at: at(88, 24),
    size: 10,
    legs: 16,
    blob: false,
    nets: ['IN'],
    print: ['CV700', '2609'],
  },
  display: null,
  ground: 'COM',
  groundFrom: 52,
  mask: { bare: '#16272b', copper: '#2c4a54', edge: '#7f7b58', silk: '#ccd1d0' },
  backMask: null,
  plainFront: false,
  through: false,
  bench: 'beech',
  discs: { mov: '#1f4d8c', ptc: '#5f7f6a' },
  print: { at: at(52, 5.5), lines: ['CORVANE CX-7 A'] },
};

const IT_5: Floor = {
  seed: 1,
  width: 158,
  height: 104,
  outline: rounded(
    polygon(
      0,
      4,
      4,
      0,
      74,
      0,
      76,
      4,
      86,
      4,
      88,
      0,
      154,
      0,
      158,
      4,
      158,
      100,
      154,
      104,
      4,
      104,
      0,
      100,
    ),
    1.4,
  ),
  slots: [
    [at(3, 52), at(24, 52), 2],
    [at(84, 64), at(84, 99), 1.6],
  ],
  screws: [at(30, 5), at(153, 5), at(153, 99), at(30, 99)],
  jacks: [
    { net: 'LINE', at: at(12, 24), print: 'LINE' },
    { net: 'EARTH', at: at(12, 80), print: 'EARTH' },
  ],
  wires: [],
  fixed: {},
  wafer: null,
  brain: {
    at: at(124, 40),
    size: 14,
    legs: 20,
    blob: false,
    nets: ['SEN'],
    print: ['BR5014', '2548'],
  },
  display: { x: 154, y0: 18, y1: 84 },
  ground: 'EARTH',
  groundFrom: 88,
  mask: { bare: '#5c1a1b', copper: '#85302a', edge: '#8f7d50', silk: '#d8d4cc' },
  backMask: null,
  plainFront: false,
  through: false,
  bench: 'slate',
  discs: { mov: '#1c4a8b', ptc: '#3f4148' },
  print: { at: at(52, 99), lines: ['BRANDRETH IT-5 REV D'] },
};

const PS_3: Floor = {
  seed: 24,
  width: 150,
  height: 88,
  outline: rounded(polygon(0, 0, 150, 0, 150, 88, 0, 88), 1.2),
  slots: [[at(24, 3), at(24, 22), 2]],
  screws: [at(5, 5), at(145, 5), at(5, 83), at(145, 83)],
  jacks: [],
  wires: [
    {
      ref: 'J1',
      at: at(13, 10),
      turn: 180,
      ends: [
        { net: 'AC1', colour: '#6b3a1f' },
        { net: 'AC2', colour: '#2a5fb0' },
      ],
    },
    {
      ref: 'J2',
      at: at(140, 62),
      turn: 0,
      ends: [
        { net: 'OUT', colour: '#b3201f' },
        { net: 'SENSE', colour: '#1d1d20' },
      ],
    },
  ],
  fixed: { Q1: { at: at(98, 15), turn: 0 }, C1: { at: at(46, 56), turn: 0 } },
  wafer: null,
  brain: null,
  display: null,
  ground: '0V',
  groundFrom: 200,
  mask: { bare: '#b58a4c', copper: '#b58a4c', edge: '#8a6a3a', silk: '#e4e0d2' },
  backMask: { bare: '#3f5a2a', copper: '#57783a', edge: '#8a6a3a', silk: '#e4e0d2' },
  plainFront: true,
  through: true,
  bench: 'slate',
  discs: { mov: '#1c4a8b', ptc: '#3f4148' },
  print: { at: at(118, 84), lines: ['OSTREL PS-3'] },
};

const FLOORS: Readonly<Record<string, Floor>> = {
  'LB-40': LB_40,
  'LB-22': LB_22,
  'CX-7': CX_7,
  'IT-5': IT_5,
  'PS-3': PS_3,
};

/** @throws RangeError for a board no floor was drawn for. */
export function floorOf(code: string): Floor {
  const floor = FLOORS[code];
  if (!floor) throw new RangeError(`No floor is drawn for board ${code}.`);
  return floor;
}

export const onBoard = (floor: Floor, point: Point): boolean => inside(point, floor.outline);
