/** Coated discs, varistors and thermistors, bent over so that their print can be read. */
import { at, num, turned } from '../geometry';
import { lettered } from '../lettering';
import { lit, mixed } from '../paint';
import type { Body } from '../types';
import {
  circle,
  ellipse,
  ellipsePath,
  line,
  moved,
  path,
  ragged,
  TIN,
  rect,
  type Brush,
  type Shade,
} from './brush';

type Disc = Extract<Body, { look: 'disc' }>;

/** Where the middle of the disc lies from the middle of its place. */
export const DISC_RISE = -1.1;
/** Where the leads go in, from the middle of the place. */
export const discFoot = (diameter: number): number => diameter / 2 + 0.7;

function leads({ diameter }: Disc, pitch: number, brush: Brush): string {
  const foot = discFoot(diameter);
  return [-1, 1]
    .map((end) => {
      const x = (end * pitch) / 2;
      const top = DISC_RISE + Math.sqrt(Math.max(0, (diameter / 2) ** 2 - x * x)) - 1;
      return moved(
        rect(0, -0.36, foot - top, 0.72, brush.paints.cylinder(TIN, brush.turn + 90, 0.36)),
        x,
        top,
        90,
      );
    })
    .join('');
}

/** The drips of coating on the leads. */
function drips({ diameter, colour }: Disc, pitch: number): string {
  return [-1, 1]
    .map((end) => {
      const x = (end * pitch) / 2;
      const edge = DISC_RISE + Math.sqrt(Math.max(0, (diameter / 2) ** 2 - x * x));
      return path(
        `M${num(x - 1.1)} ${num(edge - 0.9)}Q${num(x - 0.45)} ${num(edge + 0.3)} ${num(x - 0.4)} ${num(edge + 0.7)}L${num(x + 0.4)} ${num(edge + 0.7)}Q${num(x + 0.45)} ${num(edge + 0.3)} ${num(x + 1.1)} ${num(edge - 0.9)}z`,
        lit(colour, 0.72),
      );
    })
    .join('');
}

/** The lamp in the varnish: a hard small spot and a faint broad one, always towards the lamp. */
function glints(brush: Brush, r: number): string[] {
  const spot = turned(at(-0.36 * r, -0.48 * r), -brush.turn);
  const tilt = num(-38 - brush.turn);
  const place = `transform="translate(${num(spot.x)} ${num(spot.y)}) rotate(${tilt})"`;
  return [
    ellipse(0, 0, r * 0.46, r * 0.24, brush.paints.patch('#ffffff', 0.13), place),
    ellipse(0, 0, r * 0.2, r * 0.07, brush.paints.patch('#ffffff', 0.75, 0.2), place),
  ];
}

function coat(disc: Disc, brush: Brush): string {
  const { diameter, colour, print, ink } = disc;
  const r = diameter / 2;
  const top = brush.paints.dome({ colour, gloss: 0.2, spread: 0.2 }, brush.turn, r, 0.78);
  const height = diameter * 0.155;
  const lines = print
    .map((text, i) =>
      lettered(text, {
        x: 0,
        y: (i - (print.length - 1) / 2) * height * 1.6,
        height,
        colour: ink,
        weight: 0.17,
        opacity: 0.86,
      }),
    )
    .join('');
  return [
    ellipse(0.18, 0.42, r * 1.005, r * 0.985, lit(colour, 0.42)),
    ellipse(0, 0, r, r * 0.97, top),
    ellipse(
      0,
      0,
      r * 0.8,
      r * 0.77,
      'none',
      `stroke="${lit(colour, 1.35)}" stroke-opacity=".2" stroke-width="${num(r * 0.09)}"`,
    ),
    ellipse(
      0.1,
      0.14,
      r * 0.74,
      r * 0.71,
      'none',
      `stroke="#000" stroke-opacity=".14" stroke-width="${num(r * 0.07)}"`,
    ),
    lines,
    ...glints(brush, r),
    ...Array.from({ length: 5 }, () =>
      circle(
        brush.chance.between(-r * 0.7, r * 0.7),
        brush.chance.between(-r * 0.6, r * 0.6),
        0.07,
        '#000',
        'fill-opacity=".25"',
      ),
    ),
  ].join('');
}

/** A crack: brown where it singed the varnish, black in its depth, here and there the pale ceramic. */
function crack(d: string, r: number): string {
  return [
    line(d, '#2b170a', r * 0.42, 'stroke-opacity=".28"'),
    line(d, '#1c1009', r * 0.26, 'stroke-opacity=".45"'),
    line(d, '#0a0705', r * 0.1),
    line(d, '#a2947d', r * 0.022, 'transform="translate(.06 .09)" stroke-opacity=".55"'),
  ].join('');
}

