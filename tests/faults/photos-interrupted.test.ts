import { setTimeout as pause } from 'node:timers/promises';
import { afterEach, expect, test } from 'vitest';
import { eq } from 'drizzle-orm';
import { outbox } from '@/db/schema/outbox';
import { photos } from '@/db/schema/photos';
import { ticketEvents, ticketNotes } from '@/db/schema/tickets';
import { startApp } from '../fixtures/app';
import { openPhotoShop, put, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg } from '../fixtures/pictures';

let closing: (() => Promise<unknown>)[] = [];
afterEach(async () => {
  for (const close of closing.reverse()) await close();
  closing = [];
});

/** Every variant of every ready photo is in the store. */
async function allThere(shop: TestPhotoShop): Promise<void> {
  const rows = await shop.db.select().from(photos).where(eq(photos.state, 'ready'));
  const keys = new Set(await shop.objects());
  for (const row of rows) {
    expect(row.variants).toHaveLength(4);
    for (const { key } of row.variants ?? []) expect(keys.has(key), key).toBe(true);
  }
}

const UPLOADS = 200;

/** Begins all uploads and puts their files, ten at a time. */
async function putAll(shop: TestPhotoShop): Promise<string[]> {
  const ids: string[] = [];
  for (let n = 0; n < UPLOADS; n += 10) {
    const some = Array.from({ length: 10 }, async (_, i) => {
      const made = await put(shop, shop.anna.ticket.number, await cameraJpeg(200 + n + i, 120));
      if ('upload' in made) ids.push(made.upload.photo);
    });
    await Promise.all(some);
  }
  return ids;
}

/** Writes notes on a ticket, one after another, until it fails; answers those that were acknowledged. */
async function writeNotes(shop: TestPhotoShop, writer: number): Promise<string[]> {
  const acknowledged: string[] = [];
  const path = `/api/tickets/${shop.bruno.ticket.number}/notes`;
  for (let n = 0; ; n++) {
    const body = `note ${writer}.${n}`;
    const answer = await shop.call('counter', 'POST', path, { json: { body } }).catch(() => null);
    if (answer?.status !== 201) return acknowledged;
    acknowledged.push(body);
  }
}

test('after the app is killed amid 200 uploads and ticket writes, what was acknowledged is there once and nothing points to nothing', async () => {
  const first = await startApp({ env: { WORKER: '0' } });
  const shop = await openPhotoShop(first);
  closing = [first.stop, shop.close, shop.clearFaults];
  const ids = await putAll(shop);
  expect(ids).toHaveLength(UPLOADS);
  await shop.fault({
    match: { method: 'PUT', key: 'photos/*' },
    kind: 'delay',
    ms: 30,
    times: 900,
  });
  const answered = new Set<string>();
  const asked = Promise.allSettled(
    ids.map(async (id) => {
      const answer = await shop.call('technician', 'POST', `/api/photos/${id}/done`);
      if (answer.status === 200) answered.add(id);
    }),
  );
  const writing = Promise.all([1, 2].map((writer) => writeNotes(shop, writer)));
  for (const until = Date.now() + 60_000; answered.size < 40 && Date.now() < until;) await pause(5);
  await first.kill9();
  await asked;
  const acknowledged = (await writing).flat();
  await shop.clearFaults();
  expect(answered.size).toBeGreaterThanOrEqual(40);
  expect(answered.size).toBeLessThan(UPLOADS);
  expect(acknowledged.length).toBeGreaterThan(5);
  const readyIds = async () => {
    const rows = await shop.db.select().from(photos).where(eq(photos.state, 'ready'));
    return rows.map((row) => row.publicId);
  };
  expect(await readyIds()).toEqual(expect.arrayContaining([...answered]));
  await allThere(shop);

  // The promised jobs are due a minute after the request; the test does not wait for it.
  const jobs = eq(outbox.kind, 'photo');
  await shop.db.update(outbox).set({ dueAt: new Date() }).where(jobs);
  const promised = (await shop.db.select().from(outbox).where(jobs)).length;
  expect(promised).toBeGreaterThan(answered.size);
  const second = await startApp({ databaseName: first.databaseName });
  closing.push(second.stop);
  for (const until = Date.now() + 90_000; Date.now() < until; await pause(200))
    if ((await readyIds()).length >= promised) break;
  expect((await readyIds()).length).toBeGreaterThanOrEqual(promised);
  await allThere(shop);

  const headers = { cookie: shop.cookies.technician };
  for (const id of ids) {
    const path = `${second.origin}/api/photos/${id}`;
    expect((await fetch(`${path}/done`, { method: 'POST', headers })).status).toBe(200);
    expect((await fetch(`${path}/thumb`, { headers })).status).toBe(200);
  }
  expect((await readyIds()).sort()).toEqual([...ids].sort());
  const events = await shop.db.select().from(ticketEvents).where(eq(ticketEvents.kind, 'photo'));
  expect(events).toHaveLength(UPLOADS);
  const notes = (await shop.db.select().from(ticketNotes)).map(({ body }) => body);
  for (const body of acknowledged) expect(notes.filter((note) => note === body)).toHaveLength(1);
}, 600_000);
