/** Services that fail and come back, and two processes of the app on one database. */
import { randomBytes, randomUUID } from 'node:crypto';
import { setTimeout as pause } from 'node:timers/promises';
import { eq, isNull, sql } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import type { Upload } from '@/contracts/photos';
import { outbox } from '@/db/schema/outbox';
import { photos } from '@/db/schema/photos';
import { ask } from '../fixtures/ask';
import { askerNamed } from '../fixtures/every-call';
import { clearFaults, objectsIn, orderFault } from '../fixtures/faults-of-services';
import { awaitLetters, lettersTo } from '../fixtures/inbox';
import { startLastingApp, type LastingApp } from '../fixtures/lasting-app';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { cameraJpeg } from '../fixtures/pictures';
import { steadyClient } from '../fixtures/steady-client';

let app: LastingApp;
let shop: MarkedShop;
beforeAll(async () => {
  app = await startLastingApp({ ...MARKED_SETTINGS, WORKER: '1' });
  shop = await openMarkedShop(app.now());
});
afterEach(async () => {
  await clearFaults('store');
  await clearFaults('mail');
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const headers = () => askerNamed(shop, 'senior').headers;
const post = (path: string, json?: unknown, origin = app.now().origin) =>
  ask({ origin }, { method: 'POST', path, json, headers: headers() });
const freshEmail = () => `${randomBytes(8).toString('hex')}@customer.example`;

const intake = (email: string, origin?: string) =>
  post(
    '/api/tickets',
    {
      customer: { name: 'Ida', email },
      instrument: { maker: 'Lumeford', model: 'LM-90', serial: randomUUID() },
      symptoms: ['dead'],
    },
    origin,
  );

test('uploads survive a store that fails, delays and cuts: each is ready in the end, with all its objects', async () => {
  const client = steadyClient(() => app.now().origin, headers());
  const path = `/api/tickets/${shop.tickets.anna.number}/photos`;
  const begin = { fileName: 'a.jpg', type: 'image/jpeg', side: 'front', phase: 'before' };
  const ids: string[] = [];
  for (let i = 0; i < 12; i++) {
    const file = await cameraJpeg(200 + i, 100);
    const begun = await post(path, { ...begin, bytes: file.length });
    const upload = (await begun.json()) as Upload;
    const body = new Uint8Array(file);
    const put = await fetch(upload.url, { method: 'PUT', headers: upload.headers, body });
    expect(put.status).toBe(200);
    ids.push(upload.photo);
  }
  // More than the client behind the port tries again by itself.
  const toPhotos = { method: 'PUT', key: 'photos/*' };
  await orderFault('store', { match: toPhotos, kind: 'status', status: 500, times: 20 });
  await orderFault('store', { match: toPhotos, kind: 'drop', when: 'after', times: 6 });
  await orderFault('store', {
    match: { method: 'GET', key: 'uploads/*' },
    kind: 'truncate',
    times: 4,
  });
  const first = await post(`/api/photos/${ids[0]}/done`);
  expect([200, 503]).toContain(first.status);
  const done = await Promise.all(
    ids.map((id) => client.send({ method: 'POST', path: `/api/photos/${id}/done` })),
  );
  expect(done.map(({ status }) => status)).toEqual(ids.map(() => 200));
  expect(client.repeats()).toBeGreaterThan(0);
  const objects = await objectsIn(app.now().bucket);
  for (const id of ids) {
    const [row] = await shop.db.select().from(photos).where(eq(photos.publicId, id));
    expect(row?.state).toBe('ready');
    for (const { key } of row?.variants ?? []) expect(objects.has(key)).toBe(true);
    expect(objects.has(`uploads/${id}`)).toBe(false);
  }
});

test('a letter the mail server refuses for a while arrives once it is taken again', async () => {
  const email = freshEmail();
  const match = { to: email };
  await orderFault('mail', { match, kind: 'reject', stage: 'rcpt', code: 450, times: 2 });
  expect((await intake(email)).status).toBe(201);
  const [letter] = await awaitLetters(email, 1, 30_000);
  expect(letter?.subject).toMatch(/^Receipt /);
  await pause(1_500);
  expect(await lettersTo(email)).toHaveLength(1);
});

test('a mail server that cannot be reached keeps nobody waiting at the counter', async () => {
  const email = freshEmail();
  await orderFault('mail', { kind: 'drop', stage: 'connect', times: 2 });
  const started = performance.now();
  expect((await intake(email)).status).toBe(201);
  expect(performance.now() - started).toBeLessThan(3_000);
  expect(await awaitLetters(email, 1, 30_000)).toHaveLength(1);
});

test('a letter that nobody takes is laid aside after ten tries, where the owner sees it', async () => {
  const email = freshEmail();
  await orderFault('mail', { match: { to: email }, kind: 'reject', code: 550, times: 50 });
  const answer = await intake(email);
  const { number } = (await answer.json()) as { number: string };
  const mine = eq(outbox.onceKey, `receipt:${number}:1`);
  const row = async () => (await shop.db.select().from(outbox).where(mine))[0];
  // The pauses between the tries grow to minutes: they are passed over here.
  for (const until = Date.now() + 40_000; !(await row())?.deadAt && Date.now() < until;) {
    await shop.db
      .update(outbox)
      .set({ dueAt: new Date() })
      .where(sql`${mine} AND done_at IS NULL`);
    await pause(150);
  }
  expect(await row()).toMatchObject({ attempts: 10, doneAt: null });
  const page = await ask(app.now(), {
    method: 'GET',
    path: '/outbox',
    headers: askerNamed(shop, 'owner').headers,
  });
  const html = await page.text();
  expect(html).toContain('550');
  expect(html).not.toContain(number);
});

test('two processes share the outbox and send no letter twice', async () => {
  const other = await app.another();
  const origins = [app.now().origin, other.origin];
  const email = freshEmail();
  const letters = 60;
  const taken = Array.from({ length: letters }, (_, i) => intake(email, origins[i % 2]));
  const statuses = (await Promise.all(taken)).map(({ status }) => status);
  expect(new Set(statuses)).toEqual(new Set([201]));
  const arrived = await awaitLetters(email, letters, 40_000);
  for (const until = Date.now() + 20_000; Date.now() < until; await pause(100)) {
    const waiting = await shop.db.select().from(outbox).where(isNull(outbox.doneAt));
    if (waiting.every(({ kind, deadAt }) => kind === 'photo' || deadAt !== null)) break;
  }
  await pause(1_500);
  expect(await lettersTo(email)).toHaveLength(letters);
  expect(new Set(arrived.map(({ subject }) => subject)).size).toBe(letters);
  // Both had a hand in it.
  for (const one of [app.now(), other]) expect(one.log()).toContain('"status":201');
});
