/** Fuses in their clips: sand-filled ceramic with end caps, or glass with the wire to be seen. */
import { num } from '../geometry';
import { lettered } from '../lettering';
import type { Body } from '../types';
import { ellipse, line, NICKEL, rect, rectPath, type Brush, type Shade } from './brush';

type Fuse = Extract<Body, { look: 'fuse' }>;

const capLength = ({ glass }: Fuse): number => (glass ? 5 : 8.2);

/** The spring clip: a plate below, an ear at each side that grips the cap. */
function clip(fuse: Fuse, end: number, brush: Brush): string {
  const { diameter, length } = fuse;
  const r = diameter / 2;
  const wide = capLength(fuse) * 0.72;
  const x = end * (length / 2 - capLength(fuse) * 0.5) - wide / 2;
  const ear = (side: number) =>
    rect(
      x,
      side < 0 ? -r - 0.9 : r - 0.75,
      wide,
      1.65,
      brush.paints.plane('#a9a89f', brush.turn + (side < 0 ? 0 : 180), 0.34),
      'rx=".35" stroke="#3d3d3a" stroke-width=".12"',
    ) +
    rect(
      x + 0.5,
      side < 0 ? -r - 0.25 : r - 0.05,
      wide - 1,
      0.3,
      '#f4f3ec',
      'fill-opacity=".55" rx=".15"',
    );
  return ear(-1) + ear(1);
}

const plate = (fuse: Fuse, end: number): string => {
  const wide = capLength(fuse) * 0.8;
  const x = end * (fuse.length / 2 - capLength(fuse) * 0.5) - wide / 2;
  return rect(x, -fuse.diameter / 2 - 0.6, wide, fuse.diameter + 1.2, '#6d6c66', 'rx=".3"');
};

function caps(fuse: Fuse, brush: Brush): string {
  const { length, diameter } = fuse;
  const r = diameter / 2;
  const wide = capLength(fuse);
  const fill = brush.paints.cylinder(NICKEL, brush.turn, r);
  return [-1, 1]
    .map((end) => {
      const x = end < 0 ? -length / 2 : length / 2 - wide;
      const inner = end < 0 ? x + wide : x;
      const outer = end < 0 ? x : x + wide;
      return (
        rect(x, -r, wide, diameter, fill, 'rx=".45"') +
        rect(
          Math.min(inner, inner - end * -0.35) - 0.1,
          -r,
          0.35,
          diameter,
          '#000',
          'fill-opacity=".32"',
        ) +
        rect(outer - (end < 0 ? -0.15 : 0.55), -r, 0.4, diameter, '#fff', 'fill-opacity=".28"') +
        rect(x + wide * 0.48, -r, 0.16, diameter, '#000', 'fill-opacity=".16"')
      );
    })
    .join('');
}

function ceramic(fuse: Fuse, brush: Brush): string {
  const { length, diameter, print } = fuse;
  const r = diameter * 0.47;
  const inner = length - capLength(fuse) * 2;
  const height = Math.min(diameter * 0.21, (inner / Math.max(8, print.length)) * 0.98);
  return (
    rect(
      -inner / 2 - 0.4,
      -r,
      inner + 0.8,
      r * 2,
      brush.paints.cylinder({ colour: '#e6dcc6', gloss: 0.34, spread: 0.2 }, brush.turn, r),
    ) +
    lettered(print, { x: 0, y: -height * 0.15, height, colour: '#2b2a28', opacity: 0.8 }) +
    lettered('HRC 10kA', {
      x: 0,
      y: height * 1.55,
      height: height * 0.72,
      colour: '#2b2a28',
      opacity: 0.7,
    })
  );
}

/** What is left when a sand-filled fuse has cleared: a hair crack, and smoke that came out under the cap. */
function blownCeramic(fuse: Fuse, brush: Brush): string {
  const { length, diameter } = fuse;
  const inner = length / 2 - capLength(fuse);
  const r = diameter / 2;
  const crack = `M${num(inner * 0.2)} ${num(-r * 0.9)}L${num(inner * 0.28)} ${num(-r * 0.3)}L${num(inner * 0.12)} ${num(r * 0.1)}L${num(inner * 0.3)} ${num(r * 0.9)}`;
  return (
    ellipse(inner * 0.86, 0, length * 0.15, r * 1.1, brush.paints.patch('#140d08', 0.96, 0.25)) +
    ellipse(inner * 0.25, r * 0.1, length * 0.14, r * 0.9, brush.paints.patch('#3c2816', 0.75)) +
    line(crack, '#17110c', 0.26)
  );
}

function glass(fuse: Fuse, brush: Brush): string {
  const { length, diameter } = fuse;
  const r = diameter * 0.46;
  const inner = length - capLength(fuse) * 2;
  const x = -inner / 2;
  const wire =
    brush.wear === 'blown'
      ? ellipse(0, 0, inner * 0.44, r * 0.9, brush.paints.patch('#16130f', 0.9, 0.3)) +
        ellipse(inner * 0.1, -r * 0.2, inner * 0.3, r * 0.5, brush.paints.patch('#8c8272', 0.5)) +
        line(
          `M${num(x)} 0l${num(inner * 0.16)} .25M${num(-x)} 0l${num(-inner * 0.2)} -.2`,
          '#d8d4c6',
          0.22,
        )
      : line(`M${num(x)} 0q${num(inner / 2)} .5 ${num(inner)} 0`, '#e2dfd2', 0.24);
  return [
    rect(x - 0.3, -r, inner + 0.6, r * 2, '#dfe9e6', 'fill-opacity=".3"'),
    wire,
    rect(x, -r, inner, r * 0.34, '#0c1413', 'fill-opacity=".3"'),
    rect(x, r * 0.62, inner, r * 0.38, '#0c1413', 'fill-opacity=".42"'),
    rect(x, -r * 0.52, inner, r * 0.26, '#ffffff', 'fill-opacity=".72" rx=".3"'),
    rect(x, r * 0.36, inner, r * 0.1, '#ffffff', 'fill-opacity=".35"'),
  ].join('');
}

export function drawFuse(fuse: Fuse, brush: Brush): string {
  const body = fuse.glass
    ? glass(fuse, brush)
    : ceramic(fuse, brush) + (brush.wear === 'blown' ? blownCeramic(fuse, brush) : '');
  const stamp = fuse.glass
    ? lettered(fuse.print.replace(/^(.{8}).*/, '$1'), {
        x: -fuse.length / 2 + capLength(fuse) / 2,
        y: 0,
        height: 0.8,
        colour: '#3c3b37',
        turn: 90,
        opacity: 0.6,
      })
    : '';
  return [
    plate(fuse, -1),
    plate(fuse, 1),
    body,
    caps(fuse, brush),
    stamp,
    clip(fuse, -1, brush),
    clip(fuse, 1, brush),
  ].join('');
}

export const fuseShade = ({ length, diameter }: Fuse): Shade[] => [
  { path: rectPath(-length / 2, -diameter / 2, length, diameter), tall: diameter * 0.8 },
];
