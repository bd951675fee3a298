/** The silk-screen: references, outlines, the maker's name, what each jack and fuse is. */
import { at, boxAround, num, overlap, plus, type Box, type Point } from './geometry';
import { circle, path } from './bodies/brush';
import type { Face } from './face';
import { DISC_RISE } from './bodies/disc';
import { boxOf, padsOf } from './footprint';
import { lettered, textWidth } from './lettering';
import type { Plan } from './plan';
import { roomOn } from './room';
import type { Part } from './types';

const hair = (d: string, colour: string, width = 0.18) =>
  path(
    d,
    'none',
    `stroke="${colour}" stroke-width="${num(width)}" stroke-linejoin="round" stroke-linecap="round"`,
  );

const boxPath = ({ x0, y0, x1, y1 }: Box) =>
  `M${num(x0)} ${num(y0)}H${num(x1)}V${num(y1)}H${num(x0)}z`;

/** The printed outline of a part in its own frame: where it goes, and which way round. */
function outlineOf({ body, pads }: Part): string {
  const reach = Math.abs(pads[0]?.x ?? 0);
  const ring = (r: number, y = 0) =>
    `M${num(-r)} ${num(y)}a${num(r)} ${num(r)} 0 1 0 ${num(r * 2)} 0a${num(r)} ${num(r)} 0 1 0 ${num(-r * 2)} 0`;
  const box = (w: number, h: number) => boxPath({ x0: -w / 2, y0: -h / 2, x1: w / 2, y1: h / 2 });
  switch (body.look) {
    case 'disc':
      return ring(body.diameter / 2 + 0.35, DISC_RISE);
    case 'axial': {
      const [l, h] = [body.length / 2 + 0.3, body.diameter + 0.7];
      return `${box(l * 2, h)}M${num(-reach + 1.2)} 0H${num(-l)}M${num(l)} 0H${num(reach - 1.2)}`;
    }
    case 'fuse': {
      const [l, h] = [body.length / 2 + 1, body.diameter / 2 + 1.2];
      return [-1, 1]
        .map(
          (end) =>
            `M${num(end * (l - 7))} ${num(-h)}H${num(end * l)}V${num(h)}H${num(end * (l - 7))}`,
        )
        .join('');
    }
    case 'box':
    case 'winding':
      return box(body.width + 0.8, body.height + 0.8);
    case 'trimmer':
      return box(body.size + 0.8, body.size + 0.8);
    case 'can':
      return ring(body.diameter / 2 + 0.45);
    case 'loop':
      return `M${num(-reach + 3)} -1.6H${num(reach - 3)}M${num(-reach + 3)} 1.6H${num(reach - 3)}`;
    case 'chip-resistor':
    case 'chip-capacitor':
      return `M${num(-body.length * 0.25)} ${num(-body.width * 0.72)}h${num(body.length * 0.5)}M${num(-body.length * 0.25)} ${num(body.width * 0.72)}h${num(body.length * 0.5)}`;
    case 'melf': {
      const [l, h] = [body.length * 0.72, body.diameter * 0.75];
      return `M${num(l)} ${num(-h)}H${num(-l)}V${num(h)}H${num(l)}`;
    }
    case 'legged':
      return body.fourSides
        ? ''
        : `M${num(-body.width / 2 - 0.3)} ${num(-body.height / 2)}v${num(body.height)}`;
    case 'blob':
      return ring(body.diameter / 2 + 0.9);
    default:
      return '';
  }
}

const printedOutline = (part: Part, colour: string): string => {
  const d = outlineOf(part);
  if (!d) return '';
  const { x, y } = part.at;
  return `<g transform="translate(${num(x)} ${num(y)}) rotate(${part.turn})">${hair(d, colour, part.width < 6 ? 0.13 : 0.19)}</g>`;
};

