/** The heatsink with its transistor, and the bead of a thermistor. */
import { num, times } from '../geometry';
import { lettered } from '../lettering';
import type { Body } from '../types';
import { circle, ellipse, line, moved, rect, rectPath, type Brush, type Shade } from './brush';

type Heatsink = Extract<Body, { look: 'heatsink' }>;

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

/** How far below the middle of a heatsink this high its transistor sits. */
export const transistorFoot = (height: number): number => height / 2 - 1.9;

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
  const foot = transistorFoot(height) - 1.3;
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
          rect(x - 0.55, foot + 2.5, 1.1, 3.2, '#9b9fa1') +
          rect(x - 0.3, foot + 2.5, 0.3, 3.2, '#e5e8e9'),
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
