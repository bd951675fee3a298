import { afterAll, beforeAll, expect, test } from 'vitest';
import sharp from 'sharp';
import { eq } from 'drizzle-orm';
import type { PhotoView } from '@/contracts/photos';
import { photos } from '@/db/schema/photos';
import { ticketEvents } from '@/db/schema/tickets';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, taken, type TestPhotoShop } from '../fixtures/photo-shop';
import { CAMERA_MAKE, CAMERA_OWNER, cameraJpeg, png, webp } from '../fixtures/pictures';

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

const picture = async (id: string, variant: string, accept = 'image/webp,*/*') => {
  const path = `/api/photos/${id}/${variant}`;
  const answer = await shop.call('technician', 'GET', path, { headers: { accept } });
  return { answer, bytes: Buffer.from(await answer.arrayBuffer()) };
};

/** The colour at a place given in shares of width and height. */
async function colourAt(bytes: Buffer, x: number, y: number): Promise<number[]> {
  const { data, info } = await sharp(bytes)
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  const at = (Math.floor(y * info.height) * info.width + Math.floor(x * info.width)) * 3;
  return [...data.subarray(at, at + 3)];
}

const near = (found: number[], wanted: number[], by = 16) =>
  found.every((value, i) => Math.abs(value - (wanted[i] ?? 0)) <= by);
const RED = [0xd0, 0x20, 0x20];
const GREEN = [0x20, 0xa0, 0x30];
const BLUE = [0x20, 0x40, 0xc0];
const WHITE = [0xf0, 0xf0, 0xf0];

// Orientation 6 (EXIF 2.32, tag 0x0112): the 0th row is the visual right side, the 0th column the visual top, so the
// picture is shown turned a quarter clockwise: the stored bottom left corner becomes the top left one.
test('a 12 MP photo taken upright comes out upright, with nothing of the camera left in any variant', async () => {
  const file = await cameraJpeg(4032, 3024, 6);
  const before = await sharp(file).metadata();
  expect(before.orientation).toBe(6);
  expect(before.exif?.includes(CAMERA_OWNER)).toBe(true);
  const photo = await taken(shop, shop.anna.ticket.number, file, { fileName: 'IMG 1.JPG' });
  expect([photo.width, photo.height]).toEqual([3000, 4000]);

  const sizes = { thumb: [300, 400], page: [1200, 1600], full: [3000, 4000] };
  for (const [variant, size] of Object.entries(sizes)) {
    for (const accept of ['image/webp', 'image/avif,image/webp']) {
      const { answer, bytes } = await picture(photo.id, variant, accept);
      const kind = variant === 'thumb' && accept.includes('avif') ? 'image/avif' : 'image/webp';
      expect(answer.headers.get('content-type')).toBe(kind);
      expect(Number(answer.headers.get('content-length'))).toBe(bytes.length);
      const about = await sharp(bytes).metadata();
      expect([about.width, about.height]).toEqual(size);
      for (const kept of ['exif', 'xmp', 'iptc', 'icc'] as const)
        expect(about[kept], `${variant} ${accept} ${kept}`).toBeUndefined();
      expect(about.orientation ?? 1).toBe(1);
      for (const trace of [CAMERA_MAKE, CAMERA_OWNER, 'Exif\0\0', '2026:12:01'])
        expect(bytes.includes(trace), `${variant} ${trace}`).toBe(false);
      expect(near(await colourAt(bytes, 0.25, 0.25), BLUE), variant).toBe(true);
      expect(near(await colourAt(bytes, 0.75, 0.25), RED), variant).toBe(true);
      expect(near(await colourAt(bytes, 0.25, 0.75), WHITE), variant).toBe(true);
      expect(near(await colourAt(bytes, 0.75, 0.75), GREEN), variant).toBe(true);
    }
  }
  const keys = await shop.objects();
  expect(keys.filter((key) => key.startsWith('uploads/'))).toEqual([]);
});

