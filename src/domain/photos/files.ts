/** Which files are taken as photos, told by their first bytes or by their name, and the sentence for those that are not. */

export const PHOTO_SIDES = ['front', 'back', 'other'] as const;
export type PhotoSide = (typeof PHOTO_SIDES)[number];
export const PHOTO_PHASES = ['before', 'after'] as const;
export type PhotoPhase = (typeof PHOTO_PHASES)[number];

export const PHOTO_TYPES = ['image/jpeg', 'image/png', 'image/webp'] as const;
export type PhotoType = (typeof PHOTO_TYPES)[number];

/** Bytes of a file as it comes from the camera. */
export const PHOTO_MAX_BYTES = 25_000_000;
/** Pixels of a picture; an 8192 × 6144 sensor fits, a decompression bomb does not. */
export const PHOTO_MAX_PIXELS = 52_000_000;

export type FileKind =
  'jpeg' | 'png' | 'webp' | 'heic' | 'gif' | 'tiff' | 'svg' | 'pdf' | 'archive' | 'video' | 'other';

const TAKEN: Readonly<Partial<Record<FileKind, PhotoType>>> = {
  jpeg: 'image/jpeg',
  png: 'image/png',
  webp: 'image/webp',
};

/** The type a kind of file is declared with, or null when it is not taken. */
export const typeOfKind = (kind: FileKind): PhotoType | null => TAKEN[kind] ?? null;

const KIND_NAMES: Readonly<Record<Exclude<FileKind, 'jpeg' | 'png' | 'webp' | 'heic'>, string>> = {
  gif: 'a GIF',
  tiff: 'a TIFF or camera raw file',
  svg: 'an SVG drawing or a web page',
  pdf: 'a PDF',
  archive: 'an archive',
  video: 'a film',
  other: 'not a picture Meterwright knows',
};

/** Why a kind of file is not taken, in one sentence; null for JPEG, PNG and WebP. */
export function refuseKind(kind: FileKind): string | null {
  if (kind === 'jpeg' || kind === 'png' || kind === 'webp') return null;
  if (kind === 'heic')
    return 'This is a HEIC or HEIF picture: choose JPEG in the camera’s settings and take it again, or send it as JPEG.';
  return `This is ${KIND_NAMES[kind]}: a photo as JPEG, PNG or WebP is needed.`;
}

const megabytes = (bytes: number): string =>
  bytes < 999_500 ? `${Math.ceil(bytes / 1000)} kB` : `${(bytes / 1e6).toFixed(1)} MB`;

/** Why a file of this size is not taken, or null. */
export function refuseSize(bytes: number): string | null {
  if (!Number.isFinite(bytes) || bytes <= 0)
    return 'The file is empty: take or choose the photo again.';
  if (bytes > PHOTO_MAX_BYTES)
    return `The file has ${megabytes(bytes)}: ${megabytes(PHOTO_MAX_BYTES)} are taken at most. Choose a smaller picture size in the camera’s settings.`;
  return null;
}

const EXTENSIONS: readonly [FileKind, RegExp][] = [
  ['heic', /\.(heic|heif|hif|avif)$/],
  ['gif', /\.gif$/],
  ['tiff', /\.(tiff?|dng|cr[23]|nef|arw|raf|rw2)$/],
  ['svg', /\.(svgz?|x?html?|xml)$/],
  ['pdf', /\.pdf$/],
  ['archive', /\.(zip|jar|7z|rar|gz)$/],
  ['video', /\.(mp4|mov|m4v|webm|avi)$/],
];
const TYPES: readonly [FileKind, RegExp][] = [
  ['jpeg', /^image\/(jpe?g|pjpeg)$/],
  ['png', /^image\/(png|x-png)$/],
  ['webp', /^image\/webp$/],
  ['heic', /^image\/(hei[cf](-sequence)?|avif)$/],
  ['gif', /^image\/gif$/],
  ['tiff', /^image\/(tiff|x-.*(dng|raw|cr2|nef|arw))$/],
  ['svg', /^(image\/svg|text\/html|text\/xml|application\/(xhtml|xml))/],
  ['pdf', /^application\/pdf$/],
  ['archive', /^application\/.*(zip|rar|7z)/],
  ['video', /^video\//],
];

/** What a file claims to be. The name speaks first where it names what is not taken: browsers often give HEIC no type. */
export function kindByName(fileName: string, type: string): FileKind {
  const name = fileName.trim().toLowerCase();
  const byName = EXTENSIONS.find(([, pattern]) => pattern.test(name));
  if (byName) return byName[0];
  return TYPES.find(([, pattern]) => pattern.test(type.trim().toLowerCase()))?.[0] ?? 'other';
}

const ascii = (bytes: Uint8Array, from: number, to: number): string =>
  String.fromCharCode(...bytes.subarray(from, to));
const startsWith = (bytes: Uint8Array, ...values: number[]): boolean =>
  values.every((value, i) => bytes[i] === value);

/** What a file is by its first bytes; 256 of them are enough. The name has no say. */
export function kindByBytes(head: Uint8Array): FileKind {
  if (startsWith(head, 0xff, 0xd8, 0xff)) return 'jpeg';
  if (startsWith(head, 0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a)) return 'png';
  if (ascii(head, 0, 4) === 'RIFF') return ascii(head, 8, 12) === 'WEBP' ? 'webp' : 'video';
  if (ascii(head, 4, 8) === 'ftyp') {
    const brands = ascii(head, 8, Math.min(head.length, 64));
    return /hei[cxfms]|hev[cxms]|mif1|msf1|avi[fs]/.test(brands) ? 'heic' : 'video';
  }
  if (/^GIF8[79]a/.test(ascii(head, 0, 6))) return 'gif';
  if (startsWith(head, 0x49, 0x49, 0x2a, 0) || startsWith(head, 0x4d, 0x4d, 0, 0x2a)) return 'tiff';
  if (startsWith(head, 0x50, 0x4b) || startsWith(head, 0x1f, 0x8b)) return 'archive';
  const text = ascii(head, 0, Math.min(head.length, 256)).toLowerCase();
  if (text.includes('%pdf-')) return 'pdf';
  if (/<(svg|\?xml|!doctype|html|script)/.test(text)) return 'svg';
  return 'other';
}
