/** Which body and pads a part of a board file has. */
import type { DemoBoard } from '../content';
import type { Floor } from './floors';
import { discFoot } from './bodies/disc';
import { bandsOf, digitsOf } from './markings';
import type { Body, Pad, Part } from './types';

type BoardPart = DemoBoard['parts'][number];
export type Package = Pick<Part, 'body' | 'pads' | 'width' | 'height' | 'tall' | 'remark'>;

const hole = (x: number, y: number, net: string | null, width: number, drill: number): Pad => ({
  x,
  y,
  net,
  width,
  height: width,
  round: true,
  drill,
});
const land = (x: number, y: number, net: string | null, width: number, height: number): Pad => ({
  x,
  y,
  net,
  width,
  height,
  round: false,
  drill: 0,
});

type Nets = readonly [string | null, string | null];

/** Two leads through the board, this far apart. */
export function leaded(
  body: Body,
  nets: Nets,
  pitch: number,
  size: [number, number, number],
  pad = 2.2,
): Package {
  const drill = pad * 0.45;
  return {
    body,
    pads: [hole(-pitch / 2, 0, nets[0], pad, drill), hole(pitch / 2, 0, nets[1], pad, drill)],
    width: size[0],
    height: size[1],
    tall: size[2],
    remark: '',
  };
}

/** Two lands on the surface. */
export function surface(body: Body, nets: Nets, length: number, width: number): Package {
  const land_ = length * 0.42;
  const x = length / 2 + land_ * 0.12;
  return {
    body,
    pads: [land(-x, 0, nets[0], land_, width * 1.12), land(x, 0, nets[1], land_, width * 1.12)],
    width: length * 1.65,
    height: width * 1.5,
    tall: width * 0.45,
    remark: '',
  };
}

const AXIAL = {
  bands: [] as string[],
  print: '',
  ink: '#222222',
  waist: true,
  ends: 'none',
} as const;

export function axial(
  length: number,
  diameter: number,
  colour: string,
  nets: Nets,
  pitch: number,
  more: Partial<Extract<Body, { look: 'axial' }>> = {},
): Package {
  const body: Body = { look: 'axial', length, diameter, colour, ...AXIAL, ...more };
  return leaded(
    body,
    nets,
    pitch,
    [pitch + 2.6, diameter + 1, diameter],
    Math.max(1.9, diameter * 0.5),
  );
}

function resistor(part: BoardPart, nets: Nets, through: boolean): Package {
  const { value, ohms, tolerance } = part;
  const bands = ohms && tolerance ? bandsOf(ohms, tolerance) : [];
  if (value.includes('kV')) return axial(13, 4.2, '#7b4a3a', nets, 20.32, { bands, waist: false });
  if (value.includes('high voltage')) return axial(9.6, 3.4, '#87aecb', nets, 15.24, { bands });
  if (/\d W/.test(value))
    return axial(15, 5.2, '#8c8f90', nets, 22.86, {
      waist: false,
      print: digitsOf(ohms ?? 0, 2) + 'J 3W',
    });
  if (value.includes('fusible')) return axial(6.6, 2.5, '#8fb09a', nets, 11.43, { bands });
  if ((tolerance ?? 0) >= 0.05) return axial(6.4, 2.4, '#cfa876', nets, 11.43, { bands });
  if (through) return axial(6.4, 2.4, '#8fb3d0', nets, 11.43, { bands });
  if (part.protection)
    return surface(
      { look: 'melf', length: 5.9, diameter: 2.2, colour: '#9dbcd2', bands },
      nets,
      5.9,
      2.2,
    );
  return surface(
    { look: 'chip-resistor', length: 3.2, width: 1.6, code: digitsOf(ohms ?? 0, 3) },
    nets,
    3.2,
    1.6,
  );
}

