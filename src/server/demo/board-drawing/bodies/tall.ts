/** Things that stand up from the board: their tops lean outward as a camera above the middle sees them. */
import { at, num, times, turned, type Point } from '../geometry';
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
  type Brush,
  type Shade,
} from './brush';

type Can = Extract<Body, { look: 'can' }>;
type Box = Extract<Body, { look: 'box' }>;
type Trimmer = Extract<Body, { look: 'trimmer' }>;
type Winding = Extract<Body, { look: 'winding' }>;

/** An aluminium can in its sleeve, scored on top. */
export function drawCan({ diameter, tall, sleeve, print }: Can, brush: Brush): string {
  const r = diameter / 2;
  const top = times(brush.lean, tall);
  const steps = 8;
  const wall = Array.from({ length: steps }, (_, i) =>
    circle((top.x * i) / steps, (top.y * i) / steps, r, lit(sleeve, 0.5 + (0.35 * i) / steps)),
  ).join('');
  const angle = -35;
  const score = [0, 120, 240]
    .map((turn) => turned(at(r * 0.62, 0), turn + angle))
    .map((p) => line(`M0 0L${num(p.x)} ${num(p.y)}`, '#6e7275', r * 0.05))
    .join('');
  const lid = [
    circle(
      0,
      0,
      r,
      brush.paints.dome({ colour: sleeve, gloss: 0.5, spread: 0.2 }, brush.turn, r, 0.7),
    ),
    circle(0, 0, r * 0.84, lit(sleeve, 0.42)),
    circle(0, 0, r * 0.82, brush.paints.plane('#c2c5c6', brush.turn, 0.2)),
    path(
      ellipsePath(0, 0, r * 0.8, r * 0.8),
      'none',
      `stroke="#fff" stroke-opacity=".35" stroke-width="${num(r * 0.03)}"`,
    ),
    moved(score, r * 0.012, r * 0.02),
    ellipse(
      -r * 0.28,
      -r * 0.3,
      r * 0.5,
      r * 0.24,
      brush.paints.patch('#ffffff', 0.5),
      'transform="rotate(-40)"',
    ),
  ].join('');
  const side = Math.hypot(top.x, top.y);
  const label =
    side > 1.6
      ? print
          .map((text, i) =>
            lettered(text, {
              ...times(top, 0.1 + 0.1 * i),
              height: Math.min(1.2, side * 0.25),
              colour: '#d9dde2',
              opacity: 0.55,
            }),
          )
          .join('')
      : '';
  return wall + label + moved(lid, top.x, top.y);
}

export const canShade = ({ diameter, tall }: Pick<Can, 'diameter' | 'tall'>): Shade[] => [
  { path: ellipsePath(0, 0, diameter / 2, diameter / 2), tall: Math.min(tall, 16) },
];

/** The corner points of a box and its top, and the walls that are seen. */
export function walls(w: number, h: number, top: Point, colour: string, turn: number): string {
  const lamp = turned(LAMP, -turn);
  const corners = [at(-w, -h), at(w, -h), at(w, h), at(-w, h)];
  return corners
    .map((p, i) => {
      const q = corners[(i + 1) % 4] ?? p;
      const normal = i % 2 ? at(i === 1 ? 1 : -1, 0) : at(0, i === 0 ? -1 : 1);
      if (normal.x * top.x + normal.y * top.y >= 0) return '';
      const light = 0.62 + 0.3 * (normal.x * lamp.x + normal.y * lamp.y);
      const d = `M${num(p.x)} ${num(p.y)}L${num(q.x)} ${num(q.y)}L${num(q.x + top.x)} ${num(q.y + top.y)}L${num(p.x + top.x)} ${num(p.y + top.y)}z`;
      return path(d, lit(colour, light));
    })
    .join('');
}

