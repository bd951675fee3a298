/** How dark it is where: on the board under its parts, and on the bench under the board. Drawn small: shadows are soft. */
import sharp from 'sharp';
import { contactLayer, shadowLayer } from './body-layer';
import { enlarged, type Map8 } from './enlarge';
import { svgOf } from './frame';
import { polyline } from './geometry';
import type { Scene } from './scene';

const SMALL = 0.25;

/** A black-on-nothing drawing as darkness, blurred by so many millimetres. */
async function darkness({ frame }: Scene, drawing: string, blur: number): Promise<Map8> {
  const { data, info } = await sharp(svgOf(frame, drawing, '', SMALL))
    .extractChannel('alpha')
    .blur(Math.max(0.5, blur * frame.scale * SMALL))
    .raw()
    .toBuffer({ resolveWithObject: true });
  return { pixels: data, width: info.width, height: info.height };
}

/** Light left on the board and on the bench, 255 where nothing is in its way, at the size of the picture. */
export async function shadeMaps(scene: Scene): Promise<{ board: Uint8Array; bench: Uint8Array }> {
  const { frame, face } = scene;
  const outline = `<path d="${polyline(face.outline)}z" transform="translate(1.1 1.5)"/>`;
  const cast = await darkness(scene, shadowLayer(scene), 0.75);
  const contact = await darkness(scene, contactLayer(scene), 0.3);
  const under = await darkness(scene, outline, 1.6);
  const board = cast.pixels.map((dark, i) => {
    return (255 - dark * 0.62) * (1 - (contact.pixels[i] ?? 0) * 0.00196);
  });
  const bench = under.pixels.map((dark, i) => (255 - dark * 0.72) * ((board[i] ?? 0) / 255));
  return {
    board: enlarged({ ...cast, pixels: board }, frame.width, frame.height),
    bench: enlarged({ ...cast, pixels: bench }, frame.width, frame.height),
  };
}