test('PNG and WebP are taken as well, and keep their size when they are small', async () => {
  for (const [file, type] of [
    [await png(), 'image/png'],
    [await webp(), 'image/webp'],
  ] as const) {
    const photo = await taken(shop, shop.anna.ticket.number, file, { type, fileName: 'x' });
    const { bytes } = await picture(photo.id, 'full');
    expect((await sharp(bytes).metadata()).width).toBe(320);
    expect(near(await colourAt(bytes, 0.25, 0.25), RED)).toBe(true);
  }
});

test('colours of a wide-gamut file are converted to sRGB, not relabelled', async () => {
  // The P3 green primary lies outside sRGB; sRGB (32,160,48) written in P3 has other numbers than in sRGB.
  const inP3 = await sharp(await png())
    .withIccProfile('p3')
    .png()
    .toBuffer();
  const stored = await sharp(inP3, { ignoreIcc: true }).removeAlpha().raw().toBuffer();
  const greenAt = (60 * 320 + 240) * 3;
  expect(Math.abs((stored[greenAt] ?? 0) - 0x20)).toBeGreaterThan(30);
  const photo = await taken(shop, shop.anna.ticket.number, inP3, { type: 'image/png' });
  const { bytes } = await picture(photo.id, 'full');
  expect(near(await colourAt(bytes, 0.75, 0.25), GREEN)).toBe(true);
});

test('what the camera appended to a photo is not served', async () => {
  const film = Buffer.concat([
    Buffer.from('\0\0\0\x18ftypmp42', 'latin1'),
    Buffer.alloc(9000, 0x55),
  ]);
  const photo = await taken(
    shop,
    shop.anna.ticket.number,
    Buffer.concat([await cameraJpeg(), film]),
  );
  for (const variant of ['thumb', 'page', 'full']) {
    const { bytes } = await picture(photo.id, variant);
    expect(bytes.includes('ftypmp42') || bytes.includes(Buffer.alloc(500, 0x55))).toBe(false);
  }
});

test('staff’s browsers keep pictures for a while, privately, and ask for them again by their tag', async () => {
  const photo = await taken(shop, shop.anna.ticket.number, await cameraJpeg(900, 700));
  const { answer } = await picture(photo.id, 'page');
  expect(answer.headers.get('cache-control')).toBe('private, max-age=600');
  expect(answer.headers.get('vary')).toContain('accept');
  const etag = answer.headers.get('etag') ?? '';
  const ask = (tag: string) =>
    shop.call('technician', 'GET', `/api/photos/${photo.id}/page`, {
      headers: { 'if-none-match': tag },
    });
  expect((await ask(etag)).status).toBe(304);
  expect((await ask('"another"')).status).toBe(200);
});

test('the same file twice at once is two photos on one set of objects', async () => {
  const file = await cameraJpeg(801, 601);
  const { anna, bruno } = shop;
  const before = (await shop.objects()).length;
  const [a, b] = await Promise.all([
    taken(shop, anna.ticket.number, file),
    taken(shop, bruno.ticket.number, file),
  ]);
  expect(a.id).not.toBe(b.id);
  expect((await shop.objects()).length - before).toBe(4);
  expect(
    (await shop.call('technician', 'DELETE', `/api/photos/${a.id}`, { version: 1 })).status,
  ).toBe(204);
  expect((await picture(b.id, 'full')).answer.status).toBe(200);
  expect((await picture(a.id, 'full')).answer.status).toBe(404);
  expect(
    (await shop.call('technician', 'DELETE', `/api/photos/${b.id}`, { version: 1 })).status,
  ).toBe(204);
  expect((await shop.objects()).length).toBe(before);
});

