/** The bare board: laminate, copper under the mask, tinned pads, holes, gold contacts, silk-screen. */
import { num, polyline, type Point } from './geometry';
import { circle, ellipse, line, path, rect } from './bodies/brush';
import { copperOf, padShape, stitches } from './copper';
import type { Face } from './face';
import type { Floor } from './floors/floor';
import { goldOf } from './gold';
import { lit, mixed, type Paints } from './paint';
import { silkOf } from './silk';
import type { Scene } from './scene';

/** Solder on a pad without a part's end in it, or round a lead that comes through. */
function tinned(face: Face, floor: Floor, paints: Paints): string {
  const plain = floor.plainFront && face.side === 'front';
  return face.pads
    .map((pad) => {
      const { at: p, width, height, drill, part } = pad;
      if (part.body.look === 'jack' && face.side === 'front') return '';
      if (part.body.look === 'arcs') return '';
      if (part.ref === 'U1' && !drill) return '';
      if (plain) return circle(p.x, p.y, drill * 0.62, '#2a1f10');
      const bed = padShape(pad, '#8f9394', 0.06);
      if (!drill) return bed + padShape(pad, paints.plane('#9b9f9f', 0, 0.2), -0.04);
      if (face.side === 'front')
        return (
          `<g transform="translate(${num(p.x)} ${num(p.y)})">` +
          circle(0, 0, width / 2 + 0.05, '#85898a') +
          circle(
            0,
            0,
            width / 2,
            paints.dome({ colour: '#a9adae', gloss: 0.8, spread: 0.3 }, 0, width / 2, 0.2),
          ) +
          circle(0, 0, drill * 0.36, '#3c3f40') +
          '</g>'
        );
      return joint(p, width, height, drill, paints);
    })
    .join('');
}

/** A joint on the solder side: a bright cone with the cut lead in its middle. */
function joint(p: Point, width: number, height: number, drill: number, paints: Paints): string {
  const r = Math.max(width, height) / 2;
  const big = r > 4;
  const body = big
    ? circle(0, 0, r, paints.dome({ colour: '#a4a8aa', gloss: 0.8, spread: 0.2 }, 0, r, 0.45)) +
      circle(
        0,
        0,
        drill / 2,
        paints.dome({ colour: '#b99a58', gloss: 0.7, spread: 0.3 }, 0, drill / 2, 0.6),
      ) +
      circle(0, 0, drill * 0.3, '#191409') +
      ellipse(
        -r * 0.62,
        -r * 0.62,
        r * 0.2,
        r * 0.09,
        '#ffffff',
        'fill-opacity=".75" transform="rotate(-45)"',
      )
    : circle(0, 0, r * 1.02, '#6d7172') +
      circle(0, 0, r, paints.dome({ colour: '#a9adaf', gloss: 0.95, spread: 0.2 }, 0, r, 0)) +
      circle(r * 0.06, r * 0.08, drill * 0.42, '#5d6163') +
      circle(-r * 0.02, -r * 0.02, drill * 0.36, '#c3c6c7') +
      ellipse(
        -r * 0.34,
        -r * 0.42,
        r * 0.22,
        r * 0.12,
        '#ffffff',
        'fill-opacity=".9" transform="rotate(-40)"',
      );
  return `<g transform="translate(${num(p.x)} ${num(p.y)})">${body}</g>`;
}

function vias(face: Face, hole: string, ring: string): string {
  return face.vias
    .map(({ at: p }) => circle(p.x, p.y, 0.3, ring) + circle(p.x, p.y, 0.18, hole))
    .join('');
}

/** Holes for screws with their tinned rings, and sawn slots: the bench shows dark through them. */
function holes(face: Face, paints: Paints): string {
  const screws = face.screws.map(
    ({ x, y }) =>
      circle(x, y, 3.1, face.mask.bare) +
      `<g transform="translate(${num(x)} ${num(y)})">${circle(0, 0, 2.7, paints.dome({ colour: '#9ca0a0', gloss: 0.5, spread: 0.25 }, 0, 2.7, 0.35))}</g>` +
      circle(x, y, 1.62, face.mask.edge) +
      circle(x + 0.1, y + 0.14, 1.5, '#1b1a18') +
      path(
        `M${num(x - 1.1)} ${num(y + 1)}A1.5 1.5 0 0 0 ${num(x + 1.4)} ${num(y + 0.5)}A1.7 1.7 0 0 1 ${num(x - 1.1)} ${num(y + 1)}z`,
        '#4a463d',
      ),
  );
  const slots = face.slots.map(([p, q, width]) => {
    const d = `M${num(p.x)} ${num(p.y)}L${num(q.x)} ${num(q.y)}`;
    const low = `M${num(p.x + 0.08)} ${num(p.y + 0.12)}L${num(q.x + 0.08)} ${num(q.y + 0.12)}`;
    return line(d, face.mask.edge, width + 0.3) + line(low, '#1d1b18', width);
  });
  return [...screws, ...slots].join('');
}

/** The gap the switch's shaft goes through. */
function shaftOf(face: Face, { wafer }: Floor): { x: number; y: number; r: number } | null {
  return wafer?.kind === 'rotary' ? { ...face.flip(wafer.at), r: wafer.radius * 0.22 } : null;
}

function shaft(face: Face, floor: Floor): string {
  const gap = shaftOf(face, floor);
  if (!gap) return '';
  const { x, y, r } = gap;
  return circle(x, y, r + 0.14, face.mask.edge) + circle(x + 0.14, y + 0.2, r, '#1a1917');
}

/** The board with the `marks` that lie on it. */
export function boardLayer({ plan, face, paints, wear }: Scene, marks: string): string {
  const { mask } = face;
  const outline = `${polyline(face.outline)}z`;
  const dark = mixed(mask.bare, '#000000', 0.45);
  return [
    path(outline, mask.bare),
    copperOf(face, plan.floor, paints, mask),
    stitches(face, plan.floor, mask, dark),
    plan.floor.plainFront && face.side === 'front' ? '' : vias(face, dark, lit(mask.copper, 1.12)),
    tinned(face, plan.floor, paints),
    goldOf(plan, face, wear),
    silkOf(plan, face),
    marks,
    holes(face, paints),
    shaft(face, plan.floor),
    path(outline, 'none', `stroke="${mask.edge}" stroke-width=".42"`),
    path(
      outline,
      'none',
      `stroke="#ffffff" stroke-opacity=".3" stroke-width=".12" transform="translate(-.1 -.1)"`,
    ),
  ].join('');
}

/** How high the surface stands, as greys: mask 80, copper 130, pads and print a little above. */
export function reliefLayer({ plan, face, paints }: Scene): string {
  const greys = { bare: '#505050', copper: '#8c8c8c' };
  const gap = shaftOf(face, plan.floor);
  const outline = `${polyline(face.outline)}z`;
  return [
    rect(-200, -200, 600, 600, '#303030'),
    path(outline, greys.bare),
    copperOf(face, plan.floor, paints, greys),
    ...face.pads.map((pad) => padShape(pad, '#a0a0a0')),
    ...face.screws.map((p) => circle(p.x, p.y, 1.6, greys.bare)),
    gap ? circle(gap.x, gap.y, gap.r, greys.bare) : '',
  ].join('');
}