/** A free place for a reference: beside the part where it covers least. */
function spotFor(
  face: Face,
  part: Part,
  height: number,
  taken: readonly Box[],
): { p: Point; turn: number } {
  const box = boxOf(part, 0.15);
  const width = textWidth(part.ref, height);
  const [mx, my] = [(box.x0 + box.x1) / 2, (box.y0 + box.y1) / 2];
  const gap = height * 0.75;
  const spots = [
    { p: at(mx, box.y0 - gap), turn: 0 },
    { p: at(mx, box.y1 + gap), turn: 0 },
    { p: at(box.x0 + width / 2, box.y0 - gap), turn: 0 },
    { p: at(box.x1 - width / 2, box.y1 + gap), turn: 0 },
    { p: at(box.x1 + gap, my), turn: 90 },
    { p: at(box.x0 - gap, my), turn: 270 },
    { p: at(box.x1 - width / 2, box.y0 - gap), turn: 0 },
    { p: at(box.x0 + width / 2, box.y1 + gap), turn: 0 },
    { p: at(box.x1 + gap, box.y0 + width / 2), turn: 90 },
    { p: at(box.x0 - gap, box.y1 - width / 2), turn: 270 },
    { p: at(mx, box.y0 - gap * 2.4), turn: 0 },
    { p: at(mx, box.y1 + gap * 2.4), turn: 0 },
    { p: at(box.x1 + width / 2 + height * 0.3, my), turn: 0 },
    { p: at(box.x0 - width / 2 - height * 0.3, my), turn: 0 },
  ];
  const inner = { x0: 1.5, y0: 1.5, x1: face.width - 1.5, y1: face.height - 1.5 };
  const badness = ({ p, turn }: { p: Point; turn: number }): number => {
    const own = turn === 0 ? boxAround(p, width, height) : boxAround(p, height, width);
    const area = width * height;
    return (
      taken.reduce((sum, other) => sum + overlap(own, other), 0) + (area - overlap(own, inner)) * 4
    );
  };
  return spots.reduce((best, spot) => (badness(spot) < badness(best) - 0.01 ? spot : best));
}

function front(plan: Plan, face: Face): string {
  const room = roomOn(plan.floor);
  const { silk } = face.mask;
  const out: string[] = [];
  const taken: Box[] = [
    ...face.parts.map((part) => boxOf(part, -0.1)),
    ...face.pads.map((pad) => boxAround(pad.at, pad.width + 0.3, pad.height + 0.3)),
    ...face.screws.map((p) => boxAround(p, 6, 6)),
  ];
  const stitched = face.parts.filter((p) => !p.ref.startsWith('J-'));
  for (const part of stitched) {
    const small = part.width * part.height < 12;
    const height = small ? 0.95 : part.body.look === 'sot23' ? 1.1 : 1.65;
    const { p, turn } = spotFor(face, part, height, taken);
    const width = textWidth(part.ref, height);
    const [w, h] = turn === 0 ? [width, height] : [height, width];
    taken.push(boxAround(p, w + 0.9, h + 0.6));
    out.push(
      printedOutline(part, silk),
      lettered(part.ref, { ...p, height, colour: silk, turn, weight: 0.16 }),
    );
  }
  const { brain } = plan.floor;
  if (brain && !brain.blob) {
    const corner = brain.size / 2 + 1.3;
    out.push(circle(brain.at.x - corner, brain.at.y - corner, 0.4, silk));
  }
  for (const jack of plan.floor.jacks) {
    const { x, y } = jack.at;
    out.push(circle(x, y, 7.1, 'none', `stroke="${silk}" stroke-width=".22"`));
    out.push(lettered(jack.print, { x, y: y - 8.15, height: 1.3, colour: silk, weight: 0.17 }));
  }
  for (const fuse of face.parts.filter((part) => part.body.look === 'fuse')) {
    const box = boxOf(fuse);
    const upright = fuse.turn % 180 !== 0;
    const text = `${fuse.remark} ONLY`;
    const place = upright
      ? at(box.x1 + 0.95, (box.y0 + box.y1) / 2)
      : at((box.x0 + box.x1) / 2, box.y1 + 0.95);
    const own = upright
      ? boxAround(place, 1, textWidth(text, 1))
      : boxAround(place, textWidth(text, 1), 1);
    const held = [own.x0, place.x, own.x1].every((x) => room(x, own.y0) && room(x, own.y1));
    if (held && taken.every((other) => overlap(own, other) < 0.05))
      out.push(lettered(text, { ...place, height: 1, colour: silk, turn: upright ? 90 : 0 }));
  }
  for (const [i, text] of plan.floor.print.lines.entries())
    out.push(
      lettered(text, {
        x: plan.floor.print.at.x,
        y: plan.floor.print.at.y + i * 2.6,
        height: i ? 1.5 : 1.9,
        colour: silk,
      }),
    );
  return out.join('');
}

