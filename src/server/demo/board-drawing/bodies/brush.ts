/** What every drawing of a part needs: paints, the lamp and camera as seen from the turned part, a source of chance. */
import type { Chance } from '../../chance';
import { num, type Point } from '../geometry';
import type { Paints, Surface } from '../paint';

/** How a part is: whole, or what the accident left of it. */
export type Wear =
  'good' | 'fresh' | 'burnt' | 'split' | 'blown' | 'cracked' | 'baked' | 'torn' | 'dull';

export type Brush = {
  paints: Paints;
  chance: Chance;
  /** Degrees the part is turned by on the picture. */
  turn: number;
  /** How far the top of something one millimetre tall seems to lean outward, in the part's own frame. */
  lean: Point;
  wear: Wear;
};

/** A silhouette and its height, for the shadow. */
export type Shade = { path: string; tall: number };

export const TIN: Surface = { colour: '#aeb2b4', gloss: 0.85, spread: 0.3 };
export const NICKEL: Surface = { colour: '#b9b8b2', gloss: 0.95, spread: 0.26 };
export const BRASS: Surface = { colour: '#c09a4e', gloss: 0.8, spread: 0.3 };

export const rect = (
  x: number,
  y: number,
  width: number,
  height: number,
  fill: string,
  more = '',
): string =>
  `<rect x="${num(x)}" y="${num(y)}" width="${num(width)}" height="${num(height)}" fill="${fill}"${more && ` ${more}`}/>`;
export const ellipse = (
  x: number,
  y: number,
  rx: number,
  ry: number,
  fill: string,
  more = '',
): string =>
  `<ellipse cx="${num(x)}" cy="${num(y)}" rx="${num(rx)}" ry="${num(ry)}" fill="${fill}"${more && ` ${more}`}/>`;
export const circle = (x: number, y: number, r: number, fill: string, more = ''): string =>
  ellipse(x, y, r, r, fill, more);
export const path = (d: string, fill: string, more = ''): string =>
  `<path d="${d}" fill="${fill}"${more && ` ${more}`}/>`;
export const line = (d: string, colour: string, width: number, more = ''): string =>
  path(
    d,
    'none',
    `stroke="${colour}" stroke-width="${num(width)}" stroke-linecap="round" stroke-linejoin="round"${more && ` ${more}`}`,
  );
export const moved = (content: string, x: number, y: number, turn = 0): string =>
  `<g transform="translate(${num(x)} ${num(y)})${turn ? ` rotate(${num(turn)})` : ''}">${content}</g>`;

export const rectPath = (x: number, y: number, width: number, height: number): string =>
  `M${num(x)} ${num(y)}h${num(width)}v${num(height)}h${num(-width)}z`;
export const ellipsePath = (x: number, y: number, rx: number, ry: number): string =>
  `M${num(x - rx)} ${num(y)}a${num(rx)} ${num(ry)} 0 1 0 ${num(rx * 2)} 0a${num(rx)} ${num(ry)} 0 1 0 ${num(-rx * 2)} 0z`;

/** A tinned lead along the local x axis. */
export const lead = (brush: Brush, x0: number, x1: number, y: number, width = 0.7): string =>
  moved(
    rect(
      Math.min(x0, x1),
      -width / 2,
      Math.abs(x1 - x0),
      width,
      brush.paints.cylinder(TIN, brush.turn, width / 2),
    ),
    0,
    y,
  );

/** A ragged line between two points. */
export function ragged(brush: Brush, from: Point, to: Point, swing: number, steps = 7): string {
  const [dx, dy] = [to.x - from.x, to.y - from.y];
  const length = Math.hypot(dx, dy) || 1;
  let d = `M${num(from.x)} ${num(from.y)}`;
  for (let i = 1; i <= steps; i++) {
    const off = i === steps ? 0 : brush.chance.between(-swing, swing);
    const share = i / steps;
    d += `L${num(from.x + dx * share - (dy / length) * off)} ${num(from.y + dy * share + (dx / length) * off)}`;
  }
  return d;
}
