/** Colours under one lamp: the shading of round, domed and flat things as SVG gradients, each defined once. */
import { at, num, turned, type Point } from './geometry';

type Rgb = readonly [number, number, number];

const clamp = (value: number) => Math.max(0, Math.min(255, Math.round(value)));
const rgb = (hex: string): Rgb => [
  parseInt(hex.slice(1, 3), 16),
  parseInt(hex.slice(3, 5), 16),
  parseInt(hex.slice(5, 7), 16),
];
const hex = (colour: Rgb): string =>
  `#${colour.map((c) => clamp(c).toString(16).padStart(2, '0')).join('')}`;
export const mixed = (from: string, to: string, share: number): string => {
  const b = rgb(to);
  return hex(rgb(from).map((c, i) => c + ((b[i] ?? 0) - c) * share) as unknown as Rgb);
};
/** Lighter above 1, darker below. */
export const lit = (colour: string, k: number): string =>
  hex(rgb(colour).map((c) => c * k) as unknown as Rgb);

/** The lamp stands up and to the left of the picture. */
export const LAMP: Point = at(-0.6, -0.8);

export type Surface = {
  colour: string;
  /** How mirror-like: 0 chalk, 1 polished metal. */
  gloss: number;
  /** Width of the highlight: small is sharp. */
  spread?: number;
};

/** What polished metal mirrors, from the dark room behind (−1) over the lamp to the bench before it (1). */
const mirrored = (lean: number): number => {
  const bump = (middle: number, width: number) => Math.exp(-(((lean - middle) / width) ** 2));
  return (
    0.66 +
    0.5 * bump(0.4, 0.2) -
    0.34 * bump(-0.08, 0.16) +
    0.12 * bump(-0.5, 0.2) -
    0.4 * bump(-1, 0.3) -
    0.3 * bump(1, 0.22)
  );
};

/** Light that comes back from a surface whose normal leans by `lean` (sine) towards the lamp. */
function back({ colour, gloss, spread = 0.35 }: Surface, lean: number): string {
  const up = Math.sqrt(Math.max(0, 1 - lean * lean));
  const matt = 0.34 + 0.62 * Math.max(0, up * 0.86 + lean * 0.42);
  const off = (lean - 0.42) / spread;
  const shine = gloss * Math.exp(-off * off);
  if (gloss > 0.9)
    return hex(rgb(colour).map((c) => c * mirrored(lean) * 1.06 + 70 * shine) as unknown as Rgb);
  return hex(rgb(colour).map((c) => c * matt + 255 * shine * 0.8) as unknown as Rgb);
}

export class Paints {
  private readonly known = new Map<string, string>();
  private readonly prefix: string;

  constructor(prefix: string) {
    this.prefix = prefix;
  }

  /** Defines a gradient, pattern or clip; `make` gets its id. The same content is defined once. */
  define(make: (id: string) => string): string {
    const content = make('');
    const found = this.known.get(content);
    const id = found ?? `${this.prefix}${this.known.size}`;
    if (!found) this.known.set(content, id);
    return id;
  }

  private fill(make: (id: string) => string): string {
    return `url(#${this.define(make)})`;
  }

  /** All definitions, for the head of the drawing. */
  definitions(): string {
    return [...this.known].map(([content, id]) => content.replace('id=""', `id="${id}"`)).join('');
  }

  /** Across a cylinder that lies along the local x axis, drawn in a frame turned by `turn` degrees. */
  cylinder(surface: Surface, turn: number, radius: number): string {
    const across = turned(LAMP, -turn).y;
    const stops = Array.from({ length: 11 }, (_, i) => {
      const place = (i / 10) * 2 - 1;
      return `<stop offset="${i / 10}" stop-color="${back(surface, place * across)}"/>`;
    }).join('');
    const r = num(radius);
    return this.fill(
      (id) =>
        `<linearGradient id="${id}" gradientUnits="userSpaceOnUse" x1="0" y1="-${r}" x2="0" y2="${r}">${stops}</linearGradient>`,
    );
  }

  /** Over a dome of this radius at the local origin; `flat` is the share of its middle that is level. */
  dome(surface: Surface, turn: number, radius: number, flat = 0): string {
    const lamp = turned(LAMP, -turn);
    const focus = at(lamp.x * radius * 0.42, lamp.y * radius * 0.42);
    const stops = Array.from({ length: 9 }, (_, i) => {
      const place = i / 8;
      const steep = Math.max(0, (place - flat) / (1 - flat));
      const lean = 0.42 - steep * (0.42 + 0.62);
      return `<stop offset="${num(place)}" stop-color="${back(surface, Math.max(-0.95, lean))}"/>`;
    }).join('');
    return this.fill(
      (id) =>
        `<radialGradient id="${id}" gradientUnits="userSpaceOnUse" cx="0" cy="0" r="${num(radius * 1.02)}" fx="${num(focus.x)}" fy="${num(focus.y)}">${stops}</radialGradient>`,
    );
  }

  /** A soft patch that fades out at its edge. */
  patch(colour: string, opacity: number, hold = 0): string {
    return this.fill(
      (id) =>
        `<radialGradient id="${id}"><stop offset="${num(hold)}" stop-color="${colour}" stop-opacity="${num(opacity)}"/><stop offset="${num((1 + hold) / 2)}" stop-color="${colour}" stop-opacity="${num(opacity * 0.45)}"/><stop offset="1" stop-color="${colour}" stop-opacity="0"/></radialGradient>`,
    );
  }

  /** From one colour to another along a line in the shape's own box, by the lamp: lighter towards it. */
  plane(colour: string, turn: number, contrast: number): string {
    const lamp = turned(LAMP, -turn);
    const end = (k: number) => num(0.5 + k * 0.5);
    return this.fill(
      (id) =>
        `<linearGradient id="${id}" x1="${end(lamp.x)}" y1="${end(lamp.y)}" x2="${end(-lamp.x)}" y2="${end(-lamp.y)}"><stop offset="0" stop-color="${lit(colour, 1 + contrast)}"/><stop offset="1" stop-color="${lit(colour, 1 - contrast)}"/></linearGradient>`,
    );
  }
}
