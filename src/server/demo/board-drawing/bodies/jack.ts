/** Sockets with their collars of solder. */
import { at, num, times, turned } from '../geometry';
import { LAMP, lit } from '../paint';
import type { Body } from '../types';
import { BRASS, circle, ellipse, ellipsePath, moved, path, type Brush, type Shade } from './brush';

type Jack = Extract<Body, { look: 'jack' }>;

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
