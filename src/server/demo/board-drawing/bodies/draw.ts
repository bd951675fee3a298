/** One drawing and one shadow for every kind of body. */
import type { Part } from '../types';
import { axialShade, drawAxial } from './axial';
import { ellipsePath, type Brush, type Shade, type Wear } from './brush';
import { blobShade, drawBlob, drawLegged, leggedShade } from './chips';
import { discShade, drawDisc } from './disc';
import { drawFuse, fuseShade } from './fuse';
import { drawBead, drawHeatsink, heatsinkShade } from './heatsink';
import { drawJack, jackShade } from './jack';
import { drawBuzzer, drawCrystal, drawHeader } from './low';
import { chipShade, drawChip, drawMelf, drawSot, melfShade, sotShade } from './small';
import { boxShade, canShade, drawBox, drawCan, drawTrimmer, drawWinding } from './tall';
import { drawLoop, drawWires, loopShade, wiresShade } from './wire';

const pitchOf = ({ pads }: Part): number => Math.abs((pads[1]?.x ?? 0) - (pads[0]?.x ?? 0));

/** The part as seen from above, in its own frame. */
export function drawBody(part: Part, brush: Brush): string {
  const { body } = part;
  switch (body.look) {
    case 'disc':
      return drawDisc(body, pitchOf(part), brush);
    case 'fuse':
      return drawFuse(body, brush);
    case 'axial':
      return drawAxial(body, pitchOf(part), brush);
    case 'chip-resistor':
    case 'chip-capacitor':
      return drawChip(body, brush);
    case 'melf':
      return drawMelf(body, brush);
    case 'sot23':
      return drawSot(body, brush);
    case 'legged':
      return drawLegged(body, brush);
    case 'blob':
      return drawBlob(body, brush);
    case 'can':
      return drawCan(body, brush);
    case 'box':
      return drawBox(body, brush);
    case 'crystal':
      return drawCrystal(body, brush);
    case 'buzzer':
      return drawBuzzer(body.diameter, brush);
    case 'header':
      return drawHeader(body.pins, brush);
    case 'loop':
      return drawLoop(body, brush);
    case 'bead':
      return drawBead(body.diameter, brush);
    case 'trimmer':
      return drawTrimmer(body, brush);
    case 'heatsink':
      return drawHeatsink(body, brush);
    case 'winding':
      return drawWinding(body, brush);
    case 'wires':
      return drawWires(body, brush);
    case 'jack':
      return drawJack(body, brush);
    case 'arcs':
      return '';
  }
}

export function shadeOf(part: Part, wear: Wear): Shade[] {
  const { body } = part;
  switch (body.look) {
    case 'disc':
      return discShade(body);
    case 'fuse':
      return fuseShade(body);
    case 'axial':
      return axialShade(body, pitchOf(part));
    case 'chip-resistor':
    case 'chip-capacitor':
      return chipShade(body);
    case 'melf':
      return melfShade(body);
    case 'sot23':
      return sotShade;
    case 'legged':
      return leggedShade(body);
    case 'blob':
      return blobShade(body);
    case 'can':
      return canShade(body);
    case 'box':
      return boxShade(body);
    case 'winding':
      return boxShade({ ...body, tall: 12 });
    case 'trimmer':
      return boxShade({ width: body.size, height: body.size, tall: 5 });
    case 'buzzer':
      return canShade({ diameter: body.diameter, tall: 8 });
    case 'header':
      return boxShade({ width: body.pins * 2.54, height: 2.5, tall: 3 });
    case 'crystal':
      return boxShade({ width: body.length, height: body.width, tall: 3 });
    case 'loop':
      return loopShade(body);
    case 'bead':
      return [{ path: ellipsePath(0, -0.3, body.diameter / 2, body.diameter / 2), tall: 2 }];
    case 'heatsink':
      return heatsinkShade(body);
    case 'wires':
      return wiresShade(body, wear === 'torn');
    case 'jack':
      return jackShade(body);
    case 'arcs':
      return [];
  }
}
