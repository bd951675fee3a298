/** Capacitors, diodes, contacts. */
import type { Body } from '../types';
import { axial, hole, land, leaded, surface, type Nets, type Package } from './pads';

export function capacitor(value: string, nets: Nets): Package {
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

export function diode(value: string, nets: Nets): Package {
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

export function contact(value: string, nets: Nets): Package {
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
