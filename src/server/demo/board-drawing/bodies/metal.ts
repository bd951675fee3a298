/** Jacks, shunt wire, thermistor beads, wires that leave the board, and the heatsink with its transistor. */
import { at, num, times, turned, xy, type Point } from '../geometry';
import { lettered } from '../lettering';
import { LAMP, lit } from '../paint';
import type { Body } from '../types';
import {
  BRASS,
  circle,
  ellipse,
  ellipsePath,
  line,
  moved,
  path,
  rect,
  rectPath,
  TIN,
  type Brush,
  type Shade,
} from './brush';

type Jack = Extract<Body, { look: 'jack' }>;
type Loop = Extract<Body, { look: 'loop' }>;
type Wires = Extract<Body, { look: 'wires' }>;
type Heatsink = Extract<Body, { look: 'heatsink' }>;

/** Solder that has run round a tube: a bright collar, streaked where it set. */
function collar(r: number, brush: Brush): string {
  const [inner, outer] = [r * 0.98, r * 1.42];
  const edge = Array.from({ length: 30 }, (_, i) =>
    turned(at(outer * brush.chance.between(0.965, 1.02), 0), i * 12),
  );
  let uneven = 0;
  const wedges = Array.from({ length: 72 }, (_, i) => {
    const angle = i * 5;
    uneven = uneven * 0.72 + brush.chance.between(-0.07, 0.07);
    const lamp = turned(LAMP, -brush.turn);
    const facing = turned(at(1, 0), angle);
    const towards = facing.x * lamp.x + facing.y * lamp.y;
    const streak =
      0.78 + 0.3 * Math.max(0, towards) ** 2 + 0.16 * Math.max(0, -towards) ** 4 + uneven;
    const p = [
      turned(at(inner, 0), angle),
      turned(at(outer * 0.97, 0), angle),
      turned(at(outer * 0.97, 0), angle + 5.5),
      turned(at(inner, 0), angle + 5.5),
    ];
    return path(`M${p.map((q) => `${num(q.x)} ${num(q.y)}`).join('L')}z`, lit('#a9adad', streak));
  });
  const shine = turned(at(-0.6 * r * 1.2, -0.8 * r * 1.2), -brush.turn);
  return [
    path(
      `M${edge.map((p) => `${num(p.x)} ${num(p.y)}`).join('L')}z`,
      '#6f7374',
      'stroke="#5d6162" stroke-width=".2" stroke-linejoin="round"',
    ),
    ...wedges,
    path(
      ellipsePath(0, 0, r * 1.34, r * 1.34),
      'none',
      `stroke="#4f5354" stroke-opacity=".35" stroke-width="${num(r * 0.1)}"`,
    ),
    path(
      ellipsePath(0, 0, r * 1.2, r * 1.2),
      'none',
      `stroke="#ffffff" stroke-opacity=".22" stroke-width="${num(r * 0.07)}"`,
    ),
    ellipse(
      shine.x,
      shine.y,
      r * 0.24,
      r * 0.09,
      brush.paints.patch('#ffffff', 0.95, 0.3),
      `transform="rotate(${num(-37 - brush.turn)} ${num(shine.x)} ${num(shine.y)})"`,
    ),
  ].join('');
}

/** A socket tube: the collar of solder, the rim, and the dark bore with light on its far wall. */
export function drawJack({ diameter }: Jack, brush: Brush): string {
  const r = diameter / 2;
  const lean = times(brush.lean, 6);
  const bore = r * 0.66;
  const far = `M${num(-bore * 0.5)} ${num(bore * 0.84)}A${num(bore)} ${num(bore)} 0 0 0 ${num(bore * 0.97)} ${num(-bore * 0.16)}A${num(bore * 1.25)} ${num(bore * 1.25)} 0 0 1 ${num(-bore * 0.5)} ${num(bore * 0.84)}z`;
  return [
    collar(r, brush),
    circle(lean.x * 0.4, lean.y * 0.4, r * 1.04, '#57503c', 'fill-opacity=".6"'),
    moved(
      [
        circle(0, 0, r, brush.paints.dome({ ...BRASS, gloss: 0.6 }, brush.turn, r, 0.5)),
        circle(0, 0, r * 0.93, brush.paints.plane('#b8954f', brush.turn, 0.3)),
        circle(0, 0, r * 0.8, brush.paints.plane('#9d7c3c', brush.turn + 180, 0.28)),
        circle(0, 0, bore, '#1a140b'),
        path(far, '#8d6f35'),
        circle(bore * 0.1, bore * 0.14, bore * 0.6, '#0a0805'),
        path(
          ellipsePath(0, 0, r * 0.87, r * 0.87),
          'none',
          'stroke="#ffeec0" stroke-opacity=".35" stroke-width=".12"',
        ),
      ].join(''),
      lean.x,
      lean.y,
    ),
  ].join('');
}

