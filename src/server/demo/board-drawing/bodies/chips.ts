/** Cases with legs, and the drop of resin some makers pour over a bare chip. */
import { num, turned, at } from '../geometry';
import { lettered } from '../lettering';
import type { Body } from '../types';
import {
  circle,
  ellipse,
  path,
  rect,
  rectPath,
  ellipsePath,
  type Brush,
  type Shade,
} from './brush';

type Legged = Extract<Body, { look: 'legged' }>;
type Blob = Extract<Body, { look: 'blob' }>;

function row(legged: Legged, side: number, brush: Brush): string {
  const { width, height, legs, fourSides } = legged;
  const edge = (side % 2 ? width : height) / 2;
  const out = fourSides ? 1.4 : 1.3;
  const pitch = fourSides ? (width * 0.86) / (legs - 1) : width > 7 ? 2.54 : 1.27;
  const wide = fourSides ? pitch * 0.46 : width > 7 ? 1.1 : 0.42;
  const metal = brush.paints.plane('#b9bcbc', brush.turn + side * 90, 0.22);
  const feet = Array.from({ length: legs }, (_, i) => {
    const x = (i - (legs - 1) / 2) * pitch;
    return (
      rect(x - wide / 2, edge - 0.2, wide, out + 0.2, metal) +
      rect(x - wide / 2, edge + out * 0.28, wide, out * 0.16, '#ffffff', 'fill-opacity=".5"') +
      rect(x - wide / 2, edge, wide, out * 0.14, '#000000', 'fill-opacity=".35"')
    );
  }).join('');
  return `<g transform="rotate(${side * 90 + 180})">${feet}</g>`;
}

export function drawLegged(legged: Legged, brush: Brush): string {
  const { width, height, print, fourSides } = legged;
  const size = Math.min(width / 8, height / 4.4, 1.5);
  const bevel = fourSides ? 0.35 : 0.25;
  const mark = fourSides
    ? at(-width / 2 + 1.5, -height / 2 + 1.5)
    : at(-width / 2 + 0.9, height / 2 - 0.9);
  // Print stays upright to whoever reads the board.
  const upright = ((brush.turn % 360) + 360) % 360 === 180 ? 180 : 0;
  return [
    ...(fourSides ? [0, 1, 2, 3] : [0, 2]).map((side) => row(legged, side, brush)),
    rect(
      -width / 2,
      -height / 2,
      width,
      height,
      brush.paints.plane('#232427', brush.turn, 0.42),
      'rx=".25"',
    ),
    rect(
      -width / 2 + bevel,
      -height / 2 + bevel,
      width - bevel * 2,
      height - bevel * 2,
      brush.paints.plane('#2a2b2f', brush.turn, 0.12),
      'rx=".2"',
    ),
    circle(mark.x, mark.y, Math.min(0.6, width * 0.06), '#17181a'),
    circle(mark.x + 0.06, mark.y + 0.08, Math.min(0.5, width * 0.05), '#37383c'),
    ...print.map((text, i) =>
      lettered(text, {
        ...turned(at(0, (i - (print.length - 1) / 2) * size * 1.9), upright),
        height: size,
        colour: '#a9adaf',
        opacity: 0.82,
        turn: upright,
        weight: 0.12,
      }),
    ),
  ].join('');
}

export const leggedShade = ({ width, height }: Legged): Shade[] => [
  { path: rectPath(-width / 2, -height / 2, width, height), tall: 1.6 },
];

export function drawBlob({ diameter }: Blob, brush: Brush): string {
  const r = diameter / 2;
  const points = Array.from({ length: 24 }, (_, i) =>
    turned(at(r * brush.chance.between(0.97, 1.04), 0), i * 15),
  );
  const shape = `M${points
    .map((p, i) => {
      const next = points[(i + 1) % points.length] ?? p;
      return `${i ? '' : `${num((p.x + next.x) / 2)} ${num((p.y + next.y) / 2)}`}Q${num(next.x)} ${num(next.y)} ${num((next.x + (points[(i + 2) % 24]?.x ?? 0)) / 2)} ${num((next.y + (points[(i + 2) % 24]?.y ?? 0)) / 2)}`;
    })
    .join('')}z`;
  return [
    path(shape, '#0b0b0c', 'transform="translate(.12 .16)"'),
    path(
      shape,
      brush.paints.dome({ colour: '#1d1d1f', gloss: 0.16, spread: 0.25 }, brush.turn, r, 0.6),
    ),
    ellipse(
      -r * 0.34,
      -r * 0.46,
      r * 0.3,
      r * 0.13,
      brush.paints.patch('#ffffff', 0.5, 0.15),
      'transform="rotate(-36)"',
    ),
    ellipse(
      r * 0.3,
      r * 0.5,
      r * 0.5,
      r * 0.16,
      brush.paints.patch('#9fb3c4', 0.18),
      'transform="rotate(-36)"',
    ),
  ].join('');
}

export const blobShade = ({ diameter }: Blob): Shade[] => [
  { path: ellipsePath(0, 0, diameter / 2, diameter / 2), tall: 1.4 },
];