export function drawBox({ width, height, tall, colour, ink, print }: Box, brush: Brush): string {
  const top = times(brush.lean, tall);
  const [w, h] = [width / 2, height / 2];
  const size = Math.min(
    height / (print.length * 2.1),
    (width / Math.max(...print.map((t) => t.length))) * 0.95,
    2,
  );
  const readable = ((brush.turn % 360) + 360) % 360 >= 180 ? 180 : 0;
  const lid = [
    rect(-w, -h, width, height, brush.paints.plane(colour, brush.turn, 0.16), 'rx=".4"'),
    rect(
      -w + 0.35,
      -h + 0.35,
      width - 0.7,
      height - 0.7,
      brush.paints.plane(lit(colour, 1.03), brush.turn, 0.05),
      'rx=".3"',
    ),
    ...print.map((text, i) =>
      lettered(text, {
        ...turned(at(0, (i - (print.length - 1) / 2) * size * 1.75), readable),
        height: size,
        colour: ink,
        turn: readable,
        opacity: 0.85,
      }),
    ),
    ellipse(-w * 0.5, -h * 0.55, w * 0.7, h * 0.5, brush.paints.patch('#ffffff', 0.22)),
  ].join('');
  return (
    rect(-w, -h, width, height, lit(colour, 0.4), 'rx=".4"') +
    walls(w, h, top, colour, brush.turn) +
    moved(lid, top.x, top.y)
  );
}

export const boxShade = ({
  width,
  height,
  tall,
}: Pick<Box, 'width' | 'height' | 'tall'>): Shade[] => [
  { path: rectPath(-width / 2, -height / 2, width, height), tall: Math.min(tall, 14) },
];

export function drawTrimmer({ size }: Trimmer, brush: Brush): string {
  const h = size / 2;
  const top = times(brush.lean, 5);
  const slot = brush.wear === 'dull' ? 62 : 24;
  const face = [
    rect(-h, -h, size, size, brush.paints.plane('#2b6fb5', brush.turn, 0.2), 'rx=".5"'),
    circle(0, 0, size * 0.33, '#184a80'),
    circle(0, 0, size * 0.3, brush.paints.dome(BRASS, brush.turn, size * 0.3, 0.55)),
    `<g transform="rotate(${slot})">${rect(-size * 0.26, -size * 0.05, size * 0.52, size * 0.1, '#4b3a17')}${rect(-size * 0.05, -size * 0.26, size * 0.1, size * 0.52, '#4b3a17')}</g>`,
    lettered('202', { x: 0, y: size * 0.41, height: 0.85, colour: '#e9f0f6', opacity: 0.85 }),
    brush.wear === 'dull' ? circle(0, 0, size * 0.3, brush.paints.patch('#3b2a12', 0.65, 0.3)) : '',
  ].join('');
  return walls(h, h, top, '#2b6fb5', brush.turn) + moved(face, top.x, top.y);
}

/** A transformer: yellow tape round the winding, the ferrite showing at both ends. */
export function drawWinding({ width, height }: Winding, brush: Brush): string {
  const top = times(brush.lean, 12);
  const [w, h] = [width / 2, height / 2];
  const face = [
    rect(
      -w,
      -h * 0.72,
      width,
      height * 0.72,
      brush.paints.plane('#3a3b3f', brush.turn, 0.25),
      'rx=".5"',
    ),
    rect(
      -w * 0.62,
      -h,
      w * 1.24,
      height,
      brush.paints.cylinder({ colour: '#d8b93b', gloss: 0.35, spread: 0.25 }, brush.turn + 90, h),
      'rx="1.2"',
    ),
    rect(
      -w * 0.62,
      -h,
      w * 1.24,
      height,
      brush.paints.plane('#d8b93b', brush.turn, 0.18),
      'rx="1.2" fill-opacity=".75"',
    ),
    ...[-0.3, 0.05, 0.36].map((k) =>
      line(
        `M${num(w * k)} ${num(-h * 0.97)}V${num(h * 0.97)}`,
        '#8f7a1e',
        0.12,
        'stroke-opacity=".6"',
      ),
    ),
    lettered('TR-1000', { x: 0, y: 0, height: 1.5, colour: '#3b3417', opacity: 0.8 }),
    ellipse(-w * 0.3, -h * 0.5, w * 0.4, h * 0.3, brush.paints.patch('#ffffff', 0.4)),
  ].join('');
  return walls(w, h * 0.72, top, '#3a3b3f', brush.turn) + moved(face, top.x, top.y);
}
