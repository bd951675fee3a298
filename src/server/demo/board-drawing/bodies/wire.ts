/** Round wires: shunts bent of resistance wire, and insulated ones that leave the board. */
import { at, num, times, xy, type Point } from '../geometry';
import { lit } from '../paint';
import type { Body } from '../types';
import { circle, ellipse, line, moved, path, TIN, type Brush, type Shade } from './brush';

type Loop = Extract<Body, { look: 'loop' }>;
type Wires = Extract<Body, { look: 'wires' }>;

/** A round wire along a path: dark edge, body, light along the lamp side. */
function wire(d: string, colour: string, width: number, gloss: string): string {
  return [
    line(d, lit(colour, 0.42), width),
    line(d, lit(colour, 0.8), width * 0.8, 'transform="translate(-.05 -.06)"'),
    line(
      d,
      colour,
      width * 0.52,
      `transform="translate(${num(-width * 0.07)} ${num(-width * 0.1)})"`,
    ),
    line(
      d,
      gloss,
      width * 0.14,
      `transform="translate(${num(-width * 0.13)} ${num(-width * 0.2)})" stroke-opacity=".75"`,
    ),
  ].join('');
}

export function drawLoop({ span, wire: width }: Loop, brush: Brush): string {
  const rise = times(brush.lean, 8);
  const s = span / 2;
  const d = `M${num(-s)} 0C${num(-s + 1 + rise.x)} ${num(rise.y - 1.4)} ${num(-s * 0.6 + rise.x)} ${num(rise.y - 2.6)} ${num(rise.x)} ${num(rise.y - 2.7)}C${num(s * 0.6 + rise.x)} ${num(rise.y - 2.8)} ${num(s - 1 + rise.x)} ${num(rise.y - 1.2)} ${num(s)} 0`;
  const burnt = brush.wear === 'baked' || brush.wear === 'burnt';
  return [
    ...[-s, s].map(
      (x) =>
        circle(x, 0, width * 1.2, '#74787a') +
        moved(
          circle(
            0,
            0,
            width * 1.12,
            brush.paints.dome({ ...TIN, gloss: 0.8, spread: 0.24 }, brush.turn, width * 1.12, 0),
          ),
          x,
          0,
        ) +
        ellipse(
          x - width * 0.4,
          -width * 0.45,
          width * 0.3,
          width * 0.14,
          '#ffffff',
          'fill-opacity=".8"',
        ),
    ),
    wire(d, burnt ? '#5c4a42' : '#a98563', width, '#ffe9cf'),
    // The notch filed in to trim the value.
    path(
      `M${num(rise.x - 0.8)} ${num(rise.y - 2.7 - width / 2)}l.8 ${num(width * 0.3)}l.8 ${num(-width * 0.3)}z`,
      '#3a2a1c',
    ),
  ].join('');
}

export const loopShade = ({ span, wire: width }: Loop): Shade[] => [
  {
    path: `M${num(-span / 2)} ${num(-width / 2)}Q0 -5 ${num(span / 2)} ${num(-width / 2)}v${num(width)}Q0 ${num(width - 5)} ${num(-span / 2)} ${num(width / 2)}z`,
    tall: 4,
  },
];

type Curve = readonly [Point, Point, Point, Point];

/** The course of one of the wires; a torn one has sprung away from its joint. */
function courseOf({ colours, spacing, reach }: Wires, i: number, torn: boolean): Curve {
  const y = (i - (colours.length - 1) / 2) * spacing;
  const bend = (i % 2 ? -1 : 1) * 2.5;
  return torn
    ? [at(7, y - 3.5), at(14, y - 6), at(20, y - 2), at(reach, y + bend)]
    : [at(2.6, y), at(reach * 0.3, y), at(reach * 0.55, y + bend), at(reach, y + bend * 1.6)];
}

const curved = ([p, q, r, s]: Curve): string => `M${xy(p)}C${xy(q)} ${xy(r)} ${xy(s)}`;

/** Insulated wires soldered in, leading off the board to the right of the part. */
export function drawWires(wires: Wires, brush: Brush): string {
  const { colours, spacing } = wires;
  return colours
    .map((colour, i) => {
      const y = (i - (colours.length - 1) / 2) * spacing;
      const torn = brush.wear === 'torn' && i === 0;
      const course = courseOf(wires, i, torn);
      const { x: x0, y: y0 } = course[0];
      const strands = torn
        ? [-0.3, 0, 0.35]
            .map((k) =>
              line(
                `M${num(x0)} ${num(y0)}q-1.6 ${num(1 + k)} -2.4 ${num(1.6 + k * 3)}`,
                '#c98a52',
                0.22,
              ),
            )
            .join('') + line(`M0 ${num(y)}l1.3 -.3M0 ${num(y)}l1.1 .35`, '#b98457', 0.25)
        : line(`M0 ${num(y)}H${num(x0)}`, '#b9a58a', 1.1) +
          line(`M0 ${num(y - 0.2)}H${num(x0)}`, '#eadcc6', 0.25);
      const solder = circle(
        0,
        0,
        1.5,
        brush.paints.dome({ ...TIN, spread: 0.2 }, brush.turn, 1.5, 0),
      );
      return (
        moved(circle(0, 0, 1.6, '#63676a') + solder, 0, y) +
        strands +
        wire(curved(course), colour, 2.1, '#ffffff')
      );
    })
    .join('');
}

/** The shadow of each wire: its course, as wide as it is. */
export const wiresShade = (wires: Wires, torn: boolean): Shade[] =>
  wires.colours.map((_, i) => {
    const [p, q, r, s] = courseOf(wires, i, torn && i === 0);
    const off = (point: Point, dy: number) => xy(at(point.x, point.y + dy));
    return {
      path: `M${off(p, -0.9)}C${off(q, -0.9)} ${off(r, -0.9)} ${off(s, -0.9)}L${off(s, 0.9)}C${off(r, 0.9)} ${off(q, 0.9)} ${off(p, 0.9)}z`,
      tall: 2.5,
    };
  });
