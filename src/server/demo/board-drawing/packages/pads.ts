/** Packages by how they are held: leads through the board, lands on it, legs along two sides. */
import type { DemoBoard } from '../../content';
import type { Body, Pad, Part } from '../types';

export type BoardPart = DemoBoard['parts'][number];
export type Package = Pick<Part, 'body' | 'pads' | 'width' | 'height' | 'tall' | 'remark'>;

export const hole = (
  x: number,
  y: number,
  net: string | null,
  width: number,
  drill: number,
): Pad => ({
  x,
  y,
  net,
  width,
  height: width,
  round: true,
  drill,
});
export const land = (
  x: number,
  y: number,
  net: string | null,
  width: number,
  height: number,
): Pad => ({
  x,
  y,
  net,
  width,
  height,
  round: false,
  drill: 0,
});

export type Nets = readonly [string | null, string | null];

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
