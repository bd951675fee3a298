/** All parts of a board: those of its board file, its jacks and wires, and the small fry around the chip. */
import type { DemoBoard } from '../content';
import type { Chance } from '../chance';
import { at, onCircle, plus, type Point } from './geometry';
import type { Floor } from './floors';
import { axial, leaded, legged, packageOf, sot23, surface, type Package } from './packages';
import type { Pad, Part } from './types';

const MIDDLE = at(0, 0);
const stand = (ref: string, packed: Package, more: Partial<Part> = {}): Part => ({
  ref,
  kind: null,
  side: 'front',
  at: MIDDLE,
  turn: 0,
  fixed: false,
  protection: false,
  aside: false,
  ...packed,
  ...more,
});

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

/** Refs that are not in the board file, counted up from 11. */
function freshRefs(board: DemoBoard) {
  const taken = new Set([...board.parts.map((p) => p.ref), 'U1']);
  return (letter: string): string => {
    let n = 11;
    while (taken.has(`${letter}${n}`)) n += 1;
    taken.add(`${letter}${n}`);
    return `${letter}${n}`;
  };
}

const CODES = ['1002', '4701', '1003', '2201', '000', '3301', '1001', '5602'];
const FILM = ['#c9a06a', '#8fb3d0', '#cfa876'];

/** Surface parts around the chip: `nets` are where its stubs end. */
export function smallFry(board: DemoBoard, floor: Floor, nets: string[], chance: Chance): Part[] {
  const fresh = freshRefs(board);
  const other = () => (chance.next() < 0.6 ? floor.ground : chance.pick(nets));
  return nets.map((net) => {
    const roll = chance.next();
    if (roll < 0.42) {
      const colour = chance.pick(['#b99a6c', '#c7ab7e', '#a98c63']);
      return stand(
        fresh('C'),
        surface(
          { look: 'chip-capacitor', length: 2, width: 1.25, colour },
          [net, other()],
          2,
          1.25,
        ),
      );
    }
    if (roll < 0.84) {
      const code = chance.pick(CODES);
      return stand(
        fresh('R'),
        surface({ look: 'chip-resistor', length: 2, width: 1.25, code }, [net, other()], 2, 1.25),
      );
    }
    return stand(fresh('Q'), sot23(chance.pick(['K2', '1P', 'A6']), [net, floor.ground]));
  });
}

/** The larger things every board has besides its input network. */
export function companions(board: DemoBoard, floor: Floor, chance: Chance): Part[] {
  const fresh = freshRefs(board);
  const can = (diameter: number, tall: number, print: string[]) =>
    leaded(
      { look: 'can', diameter, tall, sleeve: '#20242c', print },
      [null, floor.ground],
      diameter * 0.4,
      [diameter + 1.4, diameter + 1.4, tall],
    );
  if (!floor.through) {
    const crystal: Package = {
      body: { look: 'crystal', length: 10.8, width: 4.4, print: '4.000' },
      ...leadsOf(4.88),
      width: 12,
      height: 5.6,
      tall: 3.6,
      remark: '',
    };
    const more = floor.display ? [stand(fresh('C'), can(6.3, 7, ['47', '16V']))] : [];
    const buzzer: Package = {
      ...leaded({ look: 'buzzer', diameter: 12 }, [null, floor.ground], 6.5, [13, 13, 8]),
    };
    const header: Package = {
      body: { look: 'header', pins: 5 },
      pads: Array.from({ length: 5 }, (_, i) => ({
        x: (i - 2) * 2.54,
        y: 0,
        net: null,
        width: 1.7,
        height: 1.7,
        round: i > 0,
        drill: 0.9,
      })),
      width: 14,
      height: 3.4,
      tall: 7,
      remark: '',
    };
    const winding: Package = {
      ...leaded({ look: 'winding', width: 22, height: 18 }, [null, 'HV'], 16, [24, 20, 16], 2.4),
    };
    return [
      stand('Y1', crystal, { aside: true }),
      stand('BZ1', buzzer, { aside: true }),
      stand('CN1', header, { aside: true }),
      ...more,
      ...(board.code === 'IT-5'
        ? [stand('T1', winding), stand(fresh('C'), can(8, 11, ['220', '25V']))]
        : []),
    ];
  }
  const film = (a: string | null, b: string | null) =>
    stand(
      fresh('R'),
      axial(6.4, 2.4, chance.pick(FILM), [a, b], 11.43, {
        bands: chance.pick([
          ['brown', 'black', 'red', 'gold'],
          ['yellow', 'violet', 'red', 'gold'],
          ['red', 'red', 'orange', 'gold'],
        ]),
      }),
    );
  const dip = (ref: string, nets: readonly [string, string]) => {
    const packed = legged(8, 9.4, 6.4, ['OP5822', '2519'], nets);
    const pads = packed.pads.map((pad) => ({
      ...pad,
      x: pad.x * 2,
      y: Math.sign(pad.y) * 3.81,
      width: 1.7,
      height: 1.7,
      round: true,
      drill: 0.8,
    }));
    return stand(ref, { ...packed, pads, width: 11, height: 10.4, tall: 4 });
  };
  return [
    dip('U1', ['FB', 'D']),
    dip('U2', ['E', '0V']),
    film('D', 'BASE'),
    film('E', 'FB'),
    film('RAW', 'E'),
    stand(fresh('C'), can(10, 16, ['220µ', '50V'])),
    stand(fresh('C'), can(6.3, 11, ['10µ', '63V'])),
  ];
}

const leadsOf = (pitch: number) => ({
  pads: leaded({ look: 'bead', diameter: 1 }, [null, null], pitch, [1, 1, 1], 1.6).pads,
});

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

export const middleOf = (part: Part, offset: Point): Point => plus(part.at, offset);
