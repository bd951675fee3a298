/** Copper under the solder mask: the ground area, tracks with their clearances, vias. Also as a relief, in greys. */
import { at, num, polyline, toSegment, type Box } from './geometry';
import { circle, line, path, rect } from './bodies/brush';
import type { Face } from './face';
import type { Floor } from './floors/floor';
import type { PlacedPad } from './footprint';
import type { Paints } from './paint';
import { roomOn } from './room';

const CLEAR = 0.42;

const HATCH = { step: 1.62, width: 0.62 };

/** Crossed lines at 45° over a box, as ground areas were drawn to keep the board flat. */
function hatch({ x0, y0, x1, y1 }: Box, colour: string): string {
  const tall = y1 - y0;
  const starts = Array.from(
    { length: Math.ceil((x1 - x0 + tall) / HATCH.step) },
    (_, i) => x0 - tall + i * HATCH.step,
  );
  const rising = starts.map((x) => `M${num(x)} ${num(y1)}L${num(x + tall)} ${num(y0)}`).join('');
  const falling = starts.map((x) => `M${num(x)} ${num(y0)}L${num(x + tall)} ${num(y1)}`).join('');
  const stroke = `stroke="${colour}" stroke-width="${HATCH.width}"`;
  return path(rising, 'none', stroke) + path(falling, 'none', stroke);
}

export function padShape(
  { at: p, width, height, round }: PlacedPad,
  fill: string,
  more = 0,
): string {
  if (round) return circle(p.x, p.y, width / 2 + more, fill);
  const [w, h] = [width + more * 2, height + more * 2];
  return rect(p.x - w / 2, p.y - h / 2, w, h, fill, `rx="${num(Math.min(w, h) * 0.12)}"`);
}

type Colours = { bare: string; copper: string };

/** The wafer's circle has its own copper; the ground area keeps out. */
function keptClear(face: Face, floor: Floor, bare: string): string {
  const { wafer, display } = floor;
  if (face.side === 'front') return '';
  const parts: string[] = [];
  if (wafer?.kind === 'rotary') {
    const p = face.flip(wafer.at);
    parts.push(circle(p.x, p.y, wafer.radius + 1, bare));
  }
  if (wafer?.kind === 'slide') {
    const p = face.flip(wafer.at);
    parts.push(rect(p.x - wafer.radius - 2, p.y - 5, wafer.radius * 2 + 4, 10, bare));
  }
  if (display) {
    const p = face.flip(at(display.x, display.y0));
    parts.push(rect(p.x - 5, p.y - 2, 10, display.y1 - display.y0 + 4, bare));
  }
  return parts.join('');
}

function groundArea(face: Face, floor: Floor, paints: Paints, { bare, copper }: Colours): string {
  const { ground } = face;
  if (!ground) return '';
  const outline = `${polyline(face.outline)}z`;
  const id = paints.define((id) => `<clipPath id="${id}"><path d="${outline}"/></clipPath>`);
  const box = { x0: ground.from, y0: 0, x1: ground.to, y1: face.height };
  const rim = ground.from === 0 ? ground.to - 0.45 : ground.from + 0.45;
  return `<g clip-path="url(#${id})">${[
    hatch(box, copper),
    line(`M${num(rim)} 0V${num(face.height)}`, copper, 0.9),
    line(outline, copper, 3.6),
    line(outline, bare, 1.8),
    // Only the ground area has a rim of copper along the board's edge.
    rect(ground.from === 0 ? ground.to : ground.from - 200, 0, 200, face.height, bare),
    keptClear(face, floor, bare),
  ].join('')}</g>`;
}

/** All copper of a side but its bare pads; painted over each other, so that clearances come out right. */
export function copperOf(face: Face, floor: Floor, paints: Paints, colours: Colours): string {
  const { bare, copper } = colours;
  const own = (net: string | null) => face.ground !== null && net === face.ground.net;
  const inside = (x: number) =>
    face.ground !== null && x > face.ground.from - 1 && x < face.ground.to + 1;
  const out: string[] = [groundArea(face, floor, paints, colours)];
  if (floor.plainFront && face.side === 'front') return '';
  for (const { net, width, points } of face.tracks)
    if (!own(net) && points.some((p) => inside(p.x)))
      out.push(line(polyline(points), bare, width + CLEAR * 2));
  for (const via of face.vias)
    if (!own(via.net) && inside(via.at.x)) out.push(circle(via.at.x, via.at.y, 0.45 + CLEAR, bare));
  for (const pad of face.pads) if (inside(pad.at.x)) out.push(padShape(pad, bare, CLEAR));
  for (const { net, width, points } of face.tracks)
    out.push(line(polyline(points), copper, own(net) ? Math.max(width, 1) : width));
  for (const via of face.vias) out.push(circle(via.at.x, via.at.y, 0.46, copper));
  for (const pad of face.pads) {
    if (pad.net !== null) out.push(padShape(pad, copper, 0.18));
    // Four spokes hold a ground pad to the area without drawing its heat away.
    if (own(pad.net) && inside(pad.at.x)) {
      const reach = [pad.width / 2 + CLEAR + 0.3, pad.height / 2 + CLEAR + 0.3] as const;
      out.push(
        path(
          `M${num(pad.at.x - reach[0])} ${num(pad.at.y)}h${num(reach[0] * 2)}M${num(pad.at.x)} ${num(pad.at.y - reach[1])}v${num(reach[1] * 2)}`,
          'none',
          `stroke="${copper}" stroke-width=".6"`,
        ),
      );
    }
  }
  return out.join('');
}

/** Vias that stitch the two ground areas together, clear of everything else. */
export function stitches(face: Face, floor: Floor, colours: Colours, hole: string): string {
  const { ground } = face;
  if (!ground) return '';
  const out: string[] = [];
  const room = roomOn(floor);
  for (let y = 4.3; y < face.height - 4; y += 6.4)
    for (let x = ground.from + 3.1; x < ground.to - 3; x += 7.1) {
      const p = at(x, y);
      const home = face.flip(p);
      const free =
        room(home.x, home.y, 2.6) &&
        face.tracks.every((t) =>
          t.points.every(
            (q, i) => i === 0 || toSegment(p, t.points[i - 1] ?? q, q) > t.width / 2 + 1,
          ),
        ) &&
        face.pads.every(
          (pad) =>
            Math.hypot(pad.at.x - x, pad.at.y - y) > Math.max(pad.width, pad.height) / 2 + 1.2,
        ) &&
        face.screws.every((s) => Math.hypot(s.x - x, s.y - y) > 4.5);
      if (free) out.push(circle(x, y, 0.48, colours.copper), circle(x, y, 0.17, hole));
    }
  return out.join('');
}