/** Cracked through, charred, and a piece of the rim gone. */
function burnt(disc: Disc, brush: Brush): string {
  const r = disc.diameter / 2;
  const { paints, chance } = brush;
  const main = ragged(brush, at(-r * 0.88, r * 0.34), at(r * 0.8, -r * 0.52), r * 0.085, 17);
  const branch = ragged(brush, at(r * 0.02, -r * 0.06), at(r * 0.46, r * 0.84), r * 0.07, 11);
  const rim = [-62, -54, -46, -37, -29, -20, -12].map((angle, i) =>
    turned(at(r * (i % 6 === 0 ? 1.02 : chance.between(0.66, 0.84)), 0), angle),
  );
  const bite = `M${rim.map((p) => `${num(p.x)} ${num(p.y)}`).join('L')}L${num(r * 1.1)} ${num(-r * 0.75)}z`;
  return [
    ellipse(r * 0.12, 0, r * 1.02, r * 0.98, paints.patch('#0f0a06', 0.92, 0.22)),
    ellipse(-r * 0.35, r * 0.35, r * 0.62, r * 0.5, paints.patch('#4a2c14', 0.6)),
    path(bite, '#1d1712'),
    path(bite, paints.patch('#b3a58d', 0.75), 'transform="translate(-.08 .1) scale(.96)"'),
    crack(main, r),
    crack(branch, r * 0.75),
    ...Array.from({ length: 16 }, () =>
      circle(
        chance.between(-r, r),
        chance.between(-r, r),
        chance.between(0.04, 0.16),
        '#120d09',
        'fill-opacity=".8"',
      ),
    ),
  ].join('');
}

/** Torn open across the middle: two halves that gape at one end, black between them. */
function split(disc: Disc, brush: Brush): string {
  const r = disc.diameter / 2;
  const { paints, chance } = brush;
  const edge = Array.from({ length: 19 }, (_, i) =>
    at(
      -r * 0.99 + (i / 18) * r * 1.98,
      chance.between(-0.075, 0.075) * r + Math.sin(i * 0.7) * r * 0.07,
    ),
  );
  const rim = edge.map((p, i) => `${i ? 'L' : 'M'}${num(p.x)} ${num(p.y)}`).join('');
  const half = (side: number) => {
    const clip = `${rim}L${num(r * 1.3)} ${num(side * r * 1.4)}L${num(-r * 1.3)} ${num(side * r * 1.4)}z`;
    const id = paints.define((id) => `<clipPath id="${id}"><path d="${clip}"/></clipPath>`);
    const char = [
      line(rim, '#1a0e07', r * 0.62, 'stroke-opacity=".3"'),
      line(rim, '#150b06', r * 0.38, 'stroke-opacity=".5"'),
      line(rim, '#6b5c48', r * 0.09, 'stroke-opacity=".8"'),
      line(rim, '#0b0806', r * 0.05),
    ].join('');
    return `<g clip-path="url(#${id})">${coat(disc, brush)}${ellipse(r * 0.1, 0, r * 1.05, r * 0.95, paints.patch('#0e0906', 0.72, 0.1))}${char}</g>`;
  };
  return [
    ellipse(0, 0, r * 0.98, r * 0.96, '#0f0b08'),
    moved(half(-1), -r * 0.05, -r * 0.1, -5.5),
    moved(half(1), r * 0.06, r * 0.11, 5),
    ellipse(r * 0.15, -r * 0.1, r * 0.9, r * 0.8, paints.patch('#0c0805', 0.5)),
    ...Array.from({ length: 14 }, () =>
      circle(
        chance.between(-r, r),
        chance.between(-r * 0.6, r * 0.6),
        chance.between(0.05, 0.2),
        '#0d0907',
        'fill-opacity=".8"',
      ),
    ),
  ].join('');
}

export function drawDisc(disc: Disc, pitch: number, brush: Brush): string {
  const shown =
    brush.wear === 'split'
      ? split(disc, brush)
      : coat(
          brush.wear === 'baked' ? { ...disc, colour: mixed(disc.colour, '#4a3320', 0.42) } : disc,
          brush,
        ) + (brush.wear === 'burnt' ? burnt(disc, brush) : '');
  return leads(disc, pitch, brush) + drips(disc, pitch) + moved(shown, 0, DISC_RISE);
}

export const discShade = ({ diameter, thick }: Disc): Shade[] => [
  { path: ellipsePath(0, DISC_RISE, diameter / 2, diameter / 2), tall: thick },
];
