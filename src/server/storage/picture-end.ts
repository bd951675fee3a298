/** Walks the containers of JPEG, PNG and WebP to where the picture ends, without decoding it. */

export type PictureEnd = {
  /** Offset of the first byte after the picture. */
  end: number;
  /** The file holds several pictures, or moves. */
  several: boolean;
};

/** Markers of JPEG that stand alone: TEM and RST0 to RST7. */
const standsAlone = (marker: number) => marker === 0x01 || (marker >= 0xd0 && marker <= 0xd7);

/** Offset of the marker that ends a scan's coded data, or -1 when the file ends before it. */
function endOfScan(file: Buffer, from: number): number {
  for (let at = file.indexOf(0xff, from); at >= 0; at = file.indexOf(0xff, at + 1)) {
    const next = file[at + 1];
    if (next === undefined) return -1;
    if (next !== 0x00 && next !== 0xff && !standsAlone(next)) return at;
  }
  return -1;
}

function jpegEnd(file: Buffer): PictureEnd | null {
  let at = 2;
  while (at + 1 < file.length) {
    if (file[at] !== 0xff) return null;
    const marker = file[at + 1] ?? 0;
    if (marker === 0xd9) return { end: at + 2, several: false };
    if (marker === 0xff) at += 1;
    else if (standsAlone(marker)) at += 2;
    else {
      if (at + 4 > file.length) return null;
      const length = file.readUInt16BE(at + 2);
      if (length < 2) return null;
      at += 2 + length;
      if (marker === 0xda) at = endOfScan(file, at);
      if (at < 0) return null;
    }
  }
  return null;
}

function pngEnd(file: Buffer): PictureEnd | null {
  let several = false;
  for (let at = 8; at + 12 <= file.length;) {
    const length = file.readUInt32BE(at);
    const name = file.toString('latin1', at + 4, at + 8);
    at += 12 + length;
    if (at > file.length) return null;
    if (name === 'acTL') several = true;
    if (name === 'IEND') return { end: at, several };
  }
  return null;
}

function webpEnd(file: Buffer): PictureEnd | null {
  if (file.length < 30) return null;
  const size = file.readUInt32LE(4);
  const end = 8 + size + (size % 2);
  const animated = file.toString('latin1', 12, 16) === 'VP8X' && ((file[20] ?? 0) & 0x02) !== 0;
  return 8 + size > file.length ? null : { end: Math.min(end, file.length), several: animated };
}

/** Where the picture ends, or null when the file breaks off or is not built as its kind says. */
export function pictureEnd(file: Buffer, kind: 'jpeg' | 'png' | 'webp'): PictureEnd | null {
  if (kind === 'jpeg') return jpegEnd(file);
  return kind === 'png' ? pngEnd(file) : webpEnd(file);
}

const STOWAWAYS: readonly [RegExp, string][] = [
  [/<(!doctype|html|head|body|script|iframe|svg|\?php)[\s>/]/i, 'a web page or a program'],
  [/PK\u0003\u0004|PK\u0005\u0006|Rar!\u001a|7z\u00bc\u00af/, 'an archive'],
  [/%PDF-\d/, 'a PDF'],
  [/\u007fELF|MZ[\s\S]{2,200}PE\0\0|#!\//, 'a program'],
];

/**
 * What else a file carries, in words, or null. Cameras append films and second pictures; those go unseen with the
 * re-encoding. Pages, archives and programs are put there by somebody.
 */
export function stowaway(file: Buffer, end: number): string | null {
  const tail = file.toString('latin1', end);
  const head = file.toString('latin1', 0, Math.min(1024, end));
  const found = STOWAWAYS.find(([pattern]) => pattern.test(tail))?.[1];
  return found ?? (/%PDF-\d/.test(head) ? 'a PDF' : null);
}
