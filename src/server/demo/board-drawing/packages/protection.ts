/** Fuses, varistors, thermistors, clamps. */
import { discFoot } from '../bodies/disc';
import type { Floor } from '../floors/floor';
import { digitsOf } from '../markings';
import type { Body } from '../types';
import { hole, leaded, sot23, type BoardPart, type Nets, type Package } from './pads';

export function fuse(value: string, nets: Nets): Package {
  const amps = parseFloat(value) * (value.includes(' mA ') ? 0.001 : 1);
  const high = value.includes('1000 V');
  const print = value.replace(/ (m?A|V)/g, '$1').replace(' HRC', '');
  const glass = !value.includes('HRC');
  const [length, diameter] = glass
    ? [20, 5.2]
    : high && amps !== 0.5
      ? [amps > 5 ? 38 : 35, 10.3]
      : [32, 6.35];
  const grip = length - (glass ? 5.4 : 9);
  const pads = [-1, 1].flatMap((end) => [
    hole((end * grip) / 2, -diameter * 0.3, nets[end < 0 ? 0 : 1], 2.6, 1.3),
    hole((end * grip) / 2, diameter * 0.3, nets[end < 0 ? 0 : 1], 2.6, 1.3),
  ]);
  const body: Body = { look: 'fuse', length, diameter, glass, print };
  return {
    body,
    pads,
    width: length + 2.5,
    height: diameter + 3,
    tall: diameter + 2,
    remark: print,
  };
}

/** A disc bent over: its leads come up at its foot. */
const lying = (packed: Package, diameter: number): Package => ({
  ...packed,
  pads: packed.pads.map((pad) => ({ ...pad, y: discFoot(diameter) })),
});

export function disc(part: BoardPart, nets: Nets, floor: Floor): Package {
  if (part.kind === 'mov') {
    const diameter = /^\d\d/.test(part.value) ? Number(part.value.slice(0, 2)) + 2.2 : 12;
    const wet: Body = {
      look: 'disc',
      diameter,
      thick: 4.6,
      colour: floor.discs.mov,
      print: [part.value.slice(0, 3), part.value.slice(3)],
      ink: floor.discs.mov > '#8' ? '#2a2418' : '#e9edf2',
    };
    return lying(
      leaded(wet, nets, diameter > 10 ? 7.5 : 5, [diameter + 1, diameter + 3.6, 7]),
      diameter,
    );
  }
  const body: Body = {
    look: 'disc',
    diameter: 9.4,
    thick: 4,
    colour: floor.discs.ptc,
    print: ['PTC', digitsOf(part.ohms ?? 0, 2)],
    ink: '#20201f',
  };
  return lying(leaded(body, nets, 5, [10.4, 13, 6]), 9.4);
}

export function clamp(value: string, nets: Nets): Package {
  if (!value.includes('pass')) return sot23('K6', nets);
  const pads = [
    hole(-5.45, 11.4, nets[0], 2.8, 1.4),
    hole(0, 11.4, 'BASE', 2.8, 1.4),
    hole(5.45, 11.4, nets[1], 2.8, 1.4),
  ];
  return {
    body: { look: 'heatsink', width: 62, height: 18 },
    pads,
    width: 64,
    height: 26,
    tall: 25,
    remark: '',
  };
}
