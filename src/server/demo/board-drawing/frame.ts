/** What the camera frames: which part of the board, how it is turned, how many pixels. */
import { applied, at, num, type Matrix, type Point } from './geometry';

export type Frame = {
  /** Pixels of the picture. */
  width: number;
  height: number;
  /** The point of the board in the middle of the picture, mm. */
  middle: Point;
  /** Pixels a millimetre takes. */
  scale: number;
  matrix: Matrix;
};

/** A picture `span` mm wide about `middle`, the board turned by `degrees`. */
export function framed(
  width: number,
  height: number,
  middle: Point,
  span: number,
  degrees: number,
): Frame {
  const scale = width / span;
  const angle = (degrees * Math.PI) / 180;
  const [cos, sin] = [scale * Math.cos(angle), scale * Math.sin(angle)];
  const matrix: Matrix = {
    a: cos,
    b: sin,
    c: -sin,
    d: cos,
    e: width / 2 - cos * middle.x + sin * middle.y,
    f: height / 2 - sin * middle.x - cos * middle.y,
  };
  return { width, height, middle, scale, matrix };
}

/** Where a point of the board lies in the picture, as shares of its width and height. */
export function shareOf({ width, height, matrix }: Frame, point: Point): Point {
  const p = applied(matrix, point);
  return at(p.x / width, p.y / height);
}

/** The drawing as an SVG of this many pixels, `part` of the frame's own. */
export function svgOf(frame: Frame, content: string, definitions: string, part = 1): Buffer {
  const { a, b, c, d, e, f } = frame.matrix;
  const matrix = [a, b, c, d, e, f].map((v) => String(Math.round(v * 1e5) / 1e5)).join(' ');
  const [width, height] = [Math.round(frame.width * part), Math.round(frame.height * part)];
  return Buffer.from(
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${num(frame.width)} ${num(frame.height)}" preserveAspectRatio="none"><defs>${definitions}</defs><g transform="matrix(${matrix})">${content}</g></svg>`,
  );
}