/** A triangle with an exclamation mark, where mains can stand. */
function danger(p: Point, colour: string): string {
  return (
    hair(
      `M${num(p.x - 2.6)} ${num(p.y + 2)}L${num(p.x)} ${num(p.y - 2.5)}L${num(p.x + 2.6)} ${num(p.y + 2)}z`,
      colour,
      0.36,
    ) + lettered('!', { x: p.x, y: p.y + 0.5, height: 2, colour, weight: 0.18 })
  );
}

function back(plan: Plan, face: Face): string {
  const { silk } = face.mask;
  const out: string[] = [];
  const { wafer, jacks, print } = plan.floor;
  for (const { at: p, print: text } of jacks) {
    const { x, y } = face.flip(p);
    out.push(circle(x, y, 7.5, 'none', `stroke="${silk}" stroke-width=".22"`));
    out.push(lettered(text, { x, y: y - 8.3, height: 1.3, colour: silk }));
  }
  if (wafer?.kind === 'rotary') {
    const { x, y } = face.flip(wafer.at);
    out.push(circle(x, y, wafer.radius + 1.4, 'none', `stroke="${silk}" stroke-width=".3"`));
  }
  const taken: Box[] = face.pads.map((pad) => boxAround(pad.at, pad.width + 0.5, pad.height + 0.5));
  for (const part of plan.parts) {
    const contact = part.body.look === 'arcs';
    if (part.side === 'front' && !padsOf(part).some((pad) => pad.drill > 0)) continue;
    if (part.ref.startsWith('J-')) continue;
    const middle = face.flip(part.at);
    let p = middle;
    if (contact && wafer) {
      const centre = face.flip(wafer.at);
      const reach =
        (wafer.radius + 3) / Math.max(1, Math.hypot(middle.x - centre.x, middle.y - centre.y));
      p =
        wafer.kind === 'rotary'
          ? at(centre.x + (middle.x - centre.x) * reach, centre.y + (middle.y - centre.y) * reach)
          : at(middle.x, middle.y - 5);
    }
    const width = textWidth(part.ref, 1.5);
    const spots = [at(0, 0), at(0, 2.4), at(0, -2.4), at(width + 1.2, 0), at(-width - 1.2, 0)];
    const free = spots.find((spot) => {
      const own = boxAround(plus(p, spot), width, 1.5);
      return taken.every((other) => overlap(own, other) < 0.05);
    });
    p = plus(p, free ?? at(0, 0));
    taken.push(boxAround(p, width, 1.5));
    out.push(lettered(part.ref, { ...p, height: 1.5, colour: silk }));
  }
  const name = face.flip(print.at);
  out.push(lettered(print.lines[0] ?? '', { ...name, height: 1.7, colour: silk }));
  out.push(danger(face.flip(at(26, plan.floor.height - 8)), silk));
  return out.join('');
}

export const silkOf = (plan: Plan, face: Face): string =>
  face.side === 'front' ? front(plan, face) : back(plan, face);
