/** Points in millimetres, x to the right and y down, and the affine maps between them and pixels. */
export type Point = { x: number; y: number };
export type Box = { x0: number; y0: number; x1: number; y1: number };
export type Side = 'front' | 'back';

/** x' = a·x + c·y + e, y' = b·x + d·y + f, as in an SVG matrix. */
export type Matrix = { a: number; b: number; c: number; d: number; e: number; f: number };

export const at = (x: number, y: number): Point => ({ x, y });
export const plus = (p: Point, q: Point): Point => at(p.x + q.x, p.y + q.y);
export const minus = (p: Point, q: Point): Point => at(p.x - q.x, p.y - q.y);
export const times = (p: Point, k: number): Point => at(p.x * k, p.y * k);
export const distance = (p: Point, q: Point): number => Math.hypot(p.x - q.x, p.y - q.y);
export const middleOf = (points: readonly Point[]): Point =>
  times(points.reduce(plus, at(0, 0)), 1 / points.length);

/** The point turned about the origin; degrees, clockwise as seen on the page. */
export function turned({ x, y }: Point, degrees: number): Point {
  const angle = (degrees * Math.PI) / 180;
  const cos = Math.cos(angle);
  const sin = Math.sin(angle);
  return at(x * cos - y * sin, x * sin + y * cos);
}

export const onCircle = (centre: Point, radius: number, degrees: number): Point =>
  plus(centre, turned(at(radius, 0), degrees));

export const applied = (m: Matrix, { x, y }: Point): Point =>
  at(m.a * x + m.c * y + m.e, m.b * x + m.d * y + m.f);

/** The distance of a point from the segment p–q. */
export function toSegment(point: Point, p: Point, q: Point): number {
  const dx = q.x - p.x;
  const dy = q.y - p.y;
  const length = dx * dx + dy * dy;
  const share = length === 0 ? 0 : ((point.x - p.x) * dx + (point.y - p.y) * dy) / length;
  const t = Math.max(0, Math.min(1, share));
  return Math.hypot(point.x - p.x - t * dx, point.y - p.y - t * dy);
}

export const boxAround = (centre: Point, width: number, height: number): Box => ({
  x0: centre.x - width / 2,
  y0: centre.y - height / 2,
  x1: centre.x + width / 2,
  y1: centre.y + height / 2,
});

/** The area two boxes share. */
export function overlap(p: Box, q: Box): number {
  const width = Math.min(p.x1, q.x1) - Math.max(p.x0, q.x0);
  const height = Math.min(p.y1, q.y1) - Math.max(p.y0, q.y0);
  return width > 0 && height > 0 ? width * height : 0;
}

/** A number as SVG likes it: three decimals, none that say nothing. */
export const num = (value: number): string => String(Math.round(value * 1000) / 1000);
export const xy = ({ x, y }: Point): string => `${num(x)} ${num(y)}`;
export const polyline = (points: readonly Point[]): string =>
  points.map((p, i) => `${i ? 'L' : 'M'}${xy(p)}`).join('');
