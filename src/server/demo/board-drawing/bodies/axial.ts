/** Parts with a lead at each end: resistors, rectifiers, arresters. */
import { at, num } from '../geometry';
import { lettered } from '../lettering';
import { BAND_PAINTS } from '../markings';
import { lit, mixed } from '../paint';
import type { Body } from '../types';
import {
  ellipse,
  lead,
  line,
  NICKEL,
  path,
  ragged,
  rect,
  rectPath,
  type Brush,
  type Shade,
} from './brush';

type Axial = Extract<Body, { look: 'axial' }>;

/** Half the height of the body at a place along it: dipped resistors are thicker at both ends. */
function halfAt({ length, diameter, waist }: Axial, x: number): number {
  const r = diameter / 2;
  if (!waist) return r;
  const fromEnd = length / 2 - Math.abs(x);
  const e = diameter * 0.62;
  if (fromEnd < e) return r;
  return fromEnd > e * 1.7 ? r * 0.84 : r * (1 - ((fromEnd - e) / (e * 0.7)) * 0.16);
}

function outline(axial: Axial): string {
  const { length, diameter } = axial;
  const l = length / 2;
  const c = axial.waist ? diameter * 0.3 : Math.min(0.5, diameter * 0.15);
  const xs = Array.from({ length: 21 }, (_, i) => -l + c + (i / 20) * (2 * l - 2 * c));
  const top = xs.map((x) => `${num(x)} ${num(-halfAt(axial, x))}`);
  const low = xs.map((x) => `${num(x)} ${num(halfAt(axial, x))}`).reverse();
  const r = halfAt(axial, l);
  const corner = num(r - c);
  return `M${top.join('L')}Q${num(l)} ${num(-r)} ${num(l)} -${corner}L${num(l)} ${corner}Q${num(l)} ${num(r)} ${low.join('L')}Q${num(-l)} ${num(r)} ${num(-l)} ${corner}L${num(-l)} -${corner}Q${num(-l)} ${num(-r)} ${num(-l + c)} ${num(-r)}z`;
}

const glossOf = ({ colour }: Axial) => (colour === '#8c8f90' ? 0.1 : 0.5);

/** A ring of another colour round the body. */
function ring(axial: Axial, x: number, width: number, colour: string, brush: Brush): string {
  const half = Math.min(halfAt(axial, x - width / 2), halfAt(axial, x + width / 2));
  const fill = brush.paints.cylinder(
    { colour, gloss: glossOf(axial), spread: 0.2 },
    brush.turn,
    half,
  );
  return rect(x - width / 2, -half, width, half * 2, fill);
}

function bands(axial: Axial, brush: Brush): string {
  const { bands: names, length, diameter } = axial;
  const width = Math.min(length * 0.085, 0.95);
  const first = -length / 2 + diameter * 0.36;
  const last = length / 2 - diameter * 0.36;
  return names
    .map((name, i) => {
      // The tolerance stands apart at the far end.
      const share = (i / (names.length - 1)) * 0.86;
      const x = i === names.length - 1 ? last : first + (last - first) * share;
      return ring(axial, x, width, BAND_PAINTS[name] ?? '#888888', brush);
    })
    .join('');
}

function marks(axial: Axial, brush: Brush): string {
  const { ends, length, diameter, print, ink } = axial;
  const text = print
    ? lettered(print, {
        x: ends === 'ring' ? -length * 0.08 : 0,
        y: 0,
        height: Math.min(diameter * 0.34, (length / print.length) * 0.85),
        colour: ink,
        opacity: 0.85,
      })
    : '';
  const line = ends === 'ring' ? ring(axial, length * 0.31, length * 0.12, '#c6c9cb', brush) : '';
  const cap = brush.paints.cylinder(NICKEL, brush.turn, diameter / 2);
  const caps = [-1, 1]
    .map((end) =>
      rect(end < 0 ? -length / 2 : length * 0.26, -diameter / 2, length * 0.24, diameter, cap),
    )
    .join('');
  return bands(axial, brush) + line + (ends === 'caps' ? caps : '') + text;
}

/** Brown in the middle from heat; broken through when it is worse. */
function scorched({ length, diameter }: Axial, brush: Brush): string {
  const { paints, wear } = brush;
  const dark = paints.patch('#1c0f06', wear === 'baked' ? 0.75 : 0.95, 0.3);
  const middle = ellipse(0, 0, length * 0.4, diameter * 0.56, dark);
  if (wear === 'baked') return middle;
  const swing = diameter * 0.07;
  const ends = [at(-length * 0.06, -diameter * 0.5), at(length * 0.08, diameter * 0.5)] as const;
  const crack = ragged(brush, ends[0], ends[1], swing, 11);
  return [
    middle,
    line(crack, '#140b06', diameter * 0.3, 'stroke-opacity=".4"'),
    line(crack, '#060403', diameter * 0.09),
    line(crack, '#a99c88', diameter * 0.03, 'stroke-opacity=".5" transform="translate(.08 .06)"'),
  ].join('');
}

export function drawAxial(axial: Axial, pitch: number, brush: Brush): string {
  const { length, diameter } = axial;
  const hurt = brush.wear === 'baked' || brush.wear === 'burnt' || brush.wear === 'cracked';
  const colour = hurt
    ? mixed(axial.colour, '#3a2414', axial.ends === 'ring' ? 0.15 : 0.4)
    : axial.colour;
  const shape = outline(axial);
  const thick = Math.max(0.65, Math.min(1.3, diameter * 0.16));
  const round = brush.paints.cylinder(
    { colour, gloss: glossOf(axial), spread: 0.2 },
    brush.turn,
    diameter / 2,
  );
  return [
    lead(brush, -pitch / 2, -length / 2 + 0.3, 0, thick),
    lead(brush, length / 2 - 0.3, pitch / 2, 0, thick),
    path(shape, round, `stroke="${lit(colour, 0.3)}" stroke-opacity=".55" stroke-width=".1"`),
    marks({ ...axial, colour }, brush),
    rect(
      -length / 2,
      -diameter * 0.42,
      diameter * 0.12,
      diameter * 0.84,
      '#000000',
      'fill-opacity=".18"',
    ),
    rect(
      length / 2 - diameter * 0.12,
      -diameter * 0.42,
      diameter * 0.12,
      diameter * 0.84,
      '#000000',
      'fill-opacity=".18"',
    ),
    hurt ? scorched(axial, brush) : '',
  ].join('');
}

export const axialShade = ({ length, diameter }: Axial, pitch: number): Shade[] => [
  { path: rectPath(-length / 2, -diameter / 2, length, diameter), tall: diameter * 0.75 },
  { path: rectPath(-pitch / 2, -0.3, pitch, 0.6), tall: 1.2 },
];
