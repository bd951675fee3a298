import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import { setTimeout as pause } from 'node:timers/promises';
import { eq } from 'drizzle-orm';
import type { PhotoView } from '@/contracts/photos';
import { outbox } from '@/db/schema/outbox';
import { photos } from '@/db/schema/photos';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, put, taken, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg, heic } from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
beforeAll(async () => {
  app = await startApp();
  shop = await openPhotoShop(app);
});
afterEach(() => shop.clearFaults());
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

let width = 300;
/** A file of its own every time, so that tests do not share objects. */
const fresh = () => cameraJpeg((width += 1), 200);
const begun = async (file: Buffer) => {
  const made = await put(shop, shop.anna.ticket.number, file);
  if (!('upload' in made)) throw new Error('refused');
  return made.upload.photo;
};
const done = (id: string) => shop.call('technician', 'POST', `/api/photos/${id}/done`);
const rowOf = async (id: string) =>
  (await shop.db.select().from(photos).where(eq(photos.publicId, id)))[0];
const served = async (id: string) =>
  (await shop.call('technician', 'GET', `/api/photos/${id}/full`)).status;

// The SDK asks three times, so a fault that lasts must happen more often than that.
test.each<[string, Record<string, unknown>]>([
  [
    'cannot say whether the file is there',
    { match: { method: 'HEAD' }, kind: 'status', status: 500 },
  ],
  ['does not hand out the file', { match: { method: 'GET', key: 'uploads/*' }, kind: 'status' }],
  ['breaks off in the middle of the file', { match: { method: 'GET' }, kind: 'truncate' }],
  [
    'hangs up instead of taking a variant',
    { match: { method: 'PUT', key: 'photos/*' }, kind: 'drop' },
  ],
  ['takes no variant', { match: { method: 'PUT', key: 'photos/*' }, kind: 'status', status: 500 }],
])(
  'when the store %s, the answer is honest, nothing points to nothing, and asking again works',
  async (_name, fault) => {
    const id = await begun(await fresh());
    await shop.fault({ ...fault, times: 20 });
    const failed = await done(id);
    expect(failed.status).toBe(503);
    expect(failed.headers.get('retry-after')).toBe('3');
    expect(((await failed.json()) as { detail: string }).detail).toMatch(/the upload is kept/);
    expect((await rowOf(id))?.state).toBe('waiting');
    expect(await served(id)).toBe(404);
    await shop.clearFaults();
    const again = await done(id);
    expect(again.status).toBe(200);
    expect(((await again.json()) as PhotoView).id).toBe(id);
    expect(await served(id)).toBe(200);
  },
);

test('a slow store and one that loses a single answer go unnoticed', async () => {
  const id = await begun(await fresh());
  await shop.fault({ match: { method: 'PUT', key: 'photos/*' }, kind: 'delay', ms: 700, times: 2 });
  await shop.fault({ match: { method: 'PUT', key: 'photos/*' }, kind: 'drop', when: 'after' });
  await shop.fault({ match: { method: 'GET', key: 'uploads/*' }, kind: 'status', status: 503 });
  expect((await done(id)).status).toBe(200);
  expect(await served(id)).toBe(200);
});

test('a refusal waits until the file is really gone', async () => {
  const id = await begun(heic());
  await shop.fault({ match: { method: 'DELETE' }, kind: 'status', status: 500, times: 20 });
  expect((await done(id)).status).toBe(503);
  expect((await rowOf(id))?.state).toBe('waiting');
  await shop.clearFaults();
  expect((await done(id)).status).toBe(422);
  expect(await shop.objects()).not.toContain(`uploads/${id}`);
});

test('an upload that was announced as done is finished by the worker', async () => {
  const id = await begun(await fresh());
  await shop.fault({ match: { method: 'PUT', key: 'photos/*' }, kind: 'status', times: 20 });
  expect((await done(id)).status).toBe(503);
  await shop.clearFaults();
  const row = await rowOf(id);
  const once = `photo:${row?.id}`;
  const jobs = await shop.db.select().from(outbox).where(eq(outbox.onceKey, once));
  expect(jobs.map((job) => job.kind)).toEqual(['photo']);
  await shop.db.update(outbox).set({ dueAt: new Date() }).where(eq(outbox.onceKey, once));
  for (const until = Date.now() + 20_000; Date.now() < until; await pause(200))
    if ((await rowOf(id))?.state === 'ready') break;
  expect((await rowOf(id))?.state).toBe('ready');
  expect(await served(id)).toBe(200);
});

test('a store that does not hand out a picture is said to be away, and the picture is back with it', async () => {
  const { id } = await taken(shop, shop.anna.ticket.number, await fresh());
  await shop.fault({ match: { method: 'GET', key: 'photos/*' }, kind: 'status', times: 3 });
  const away = await shop.call('technician', 'GET', `/api/photos/${id}/page`);
  expect(away.status).toBe(503);
  expect(away.headers.get('cache-control')).toBe('no-store');
  await shop.clearFaults();
  expect(await served(id)).toBe(200);
});

test('a photo removed while the store is away is gone at once', async () => {
  const { id } = await taken(shop, shop.anna.ticket.number, await fresh());
  await shop.fault({ match: { method: 'DELETE' }, kind: 'status', times: 20 });
  const path = `/api/photos/${id}`;
  expect((await shop.call('technician', 'DELETE', path, { version: 1 })).status).toBe(204);
  expect(await served(id)).toBe(404);
});

test('removing one photo while another of the same file is made ready never takes its objects', async () => {
  for (const [wait, ms] of [
    [0, 300],
    [20, 300],
    [60, 100],
    [120, 0],
  ] as const) {
    const file = await fresh();
    const first = await taken(shop, shop.anna.ticket.number, file);
    const second = await begun(file);
    if (ms) await shop.fault({ match: { method: 'DELETE', key: 'photos/*' }, kind: 'delay', ms });
    const finishing = done(second);
    await pause(wait);
    const removing = shop.call('technician', 'DELETE', `/api/photos/${first.id}`, { version: 1 });
    expect([(await finishing).status, (await removing).status]).toEqual([200, 204]);
    for (const variant of ['thumb', 'page', 'full']) {
      const answer = await shop.call('technician', 'GET', `/api/photos/${second}/${variant}`);
      expect(answer.status, `${variant} after ${wait} ms`).toBe(200);
    }
    await shop.clearFaults();
  }
});

test('a photo removed while it is being made ready leaves no object', async () => {
  const before = await shop.objects();
  const id = await begun(await fresh());
  await shop.fault({ match: { method: 'PUT', key: 'photos/*' }, kind: 'delay', ms: 800, times: 4 });
  const finishing = done(id);
  await pause(400);
  const path = `/api/photos/${id}`;
  const removed = await shop.call('technician', 'DELETE', path, { version: 1 });
  expect(removed.status).toBe(204);
  expect((await finishing).status).toBe(404);
  expect(await shop.objects()).toEqual(before);
});
