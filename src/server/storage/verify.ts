/** Decides by its content whether a file is a photo that can be taken. Nothing is believed of its name. */
import sharp from 'sharp';
import {
  kindByBytes,
  kindByName,
  PHOTO_MAX_PIXELS,
  refuseKind,
  refuseSize,
} from '@/domain/photos/files';
import { pictureEnd, stowaway } from './picture-end';

export type Verdict = { fit: true } | { fit: false; why: string };

const unfit = (why: string): Verdict => ({ fit: false, why });
const NAMES = { jpeg: 'JPEG', png: 'PNG', webp: 'WebP' } as const;

export const BREAKS_OFF = 'The picture breaks off before its end: send it again.';
export const DAMAGED = 'The picture is damaged and cannot be opened: take or send it again.';

/** Looks at the header alone: a picture that unpacks to more than is taken is never unpacked. */
async function refuseDimensions(file: Buffer): Promise<string | null> {
  let about;
  try {
    about = await sharp(file, { limitInputPixels: false }).metadata();
  } catch {
    return DAMAGED;
  }
  if ((about.pages ?? 1) > 1) return SEVERAL;
  const { width, height } = about;
  return width * height > PHOTO_MAX_PIXELS
    ? `The picture has ${width} × ${height} pixels: ${PHOTO_MAX_PIXELS / 1e6} million pixels are taken at most.`
    : null;
}

const SEVERAL = 'The file moves or holds several pictures: a single still photo is needed.';

/**
 * Whether the file is one whole still JPEG, PNG or WebP of a size that is taken, of the type that was declared, and
 * nothing else besides.
 */
export async function verifyPhoto(file: Buffer, declaredType: string): Promise<Verdict> {
  const size = refuseSize(file.length);
  if (size) return unfit(size);
  const kind = kindByBytes(file.subarray(0, 256));
  if (kind !== 'jpeg' && kind !== 'png' && kind !== 'webp')
    return unfit(refuseKind(kind) ?? DAMAGED);
  const declared = kindByName('', declaredType);
  if (declared !== kind)
    return unfit(
      `The file was announced as ${declaredType || 'nothing'} and holds a ${NAMES[kind]} picture: give it its right name and send it again.`,
    );
  const end = pictureEnd(file, kind);
  if (!end) return unfit(BREAKS_OFF);
  if (end.several) return unfit(SEVERAL);
  const passenger = stowaway(file, end.end);
  if (passenger)
    return unfit(`The file carries ${passenger} beside its picture: a plain photo is needed.`);
  const dimensions = await refuseDimensions(file);
  return dimensions ? unfit(dimensions) : { fit: true };
}
