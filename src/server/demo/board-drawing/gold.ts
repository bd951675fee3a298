/** Gold on the back: the switch's contact arcs, worn where the fingers run, and the row the display stands on. */
import { at, minus, num, onCircle, plus, type Point } from './geometry';
import { circle, line, rect, type Wear } from './bodies/brush';
import type { Face } from './face';
import type { Plan } from './plan';
import { chanceFrom } from '../chance';

const GOLD = '#c8a452';
const GOLD_EDGE = '#8f7230';

/** A stretch of ring between two angles (degrees). */
function arc(centre: Point, radius: number, from: number, to: number): string {
  const p = onCircle(centre, radius, from);
  const q = onCircle(centre, radius, to);
  const large = Math.abs(to - from) > 180 ? 1 : 0;
  return `M${num(p.x)} ${num(p.y)}A${num(radius)} ${num(radius)} 0 ${large} 1 ${num(q.x)} ${num(q.y)}`;
}

/** Light along a gold ring comes from two directions: bright streaks opposite each other. */
function sheen(centre: Point, radius: number, from: number, to: number, width: number): string {
  return [235, 55]
    .flatMap((bright) =>
      [0, 360].map((round) => {
        const a = Math.max(from, bright + round - 360 - 26);
        const b = Math.min(to, bright + round - 360 + 26);
        return b > a
          ? line(
              arc(centre, radius, a, b),
              '#fff0c4',
              width * 0.9,
              'stroke-opacity=".32" style="stroke-linecap:butt"',
            )
          : '';
      }),
    )
    .join('');
}

function segment(centre: Point, radius: number, from: number, to: number, width: number): string {
  const flat = 'style="stroke-linecap:butt"';
  return (
    line(arc(centre, radius, from - 0.4, to + 0.4), GOLD_EDGE, width + 0.16, flat) +
    line(arc(centre, radius, from, to), GOLD, width, flat) +
    sheen(centre, radius, from, to, width) +
    // The finger has polished a lane and left its grey dust beside it.
    line(
      arc(centre, radius - width * 0.1, from, to),
      '#f1dca0',
      width * 0.16,
      'stroke-opacity=".8" style="stroke-linecap:butt"',
    ) +
    line(
      arc(centre, radius + width * 0.16, from, to),
      '#5a4a26',
      width * 0.12,
      'stroke-opacity=".5" style="stroke-linecap:butt"',
    )
  );
}

const RINGS = [0.86, 0.66, 0.5, 0.35];

function rotary(plan: Plan, face: Face, dull: ReadonlySet<string>): string {
  const { wafer } = plan.floor;
  if (wafer?.kind !== 'rotary') return '';
  const centre = face.flip(wafer.at);
  const chance = chanceFrom(plan.floor.width);
  const contacts = plan.parts.filter((part) => part.body.look === 'arcs');
  const angles = contacts.map((part) => {
    const p = minus(face.flip(part.at), centre);
    return { ref: part.ref, angle: ((Math.atan2(p.y, p.x) * 180) / Math.PI + 360) % 360 };
  });
  const out: string[] = [];
  const width = wafer.radius * 0.1;
  for (const [i, share] of RINGS.entries()) {
    const radius = wafer.radius * share;
    const busy = i < 2 ? angles : [];
    for (const { angle, ref } of busy) {
      out.push(segment(centre, radius, angle - 13, angle + 13, width));
      if (dull.has(ref))
        out.push(
          line(
            arc(centre, radius, angle - 12, angle + 9),
            '#231a10',
            width * 0.8,
            'stroke-opacity=".72" style="stroke-linecap:butt"',
          ),
        );
    }
    for (let from = chance.between(0, 20); from < 350;) {
      const to = Math.min(352, from + chance.between(i < 2 ? 16 : 30, i < 2 ? 26 : 110));
      const meets = busy.some(({ angle }) =>
        [angle - 360, angle, angle + 360].some((a) => a + 17 > from && a - 17 < to),
      );
      if (!meets) out.push(segment(centre, radius, from, to, width));
      from = to + 5;
    }
  }
  for (let i = 0; i < 20; i++) {
    const p = onCircle(centre, wafer.radius * 0.985, i * 18 + 4);
    out.push(
      circle(p.x, p.y, 0.62, face.mask.edge),
      circle(p.x + 0.06, p.y + 0.08, 0.52, '#1b1a17'),
    );
  }
  return out.join('');
}

function slide(plan: Plan, face: Face, dull: ReadonlySet<string>): string {
  const { wafer } = plan.floor;
  if (wafer?.kind !== 'slide') return '';
  const plate = (p: Point, ref: string | null) =>
    rect(p.x - 2.35, p.y - 1.45, 4.7, 2.9, GOLD_EDGE, 'rx=".2"') +
    rect(p.x - 2.25, p.y - 1.35, 4.5, 2.7, GOLD, 'rx=".15"') +
    rect(p.x - 2.25, p.y - 0.2, 4.5, 0.3, '#f4e2ac', 'fill-opacity=".8"') +
    rect(p.x - 2.25, p.y + 0.25, 4.5, 0.22, '#4e4020', 'fill-opacity=".5"') +
    (ref !== null && dull.has(ref)
      ? rect(p.x - 2.1, p.y - 1, 4.2, 2, '#231a10', 'fill-opacity=".7"')
      : '');
  return plan.parts
    .filter((part) => part.body.look === 'arcs')
    .flatMap((part) =>
      part.pads.map((pad) => plate(face.flip(plus(part.at, at(pad.x, pad.y))), part.ref)),
    )
    .join('');
}

function display(plan: Plan, face: Face): string {
  const { display: row, brain } = plan.floor;
  if (!row || !brain) return '';
  const step = (row.y1 - row.y0) / (brain.legs - 1);
  return Array.from({ length: brain.legs }, (_, i) => {
    const p = face.flip(at(row.x, row.y0 + i * step));
    const h = Math.min(1, step * 0.55);
    return (
      rect(p.x - 2.5, p.y - h / 2, 5, h, GOLD_EDGE) +
      rect(p.x - 2.45, p.y - h / 2 + 0.05, 4.9, h - 0.1, GOLD) +
      rect(p.x - 2.45, p.y - h * 0.22, 4.9, h * 0.2, '#f3e0a6', 'fill-opacity=".75"')
    );
  }).join('');
}

export function goldOf(plan: Plan, face: Face, wear: ReadonlyMap<string, Wear>): string {
  if (face.side === 'front') return '';
  const dull = new Set([...wear].flatMap(([ref, how]) => (how === 'dull' ? [ref] : [])));
  return rotary(plan, face, dull) + slide(plan, face, dull) + display(plan, face);
}
