import { afterAll, beforeAll, expect, test } from 'vitest';
import { eq } from 'drizzle-orm';
import { photos } from '@/db/schema/photos';
import { sweepPhotos, sweepPictures } from '@/server/photos/sweep';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, put, taken, upload, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg, heic } from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
beforeAll(async () => {
  app = await startApp({ env: { WORKER: '0' } });
  shop = await openPhotoShop(app);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const hours = (n: number) => new Date(Date.now() + n * 3_600_000);
const begun = async (file: Buffer) => {
  const made = await put(shop, shop.anna.ticket.number, file);
  if (!('upload' in made)) throw new Error('refused');
  return made.upload.photo;
};
const there = async (id: string) =>
  (await shop.db.select({ id: photos.id }).from(photos).where(eq(photos.publicId, id))).length ===
  1;

test('an upload that never came goes after an hour, one that came but was not announced after a day', async () => {
  const came = await begun(await cameraJpeg());
  const never = await begun(await cameraJpeg());
  await shop.inside.store.remove(`uploads/${never}`);
  await sweepPhotos(shop.inside, hours(0.9));
  expect([await there(never), await there(came)]).toEqual([true, true]);
  await sweepPhotos(shop.inside, hours(1.1));
  expect([await there(never), await there(came)]).toEqual([false, true]);
  expect(await shop.objects()).toContain(`uploads/${came}`);
  await sweepPhotos(shop.inside, hours(24.1));
  expect(await there(came)).toBe(false);
  expect(await shop.objects()).not.toContain(`uploads/${came}`);
});

test('a refused row goes after a day, a ready one never', async () => {
  const ready = await taken(shop, shop.anna.ticket.number, await cameraJpeg());
  await upload(shop, shop.anna.ticket.number, heic());
  const refused = () => shop.db.select().from(photos).where(eq(photos.state, 'refused'));
  await sweepPhotos(shop.inside, hours(23));
  expect(await refused()).toHaveLength(1);
  await sweepPhotos(shop.inside, hours(25));
  expect(await refused()).toHaveLength(0);
  await sweepPhotos(shop.inside, hours(24 * 400));
  expect(await there(ready.id)).toBe(true);
});

test('objects without a row go after a day; those of a ready photo stay', async () => {
  const { id } = await taken(shop, shop.anna.ticket.number, await cameraJpeg(333, 222));
  const held = (await shop.objects()).filter((key) => key.startsWith('photos/'));
  const orphans = [0, 1].map((n) => `photos/ab/${'ab'.repeat(31)}0${n}-page.webp`);
  const stray = 'uploads/AAAAAAAAAAAAAAAAAAAAAA';
  const nothing = new Uint8Array([1]);
  for (const key of [...orphans, stray]) await shop.inside.store.put(key, nothing, 'image/webp');
  await sweepPictures(shop.inside, 'photos/', hours(23));
  await sweepPhotos(shop.inside, hours(23));
  expect(await shop.objects()).toEqual(expect.arrayContaining([...orphans, stray]));
  await sweepPictures(shop.inside, 'photos/', hours(25));
  await sweepPhotos(shop.inside, hours(25));
  expect((await shop.objects()).sort()).toEqual(held.sort());
  expect((await shop.call('technician', 'GET', `/api/photos/${id}/full`)).status).toBe(200);
});

test('sixteen rounds, ten minutes apart, look at every picture', async () => {
  const keys = [...'0123456789abcdef'].map((d) => `photos/${d}0/${d}${'0'.repeat(63)}-page.webp`);
  for (const key of keys) await shop.inside.store.put(key, new Uint8Array([1]), 'image/webp');
  for (let round = 0; round < 16; round++) await sweepPhotos(shop.inside, hours(48 + round / 6));
  const left = await shop.objects();
  expect(keys.filter((key) => left.includes(key))).toEqual([]);
});