export const jackShade = ({ diameter }: Jack): Shade[] => [
  { path: ellipsePath(0, 0, diameter / 2, diameter / 2), tall: 4 },
];

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

export function drawBead(diameter: number, brush: Brush): string {
  const r = diameter / 2;
  return [
    moved(line('M-1.27 1.6V0M1.27 1.6V0', '#a7abad', 0.5), 0, 0),
    circle(
      0,
      -0.3,
      r,
      brush.paints.dome({ colour: '#23342c', gloss: 0.75, spread: 0.22 }, brush.turn, r, 0.1),
    ),
    ellipse(
      -r * 0.3,
      -r * 0.55,
      r * 0.28,
      r * 0.16,
      '#ffffff',
      'fill-opacity=".7" transform="rotate(-30)"',
    ),
  ].join('');
}

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

/** Black fins seen from above, and the transistor that is screwed to their face. */
export function drawHeatsink({ width, height }: Heatsink, brush: Brush): string {
  const [w, h] = [width / 2, height / 2];
  const lean = times(brush.lean, 16);
  const fins = Array.from({ length: 13 }, (_, i) => {
    const x = -w + 1.2 + (i * (width - 3.4)) / 12;
    return (
      rect(
        x,
        -h - 2,
        1,
        height - 4,
        brush.paints.cylinder({ colour: '#43454a', gloss: 0.4, spread: 0.3 }, brush.turn + 90, 0.5),
      ) + rect(x + 1, -h - 2, 0.5, height - 4, '#08090a')
    );
  }).join('');
  const foot = h - 3.2;
  return [
    rect(-w, -h - 2, width, height - 2.4, '#121315'),
    moved(
      [
        rect(-w, -h - 2, width, height - 4, '#17181b'),
        fins,
        rect(-w, foot - 3.2, width, 2.2, brush.paints.plane('#55575c', brush.turn, 0.2)),
      ].join(''),
      lean.x,
      lean.y,
    ),
    [-5.45, 0, 5.45]
      .map(
        (x) =>
          rect(x - 0.55, foot + 2.5, 1.1, 6.4, '#9b9fa1') +
          rect(x - 0.3, foot + 2.5, 0.3, 6.4, '#e5e8e9'),
      )
      .join(''),
    moved(
      [
        rect(-8, foot - 1.2, 16, 4.6, brush.paints.plane('#2a2b2e', brush.turn, 0.35), 'rx=".3"'),
        rect(-8, foot - 1.2, 16, 1, '#b7babb'),
        lettered('PN3055', { x: 0, y: foot + 1.7, height: 1.3, colour: '#a4a8aa', opacity: 0.8 }),
        brush.wear === 'split' || brush.wear === 'burnt'
          ? ellipse(3, foot + 2, 3.4, 1.8, brush.paints.patch('#d9cdb8', 0.8)) +
            line(`M1.4 ${num(foot + 0.4)}l1.2 1.3l-.3 1.4`, '#050505', 0.35)
          : '',
      ].join(''),
      lean.x * 0.4,
      lean.y * 0.4,
    ),
  ].join('');
}

export const heatsinkShade = ({ width, height }: Heatsink): Shade[] => [
  { path: rectPath(-width / 2, -height / 2 - 2, width, height - 2), tall: 12 },
];
