/** What a board has besides its input network: small parts round the chip, and a few large ones. */
import type { DemoBoard } from '../content';
import type { Chance } from '../chance';
import type { Floor } from './floors/floor';
import { axial, leaded, legged, sot23, surface, type Package } from './packages/pads';
import { stand } from './stand';
import type { Part } from './types';

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
