/**
 * Makes the pictures that are served. They are drawn anew from the decoded pixels: nothing of the file that came is
 * in them, no metadata, no place, no colour profile; the camera's orientation is applied and colours are sRGB.
 */
import sharp, { type Sharp } from 'sharp';
import { PHOTO_MAX_PIXELS } from '@/domain/photos/files';

// One picture at a time uses one core: the rest of the machine goes on serving pages.
sharp.concurrency(1);
sharp.cache(false);

export type Encoded = {
  name: 'full' | 'page' | 'thumb';
  type: 'image/webp' | 'image/avif';
  bytes: Buffer;
  width: number;
  height: number;
};

const WIDEST = { full: 4000, page: 1600, thumb: 400 } as const;
const fitting = (name: keyof typeof WIDEST) => ({
  width: WIDEST[name],
  height: WIDEST[name],
  fit: 'inside' as const,
  withoutEnlargement: true,
});

async function encode(
  name: Encoded['name'],
  type: Encoded['type'],
  picture: Sharp,
): Promise<Encoded> {
  const { data, info } = await picture.toBuffer({ resolveWithObject: true });
  return { name, type, bytes: data, width: info.width, height: info.height };
}

/** What libjpeg says of a picture that lacks a part; its other remarks (odd profiles, stray bytes) do no harm. */
const LACKS_A_PART = /premature end|bad huffman/i;

async function decode(file: Buffer, failOn: 'warning' | 'error' = 'warning') {
  try {
    return await sharp(file, { failOn, limitInputPixels: PHOTO_MAX_PIXELS })
      .autoOrient()
      .resize(fitting('full'))
      .flatten({ background: '#ffffff' })
      .toColourspace('srgb')
      .raw()
      .timeout({ seconds: 60 })
      .toBuffer({ resolveWithObject: true });
  } catch (error) {
    if (failOn === 'error' || LACKS_A_PART.test(String(error))) throw error;
    return decode(file, 'error');
  }
}

/**
 * The variants of a photo, largest first: `full` within 4000 × 4000 pixels, `page` within 1600 and `thumb` within 400
 * as WebP, `thumb` as AVIF too.
 *
 * @throws when the picture cannot be decoded whole.
 */
export async function reencode(file: Buffer): Promise<Encoded[]> {
  const { data, info } = await decode(file);
  const pixels = sharp(data, { raw: info });
  const thumb = await pixels
    .clone()
    .resize(fitting('thumb'))
    .raw()
    .toBuffer({ resolveWithObject: true });
  const small = sharp(thumb.data, { raw: thumb.info });
  const page = pixels.clone().resize(fitting('page'));
  return [
    await encode('full', 'image/webp', pixels.webp({ quality: 82, effort: 1 })),
    await encode('page', 'image/webp', page.webp({ quality: 80, effort: 2 })),
    await encode('thumb', 'image/avif', small.clone().avif({ quality: 55, effort: 2 })),
    await encode('thumb', 'image/webp', small.webp({ quality: 78, effort: 2 })),
  ];
}
