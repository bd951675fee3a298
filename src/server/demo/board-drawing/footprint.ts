/** Where the pads and the outline of a placed part are on the board. */
import { at, boxAround, plus, turned, type Box, type Point } from './geometry';
import type { Pad, Part } from './types';

export type PlacedPad = Pad & { at: Point };

export const padsOf = (part: Part): PlacedPad[] =>
  part.pads.map((pad) => {
    const upright = part.turn % 180 === 0;
    return {
      ...pad,
      width: upright ? pad.width : pad.height,
      height: upright ? pad.height : pad.width,
      at: plus(part.at, turned(at(pad.x, pad.y), part.turn)),
    };
  });

/** The room a part takes on the board. */
export function boxOf(part: Part, more = 0): Box {
  const upright = part.turn % 180 === 0;
  const [width, height] = upright ? [part.width, part.height] : [part.height, part.width];
  return boxAround(part.at, width + more * 2, height + more * 2);
}

export const goesThrough = (part: Part): boolean => part.pads.some((pad) => pad.drill > 0);
