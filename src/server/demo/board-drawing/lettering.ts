/** Text as strokes, for silk-screens and the print on parts. */
import { num } from './geometry';
import { FIELD, GLYPHS } from './glyphs';

export type Lettering = {
  x: number;
  y: number;
  /** Height of the capitals, mm. */
  height: number;
  colour: string;
  /** Degrees, clockwise about (x, y). */
  turn?: number;
  anchor?: 'start' | 'middle' | 'end';
  /** Width of the stroke as a share of the height. */
  weight?: number;
  /** Letters drawn narrower (below 1) or wider. */
  stretch?: number;
  opacity?: number;
};

/** Width of a line of text of this height, mm. */
export const textWidth = (text: string, height: number, stretch = 1): number =>
  ((Math.max(0, [...text].length * FIELD.advance - (FIELD.advance - FIELD.width)) * height) /
    FIELD.height) *
  stretch;

/** The strokes of a line of text as one path, its left end on the middle line at the origin. */
function strokes(text: string, height: number, stretch: number): string {
  const unit = height / FIELD.height;
  let path = '';
  for (const [place, letter] of [...text].entries()) {
    const glyph = GLYPHS[letter] ?? GLYPHS[letter.toUpperCase()] ?? '';
    for (const stroke of glyph.split(' ')) {
      for (let i = 0; i + 1 < stroke.length; i += 2) {
        const x = (Number(stroke[i]) + place * FIELD.advance) * unit * stretch;
        const y = (Number(stroke[i + 1]) - FIELD.height / 2) * unit;
        path += `${i ? 'L' : 'M'}${num(x)} ${num(y)}`;
      }
    }
  }
  return path;
}

/** A line of text, centred on the height of its capitals. */
export function lettered(text: string, how: Lettering): string {
  const { height, colour, turn = 0, anchor = 'middle', weight = 0.15, stretch = 1 } = how;
  const width = textWidth(text, height, stretch);
  const shift = anchor === 'start' ? 0 : anchor === 'end' ? -width : -width / 2;
  const opacity = how.opacity === undefined ? '' : ` stroke-opacity="${num(how.opacity)}"`;
  return `<path d="${strokes(text, height, stretch)}" transform="translate(${num(how.x)} ${num(how.y)}) rotate(${num(turn)}) translate(${num(shift)} 0)" fill="none" stroke="${colour}" stroke-width="${num(height * weight)}" stroke-linecap="round" stroke-linejoin="round"${opacity}/>`;
}
