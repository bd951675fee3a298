import { expect, test } from 'vitest';
import fc from 'fast-check';
import {
  kindByBytes,
  kindByName,
  PHOTO_MAX_BYTES,
  refuseKind,
  refuseSize,
  typeOfKind,
} from '@/domain/photos/files';
import { pictureEnd, stowaway } from '@/server/storage/picture-end';
import { turns } from '@/server/storage/turns';

const bytes = (text: string) => Uint8Array.from(text, (c) => c.charCodeAt(0));

// First bytes from the formats' own specifications: JPEG (T.81 B.1.1.3), PNG (ISO/IEC 15948, 5.2), WebP (RFC 9649),
// HEIF brands (ISO/IEC 23008-12, 10), GIF89a, TIFF 6.0, PDF (ISO 32000, 7.5.2), ZIP (APPNOTE 4.3.7).
test.each([
  ['\xff\xd8\xff\xe1\0\x10Exif', 'jpeg'],
  ['\x89PNG\r\n\x1a\n\0\0\0\rIHDR', 'png'],
  ['RIFF\x10\0\0\0WEBPVP8 ', 'webp'],
  ['RIFF\x10\0\0\0AVI LIST', 'video'],
  ['\0\0\0\x18ftypheic\0\0\0\0mif1heic', 'heic'],
  ['\0\0\0\x18ftypmif1\0\0\0\0mif1heic', 'heic'],
  ['\0\0\0\x1cftypavif\0\0\0\0avifmif1', 'heic'],
  ['\0\0\0\x18ftypisom\0\0\0\0isommp42', 'video'],
  ['GIF89a\x01\0\x01\0', 'gif'],
  ['II*\0\b\0\0\0', 'tiff'],
  ['MM\0*\0\0\0\b', 'tiff'],
  ['%PDF-1.7', 'pdf'],
  ['PK\x03\x04\x14\0', 'archive'],
  ['\xef\xbb\xbf <?xml version="1.0"?><svg/>', 'svg'],
  ['\n<!DOCTYPE HTML>', 'svg'],
  ['', 'other'],
  ['RIFF', 'video'],
  ['hello', 'other'],
])('%j is told by its first bytes as %s', (text, kind) => {
  expect(kindByBytes(bytes(text))).toBe(kind);
});

test.each([
  ['IMG_1.HEIC', '', 'heic'],
  ['IMG_1.heic', 'image/jpeg', 'heic'],
  ['a.jpg', 'image/jpeg', 'jpeg'],
  ['a.jpg', 'IMAGE/JPEG', 'jpeg'],
  ['a', 'image/png', 'png'],
  ['a.svg', 'image/png', 'svg'],
  ['a.tar.gz', 'application/gzip', 'archive'],
  ['a.mov', 'video/quicktime', 'video'],
  ['a.dng', 'image/x-adobe-dng', 'tiff'],
  ['a.bin', 'application/octet-stream', 'other'],
])('%s with type %j claims to be %s', (name, type, kind) => {
  expect(kindByName(name, type)).toBe(kind);
});

test('exactly the three kinds that are taken have a type and no refusal', () => {
  for (const kind of ['jpeg', 'png', 'webp'] as const) {
    expect(typeOfKind(kind)).toBe(`image/${kind}`);
    expect(refuseKind(kind)).toBeNull();
  }
  for (const kind of ['heic', 'gif', 'tiff', 'svg', 'pdf', 'archive', 'video', 'other'] as const) {
    expect(typeOfKind(kind)).toBeNull();
    expect(refuseKind(kind)).toMatch(/^This is .*: .*\.$/);
  }
});

test('25 MB are taken, a byte more is not, nor nothing, nor what is no number', () => {
  expect(refuseSize(PHOTO_MAX_BYTES)).toBeNull();
  expect(refuseSize(1)).toBeNull();
  for (const size of [PHOTO_MAX_BYTES + 1, 0, -1, NaN, Infinity])
    expect(refuseSize(size)).not.toBeNull();
});

test('whatever the bytes, telling kinds and ends answers and never runs past the file', () => {
  const heads = ['\xff\xd8\xff', '\x89PNG\r\n\x1a\n', 'RIFF\x20\0\0\0WEBPVP8X', ''].map(bytes);
  const file = fc
    .tuple(fc.constantFrom(...heads), fc.uint8Array({ maxLength: 400 }))
    .map(([head, rest]) => Buffer.concat([head, rest]));
  fc.assert(
    fc.property(file, fc.constantFrom('jpeg', 'png', 'webp'), (given, kind) => {
      kindByBytes(given.subarray(0, 256));
      const found = pictureEnd(given, kind);
      if (found) {
        expect(found.end).toBeGreaterThan(0);
        expect(found.end).toBeLessThanOrEqual(given.length);
        stowaway(given, found.end);
      }
    }),
    { numRuns: 2000 },
  );
});

test('so many run at a time, the rest in order, and one that fails makes room', async () => {
  const inTurn = turns(2);
  let running = 0;
  let most = 0;
  const order: number[] = [];
  const work = (n: number) =>
    inTurn(async () => {
      running += 1;
      most = Math.max(most, running);
      order.push(n);
      await new Promise((go) => setTimeout(go, 3));
      running -= 1;
      if (n % 3 === 0) throw new Error('failed');
    });
  const all = await Promise.allSettled(Array.from({ length: 12 }, (_, n) => work(n)));
  expect(all.filter(({ status }) => status === 'rejected')).toHaveLength(4);
  expect(most).toBe(2);
  expect(order).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11]);
});
