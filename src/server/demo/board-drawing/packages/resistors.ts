/** Resistors and shunts. */
import { bandsOf, digitsOf } from '../markings';
import type { Body } from '../types';
import { axial, leaded, surface, type BoardPart, type Nets, type Package } from './pads';

export function resistor(part: BoardPart, nets: Nets, through: boolean): Package {
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

export function shunt(part: BoardPart, nets: Nets): Package {
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