test('asking twice at once whether an upload is done makes one ready photo and one event', async () => {
  const { put } = await import('../fixtures/photo-shop');
  const { number, id } = shop.bruno.other;
  const begun = await put(shop, number, await cameraJpeg(1200, 900));
  if (!('upload' in begun)) throw new Error('refused');
  const path = `/api/photos/${begun.upload.photo}/done`;
  const answers = await Promise.all([1, 2, 3].map(() => shop.call('technician', 'POST', path)));
  expect(answers.map((answer) => answer.status)).toEqual([200, 200, 200]);
  const events = await shop.db.select().from(ticketEvents).where(eq(ticketEvents.ticketId, id));
  expect(events.map((event) => [event.kind, event.open])).toEqual([['photo', false]]);
});

test('sharing is told to the customer once, and an edit from an old version is refused with both', async () => {
  const { number, id } = shop.bruno.ticket;
  const photo = await taken(shop, number, await cameraJpeg(500, 400));
  const path = `/api/photos/${photo.id}`;
  const edit = (json: object, version: number) =>
    shop.call('technician', 'PATCH', path, { json, version });
  const shared = await edit({ shared: true, caption: 'Burnt MOV' }, 1);
  expect(shared.status).toBe(200);
  expect(shared.headers.get('etag')).toBe('"2"');
  expect(await shared.json()).toMatchObject({ shared: true, caption: 'Burnt MOV', version: 2 });
  expect((await edit({ side: 'back' }, 2)).status).toBe(200);
  const stale = await edit({ side: 'other' }, 2);
  expect(stale.status).toBe(412);
  expect(await stale.json()).toMatchObject({ given: 2, current: { version: 3, side: 'back' } });
  expect((await edit({}, 3)).status).toBe(422);
  expect((await shop.call('technician', 'PATCH', path, { json: { side: 'back' } })).status).toBe(
    428,
  );
  const events = await shop.db.select().from(ticketEvents).where(eq(ticketEvents.ticketId, id));
  expect(events.filter((event) => event.open).map((event) => event.step)).toEqual(['shared']);
  expect((await shop.call('technician', 'DELETE', path, { version: 1 })).status).toBe(412);
  const listed = await shop.call('counter', 'GET', `/api/tickets/${number}/photos`);
  const { items } = (await listed.json()) as { items: PhotoView[] };
  expect(items.map((item) => item.id)).toEqual([photo.id]);
});

test('a begun upload can be called off, and a repeat with its key is the same upload', async () => {
  const { number } = shop.anna.ticket;
  const json = { fileName: 'a.jpg', type: 'image/jpeg', bytes: 9, side: 'front', phase: 'after' };
  const begin = (key: string) =>
    shop.call('technician', 'POST', `/api/tickets/${number}/photos`, {
      json,
      headers: { 'idempotency-key': key },
    });
  const first = (await (await begin('k1')).json()) as { photo: string; version: number };
  const again = (await (await begin('k1')).json()) as { photo: string };
  expect(again.photo).toBe(first.photo);
  const { version } = first;
  const away = await shop.call('technician', 'DELETE', `/api/photos/${first.photo}`, { version });
  expect(away.status).toBe(204);
  const rows = await shop.db.select().from(photos).where(eq(photos.publicId, first.photo));
  expect(rows).toEqual([]);
});

test('a file that never arrived is said so, and the ticket must exist', async () => {
  const json = { fileName: 'a.jpg', type: 'image/jpeg', bytes: 9, side: 'front', phase: 'after' };
  const path = `/api/tickets/${shop.anna.ticket.number}/photos`;
  const begun = await shop.call('technician', 'POST', path, { json });
  const { photo } = (await begun.json()) as { photo: string };
  const early = await shop.call('technician', 'POST', `/api/photos/${photo}/done`);
  expect(early.status).toBe(409);
  expect(await early.json()).toMatchObject({
    detail: 'The file has not arrived: upload it first.',
  });
  const nowhere = await shop.call('technician', 'POST', '/api/tickets/2612-9999/photos', { json });
  expect(nowhere.status).toBe(404);
});
