import { afterAll, beforeAll, expect, test } from 'vitest';
import sharp from 'sharp';
import { and, count, eq, isNotNull, or } from 'drizzle-orm';
import { photos } from '@/db/schema/photos';
import { startApp, type TestApp } from '../fixtures/app';
import {
  openPhotoShop,
  taken,
  upload,
  type Claim,
  type TestPhotoShop,
} from '../fixtures/photo-shop';
import * as files from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
beforeAll(async () => {
  app = await startApp();
  shop = await openPhotoShop(app);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const claims = async () =>
  (
    await shop.db
      .select({ n: count() })
      .from(photos)
      .where(
        or(
          eq(photos.state, 'ready'),
          and(
            eq(photos.state, 'refused'),
            or(isNotNull(photos.uploadKey), isNotNull(photos.sha256)),
          ),
        ),
      )
  )[0]?.n;

type Case = [name: string, file: () => Promise<Buffer> | Buffer, claim: Claim, sentence: RegExp];

const withTail = async (tail: string | Buffer) =>
  Buffer.concat([await files.cameraJpeg(), Buffer.from(tail)]);
const cut = (file: Buffer) => file.subarray(0, Math.floor(file.length * 0.6));
/** Real detail, so that a cut falls into the picture itself. */
const noisy = () =>
  sharp({
    create: {
      width: 640,
      height: 480,
      channels: 3,
      background: '#222222',
      noise: { type: 'gaussian', mean: 128, sigma: 40 },
    },
  });

const cases: Case[] = [
  [
    'HEIC named as JPEG',
    () => files.heic(),
    {},
    /HEIC or HEIF.*choose JPEG in the camera’s settings/,
  ],
  ['HEIF image sequence', () => files.heic('msf1'), {}, /HEIC or HEIF/],
  ['AVIF', () => files.heic('avif'), {}, /HEIC or HEIF/],
  ['SVG with a script, named as JPEG', () => Buffer.from(files.svgWithScript), {}, /SVG drawing/],
  ['GIF', async () => (await files.quarters(40, 40)).gif().toBuffer(), {}, /a GIF/],
  ['TIFF', async () => (await files.quarters(40, 40)).tiff().toBuffer(), {}, /a TIFF/],
  ['PDF', () => Buffer.from('%PDF-1.7\n%\xe2\xe3\xcf\xd3\n1 0 obj'), {}, /a PDF/],
  ['zip', () => files.zip(), {}, /an archive/],
  ['bytes of nothing', () => Buffer.alloc(5000, 0xab), {}, /not a picture/],
  ['PNG declared as JPEG', () => files.png(), {}, /announced as image\/jpeg and holds a PNG/],
  ['JPEG cut short', async () => cut(await noisy().jpeg().toBuffer()), {}, /breaks off/],
  [
    'JPEG cut short with an end mark put back',
    async () => Buffer.concat([cut(await noisy().jpeg().toBuffer()), Buffer.from([0xff, 0xd9])]),
    {},
    /damaged/,
  ],
  ['PNG cut short', async () => cut(await files.png()), { type: 'image/png' }, /breaks off/],
  ['WebP cut short', async () => cut(await files.webp()), { type: 'image/webp' }, /breaks off/],
  [
    'PNG with a spoilt byte',
    async () => {
      const file = await noisy().png().toBuffer();
      const middle = Math.floor(file.length / 2);
      file.writeUInt8(file.readUInt8(middle) ^ 0xff, middle);
      return file;
    },
    { type: 'image/png' },
    /damaged/,
  ],
  ['PNG bomb', () => files.pngBomb(), { type: 'image/png' }, /16000 × 16000 pixels: 52 million/],
  ['JPEG bomb', () => files.jpegBomb(), {}, /65000 × 65000 pixels: 52 million/],
  ['moving PNG', () => files.movingPng(), { type: 'image/png' }, /single still photo/],
  ['moving WebP', () => files.movingWebp(), { type: 'image/webp' }, /single still photo/],
  ['JPEG that is a web page too', () => withTail(files.pageWithScript), {}, /a web page/],
  ['JPEG that is an archive too', () => withTail(files.zip()), {}, /an archive/],
  ['JPEG that is a PDF too', () => files.pdfInJpeg(), {}, /a PDF/],
  ['empty file', () => Buffer.alloc(0), { bytes: 12 }, /empty/],
];

test.each(cases)('%s is refused in a sentence and leaves nothing behind', async (...given) => {
  const [, file, claim, sentence] = given;
  const before = { objects: await shop.objects(), claims: await claims() };
  const answer = await upload(shop, shop.anna.ticket.number, await file(), claim);
  expect([413, 422]).toContain(answer.status);
  expect(answer.headers.get('content-type')).toBe('application/problem+json');
  const problem = (await answer.json()) as { detail: string; errors: { path: string }[] };
  expect(problem.detail).toMatch(sentence);
  expect(problem.errors[0]?.path).toBe('file');
  expect(await shop.objects()).toEqual(before.objects);
  expect(await claims()).toBe(before.claims);
});

test('a refused upload says the same reason again and cannot become ready', async () => {
  const { put } = await import('../fixtures/photo-shop');
  const begun = await put(shop, shop.anna.ticket.number, files.heic());
  if (!('upload' in begun)) throw new Error('refused');
  const { photo, url, headers } = begun.upload;
  const done = () => shop.call('technician', 'POST', `/api/photos/${photo}/done`);
  expect((await done()).status).toBe(422);
  const body = new Uint8Array(await files.cameraJpeg());
  expect((await fetch(url, { method: 'PUT', headers, body })).status).toBe(200);
  const again = await done();
  expect(again.status).toBe(409);
  expect(((await again.json()) as { detail: string }).detail).toMatch(/HEIC/);
  await shop.inside.store.remove(`uploads/${photo}`);
});

test.each<[string, Claim, number, RegExp]>([
  ['60 MB', { bytes: 60_000_000 }, 413, /60\.0 MB: 25\.0 MB are taken at most/],
  ['HEIC by name without a type', { fileName: 'IMG_1.HEIC', type: '' }, 422, /HEIC/],
  ['SVG by type', { fileName: 'logo', type: 'image/svg+xml' }, 422, /SVG/],
  ['film', { fileName: 'a.mov', type: 'video/quicktime' }, 422, /a film/],
  ['nothing known', { fileName: 'x', type: '' }, 422, /not a picture/],
])('%s is refused before anything is sent', async (_name, claim, status, sentence) => {
  const [before] = await shop.db.select({ n: count() }).from(photos);
  const answer = await upload(shop, shop.anna.ticket.number, Buffer.from('x'), claim);
  expect(answer.status).toBe(status);
  expect(((await answer.json()) as { detail: string }).detail).toMatch(sentence);
  expect(await shop.db.select({ n: count() }).from(photos)).toEqual([before]);
});

test('60 MB sent under the name of 1 kB are refused by what arrived, without being read', async () => {
  const file = Buffer.concat([await files.cameraJpeg(), Buffer.alloc(60_000_000)]);
  const before = await shop.objects();
  const answer = await upload(shop, shop.anna.ticket.number, file, { bytes: 1000 });
  expect(answer.status).toBe(413);
  expect(((await answer.json()) as { detail: string }).detail).toMatch(
    /25\.0 MB are taken at most/,
  );
  expect(await shop.objects()).toEqual(before);
  expect(await claims()).toBe(0);
});

test('a type that was not promised cannot be put', async () => {
  const json = { fileName: 'a.jpg', type: 'image/jpeg', bytes: 9, side: 'front', phase: 'before' };
  const path = `/api/tickets/${shop.anna.ticket.number}/photos`;
  const begun = await shop.call('technician', 'POST', path, { json });
  const { url } = (await begun.json()) as { url: string };
  const headers = { 'content-type': 'text/html' };
  const answer = await fetch(url, { method: 'PUT', headers, body: files.pageWithScript });
  expect(answer.status).toBe(403);
});

test('the server answers other requests while it refuses and re-encodes', async () => {
  const big = await sharp({
    create: { width: 4032, height: 3024, channels: 3, background: '#246648' },
  })
    .jpeg()
    .toBuffer();
  const work = [1, 2, 3, 4].map(() => taken(shop, shop.bruno.ticket.number, big));
  const waits: number[] = [];
  let over = false;
  const all = Promise.all(work).finally(() => (over = true));
  while (!over) {
    const started = performance.now();
    await shop.call('technician', 'GET', `/api/tickets/${shop.anna.ticket.number}/photos`);
    waits.push(performance.now() - started);
  }
  await all;
  waits.sort((a, b) => a - b);
  expect(waits[Math.floor(waits.length / 2)]).toBeLessThan(1000);
});