function fuse(value: string, nets: Nets): Package {
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

function disc(part: BoardPart, nets: Nets, floor: Floor): Package {
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

function capacitor(value: string, nets: Nets): Package {
  const [, first = '', second = ''] = /^(\S+ \S+) (.+)$/.exec(value) ?? [];
  if (value.includes('µF'))
    return leaded(
      {
        look: 'can',
        diameter: 25,
        tall: 40,
        sleeve: '#23304f',
        print: [first.replace(' ', ''), second.replace(' ', '')],
      },
      nets,
      10,
      [27, 27, 40],
      3,
    );
  if (value.includes('film')) {
    const print = [first.replace(' ', ''), second.replace(/ V.*/, 'V')];
    const body: Body = {
      look: 'box',
      width: 18,
      height: 8,
      tall: 13,
      colour: '#b8463a',
      ink: '#f4e9e0',
      print,
    };
    return leaded(body, nets, 15, [19, 9, 13]);
  }
  return surface(
    { look: 'chip-capacitor', length: 2.6, width: 1.5, colour: '#b99a6c' },
    nets,
    2.6,
    1.5,
  );
}

function shunt(part: BoardPart, nets: Nets): Package {
  const ohms = part.ohms ?? 1;
  if (part.value.includes('5 W')) {
    const print = [`5W ${String(ohms).replace('0.', '0R')}J`];
    const body: Body = {
      look: 'box',
      width: 22,
      height: 9.5,
      tall: 9,
      colour: '#d9d5c8',
      ink: '#33312c',
      print,
    };
    return leaded(body, nets, 17.5, [23, 10.5, 9], 2.6);
  }
  if (ohms >= 1)
    return axial(12, 4.6, '#4f7f5b', nets, 19, {
      print: String(ohms).replace('.', 'R'),
      ink: '#eef1ea',
    });
  const wire = ohms < 0.05 ? 2.2 : 1.7;
  return leaded({ look: 'loop', span: 18, wire }, nets, 18, [21, 8, 6], 3.6);
}

function diode(value: string, nets: Nets): Package {
  if (value.includes('6 A'))
    return axial(9, 8.6, '#232426', nets, 17.78, {
      waist: false,
      ends: 'ring',
      print: '6A 400V',
      ink: '#c9ccd0',
    });
  if (value.includes('3 A'))
    return axial(9.2, 5.3, '#232426', nets, 15.24, {
      waist: false,
      ends: 'ring',
      print: '3A',
      ink: '#c9ccd0',
    });
  return axial(5.2, 2.7, '#232426', nets, 10.16, { waist: false, ends: 'ring' });
}

/** A case with legs on two sides. */
export const legged = (
  legs: number,
  width: number,
  height: number,
  print: string[],
  net: Nets,
): Package => {
  const step = 1.27;
  const pads = Array.from({ length: legs }, (_, i) => {
    const row = i < legs / 2 ? -1 : 1;
    const place = i % (legs / 2);
    return land(
      (place - (legs / 2 - 1) / 2) * step * -row,
      (row * (height + 1.6)) / -2,
      i === 0 ? net[0] : i === legs / 2 - 1 ? net[1] : null,
      0.65,
      1.7,
    );
  });
  const body: Body = { look: 'legged', width, height, legs: legs / 2, fourSides: false, print };
  return { body, pads, width: width + 1, height: height + 4, tall: 1.6, remark: '' };
};

export const sot23 = (code: string, nets: Nets): Package => ({
  body: { look: 'sot23', code },
  pads: [
    land(-0.95, 1.15, nets[0], 0.9, 1.1),
    land(0.95, 1.15, nets[1], 0.9, 1.1),
    land(0, -1.15, null, 0.9, 1.1),
  ],
  width: 4,
  height: 4.2,
  tall: 1.1,
  remark: '',
});

function clamp(value: string, nets: Nets): Package {
  if (!value.includes('pass')) return sot23('K6', nets);
  const pads = [
    hole(-5.45, 10, nets[0], 2.8, 1.4),
    hole(0, 10, 'BASE', 2.8, 1.4),
    hole(5.45, 10, nets[1], 2.8, 1.4),
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

function contact(value: string, nets: Nets): Package {
  if (!value.includes('relay'))
    return {
      body: { look: 'arcs' },
      pads: [land(-1.5, 0, nets[0], 1.6, 1.6), land(1.5, 0, nets[1], 1.6, 1.6)],
      width: 5,
      height: 3,
      tall: 0,
      remark: '',
    };
  const body: Body = {
    look: 'box',
    width: 20,
    height: 10.4,
    tall: 11,
    colour: '#e3e1d8',
    ink: '#2d3136',
    print: ['RY-2A', '12V DC'],
  };
  const pads = [
    hole(-8.2, -3.4, nets[0], 2.4, 1.2),
    hole(8.2, -3.4, nets[1], 2.4, 1.2),
    hole(-8.2, 3.4, null, 2.2, 1),
    hole(-3, 3.4, null, 2.2, 1),
  ];
  return { body, pads, width: 21, height: 11.4, tall: 11, remark: '' };
}

/** The body and pads of a part. */
export function packageOf(part: BoardPart, floor: Floor): Package {
  const nets: Nets = part.nets ?? [null, null];
  const glass = (colour: string): Package =>
    surface({ look: 'melf', length: 3.6, diameter: 1.5, colour, bands: ['black'] }, nets, 3.6, 1.5);
  switch (part.kind) {
    case 'resistor':
      return resistor(part, nets, floor.through);
    case 'ptc':
    case 'mov':
      return disc(part, nets, floor);
    case 'fuse':
      return fuse(part.value, nets);
    case 'capacitor':
      return capacitor(part.value, nets);
    case 'shunt':
      return shunt(part, nets);
    case 'diode':
      return diode(part.value, nets);
    case 'zener':
      return glass('#b5552f');
    case 'clamp':
      return clamp(part.value, nets);
    case 'contact':
      return contact(part.value, nets);
    case 'gdt':
      return axial(8, 8, '#d9d4c4', nets, 14, { waist: false, ends: 'caps', print: '1400' });
    case 'trimmer':
      return leaded({ look: 'trimmer', size: 9.6 }, nets, 5.08, [10.6, 10.6, 6]);
    case 'ntc':
      return leaded({ look: 'bead', diameter: 3.4 }, nets, 2.54, [4.5, 4.5, 4], 1.8);
    case 'inductor':
      return {
        ...leaded(
          { look: 'wires', colours: ['#b3201f', '#1d1d20'], spacing: 8, reach: 30 },
          nets,
          0,
          [6, 12, 3],
        ),
        pads: [hole(0, -4, nets[0], 3.2, 1.6), hole(0, 4, nets[1], 3.2, 1.6)],
      };
    case 'ic-pin':
      return legged(8, 5, 4, ['C2408', '1N'], nets);
  }
}
