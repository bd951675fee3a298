/** Where the plates of pins lie, so that they neither cover each other nor leave the stage. */
import type { Point, Size } from './view';

export type PlateInput = { id: number; at: Point; label: string; drawn: boolean; lit: boolean };
/** The plate's corner relative to the pin's place, its size, and whether the symbol has room on it. */
export type Plate = Point & Size & { drawn: boolean };

/** Pixels of one mono character at the size of the plate, and of the plate's other parts. */
const LETTER = 7.9;
export const GLYPH = 34;
export const PAD = 7;
const HIGH = 26;
const STEM = 16;
const RING = 8;

type Box = { left: number; top: number; right: number; bottom: number };

const overlaps = (a: Box, b: Box) =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
const ringOf = ({ x, y }: Point): Box => ({
  left: x - RING,
  top: y - RING,
  right: x + RING,
  bottom: y + RING,
});

/** The four corners a plate may stand at, with and then without its symbol. */
function candidates(pin: PlateInput): Plate[] {
  return (pin.drawn ? [true, false] : [false]).flatMap((drawn) => {
    const width = PAD * 2 + pin.label.length * LETTER + (drawn ? GLYPH + 5 : 0);
    const left = -STEM - width;
    const top = -STEM - HIGH;
    return [
      { x: STEM, y: top },
      { x: left, y: top },
      { x: STEM, y: STEM },
      { x: left, y: STEM },
    ].map((corner) => ({ ...corner, width, height: HIGH, drawn }));
  });
}

const boxOf = ({ at }: PlateInput, plate: Plate): Box => ({
  left: at.x + plate.x,
  top: at.y + plate.y,
  right: at.x + plate.x + plate.width,
  bottom: at.y + plate.y + plate.height,
});

/**
 * A plate for every pin, by its key. A pin that is lit gets its plate first and always; another one without room gets
 * none and stands as a ring.
 */
export function layPlates(pins: readonly PlateInput[], stage: Size): Map<number, Plate> {
  const laid = new Map<number, Plate>();
  const taken: Box[] = [];
  const inside = (box: Box) =>
    box.left >= 0 && box.top >= 0 && box.right <= stage.width && box.bottom <= stage.height;
  const inOrder = [...pins].sort((a, b) => Number(b.lit) - Number(a.lit) || a.id - b.id);
  for (const pin of inOrder) {
    const rings = pins.filter((other) => other !== pin).map((other) => ringOf(other.at));
    const all = candidates(pin);
    const free = all.find((plate) => {
      const box = boxOf(pin, plate);
      return inside(box) && ![...taken, ...rings].some((other) => overlaps(box, other));
    });
    const plate = free ?? (pin.lit ? (all.find((one) => inside(boxOf(pin, one))) ?? all[0]) : null);
    if (!plate) continue;
    laid.set(pin.id, plate);
    taken.push(boxOf(pin, plate));
  }
  return laid;
}
