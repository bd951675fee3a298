/** Which body and pads a part of a board file has. */
import type { Floor } from './floors/floor';
import { capacitor, contact, diode } from './packages/others';
import {
  axial,
  hole,
  leaded,
  legged,
  surface,
  type BoardPart,
  type Nets,
  type Package,
} from './packages/pads';
import { clamp, disc, fuse } from './packages/protection';
import { resistor, shunt } from './packages/resistors';

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
