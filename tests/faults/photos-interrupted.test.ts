import { setTimeout as pause } from 'node:timers/promises';
import { afterEach, expect, test } from 'vitest';
import { eq } from 'drizzle-orm';
import { outbox } from '@/db/schema/outbox';
import { photos } from '@/db/schema/photos';
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

test('after the app is killed in the middle of uploads, each one announced is ready once or can be announced again', async () => {
  const first = await startApp({ env: { WORKER: '0' } });
  const shop = await openPhotoShop(first);
  closing = [first.stop, shop.close, shop.clearFaults];
  const ids: string[] = [];
  for (let n = 0; n < 12; n++) {
    const made = await put(shop, shop.anna.ticket.number, await cameraJpeg(400 + n, 300));
    if ('upload' in made) ids.push(made.upload.photo);
  }
  await shop.fault({
    match: { method: 'PUT', key: 'photos/*' },
    kind: 'delay',
    ms: 250,
    times: 60,
  });
  const answered = new Set<string>();
  const asked = Promise.allSettled(
    ids.map(async (id) => {
      const answer = await shop.call('technician', 'POST', `/api/photos/${id}/done`);
      if (answer.status === 200) answered.add(id);
    }),
  );
  for (const until = Date.now() + 20_000; answered.size < 3 && Date.now() < until;) await pause(20);
  await first.kill9();
  await asked;
  await shop.clearFaults();
  expect(answered.size).toBeGreaterThanOrEqual(3);
  expect(answered.size).toBeLessThan(12);
  const readyIds = async () => {
    const rows = await shop.db.select().from(photos).where(eq(photos.state, 'ready'));
    return rows.map((row) => row.publicId);
  };
  const ready = await readyIds();
  for (const id of answered) expect(ready).toContain(id);
  await allThere(shop);

  // The promised jobs are due a minute after the request; the test does not wait for it.
  await shop.db.update(outbox).set({ dueAt: new Date() }).where(eq(outbox.kind, 'photo'));
  const promised = await shop.db.select().from(outbox).where(eq(outbox.kind, 'photo'));
  const second = await startApp({ databaseName: first.databaseName });
  closing.push(second.stop);
  for (const until = Date.now() + 60_000; Date.now() < until; await pause(200))
    if ((await readyIds()).length >= promised.length) break;
  expect((await readyIds()).length).toBeGreaterThanOrEqual(promised.length);
  await allThere(shop);
  for (const id of ids) {
    const path = `${second.origin}/api/photos/${id}`;
    const headers = { cookie: shop.cookies.technician };
    expect((await fetch(`${path}/done`, { method: 'POST', headers })).status).toBe(200);
    expect((await fetch(`${path}/full`, { headers })).status).toBe(200);
  }
  expect((await readyIds()).sort()).toEqual([...ids].sort());
});
