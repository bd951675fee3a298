/**
 * The app killed with -9, several times, while 200 photos and as many ticket writes are under way by clients that
 * repeat what was not acknowledged. In the end everything acknowledged is there, once.
 */
import { randomBytes, randomUUID } from 'node:crypto';
import { setTimeout as pause } from 'node:timers/promises';
import { count, eq, isNull, like } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Upload } from '@/contracts/photos';
import { outbox } from '@/db/schema/outbox';
import { photos } from '@/db/schema/photos';
import { messages, readings, ticketNotes, tickets } from '@/db/schema/tickets';
import { together } from '../fixtures/ask';
import { askerNamed } from '../fixtures/every-call';
import { objectsIn } from '../fixtures/faults-of-services';
import { awaitLetters } from '../fixtures/inbox';
import { startLastingApp, type LastingApp } from '../fixtures/lasting-app';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { cameraJpeg } from '../fixtures/pictures';
import { steadyClient, type SteadyClient } from '../fixtures/steady-client';

const UPLOADS = 200;
const WRITES = 50;
const CLIENTS = 12;
const KILLS = 4;

let app: LastingApp;
let shop: MarkedShop;
let client: SteadyClient;
/** Letters of this run alone: the inbox is shared. */
const email = `${randomBytes(8).toString('hex')}@customer.example`;
const acknowledged = {
  photos: new Set<string>(),
  intakes: new Map<string, string>(),
  readings: new Set<string>(),
  notes: new Set<string>(),
  messages: new Set<string>(),
};

beforeAll(async () => {
  app = await startLastingApp({ ...MARKED_SETTINGS, WORKER: '1' });
  shop = await openMarkedShop(app.now());
  client = steadyClient(() => app.now().origin, askerNamed(shop, 'senior').headers);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

async function expectDone(answer: Response, status: number): Promise<unknown> {
  const text = await answer.text();
  if (answer.status !== status) throw new Error(`${answer.status} where ${status} is due: ${text}`);
  return text === '' ? null : JSON.parse(text);
}

const post = (path: string, json: unknown, key: string = randomUUID()) =>
  client.send({ method: 'POST', path, json, headers: { 'idempotency-key': key } });

/** One photo: begun, put into the store, done. */
async function uploadOne(number: string, file: Buffer): Promise<void> {
  const begin = { fileName: 'a.jpg', type: 'image/jpeg', side: 'front', phase: 'before' };
  const path = `/api/tickets/${number}/photos`;
  const begun = await post(path, { ...begin, bytes: file.length });
  const { url, headers, photo } = (await expectDone(begun, 201)) as Upload;
  const put = await fetch(url, { method: 'PUT', headers, body: new Uint8Array(file) });
  expect(put.status).toBe(200);
  const done = await client.send({ method: 'POST', path: `/api/photos/${photo}/done` });
  await expectDone(done, 200);
  acknowledged.photos.add(photo);
}

async function takeIn(): Promise<void> {
  const json = {
    customer: { name: 'Ida', email },
    instrument: { maker: 'Lumeford', model: 'LM-90', serial: randomUUID() },
    symptoms: ['dead'],
  };
  const answer = await expectDone(await post('/api/tickets', json), 201);
  const { number } = answer as { number: string };
  acknowledged.intakes.set(json.instrument.serial, number);
}

async function read(number: string, place: number): Promise<void> {
  const clientKey = randomUUID();
  const json = { phase: 'as-found', place, from: 'IN', to: 'COM', typed: '1k2', clientKey };
  const answer = await client.send({
    method: 'POST',
    path: `/api/tickets/${number}/readings`,
    json,
  });
  await expectDone(answer, 201);
  acknowledged.readings.add(clientKey);
}

async function write(number: string, what: 'notes' | 'messages'): Promise<void> {
  const body = randomUUID();
  await expectDone(await post(`/api/tickets/${number}/${what}`, { body }), 201);
  acknowledged[what].add(body);
}

/** All errands of the day in one pile, mixed. */
async function pileOfErrands(): Promise<(() => Promise<void>)[]> {
  const { anna, annaToo, bruno } = shop.tickets;
  const files = await Promise.all(
    Array.from({ length: UPLOADS }, (_, i) => cameraJpeg(96 + i, 72, 6)),
  );
  // A ticket holds 200 photos, and these have some already.
  const numbers = [anna.number, bruno.number];
  const pile = files.map((file, i) => () => uploadOne(numbers[i % 2] ?? '', file));
  for (let i = 0; i < WRITES; i++)
    pile.push(
      takeIn,
      () => read(annaToo.number, i),
      () => write(anna.number, 'notes'),
      () => write(annaToo.number, 'messages'),
    );
  // The same order each time, every kind next to every other.
  return pile
    .map((one, i) => ({ one, at: (i * 7919) % pile.length }))
    .sort((a, b) => a.at - b.at)
    .map(({ one }) => one);
}

test('nothing that was acknowledged is lost or done twice', async () => {
  const pile = await pileOfErrands();
  let finished = 0;
  const work = together(
    pile,
    async (errand) => {
      await errand();
      finished += 1;
    },
    CLIENTS,
  );
  for (let kill = 1; kill <= KILLS; kill++) {
    // At a moment of its own each time, with work under way before and after.
    while (finished < (pile.length * kill) / (KILLS + 1.5)) await pause(7);
    await app.crash();
  }
  await work;
  expect(client.repeats()).toBeGreaterThan(KILLS);
  expect(acknowledged.photos.size).toBe(UPLOADS);
  const { db } = shop;
  for (const [serial, number] of acknowledged.intakes) {
    const rows = await db.select().from(tickets).where(eq(tickets.number, number));
    expect(rows, serial).toHaveLength(1);
  }
  const kept = {
    taken: await db.select().from(tickets).where(like(tickets.number, '2612-%')),
    readings: await db
      .select()
      .from(readings)
      .where(eq(readings.ticketId, shop.tickets.annaToo.id)),
    notes: await db
      .select()
      .from(ticketNotes)
      .where(eq(ticketNotes.ticketId, shop.tickets.anna.id)),
    messages: await db
      .select()
      .from(messages)
      .where(eq(messages.ticketId, shop.tickets.annaToo.id)),
  };
  // Beside what stood there before: a reading, a note and two messages.
  expect(kept.taken).toHaveLength(WRITES);
  expect(kept.readings).toHaveLength(WRITES + 1);
  expect(kept.notes).toHaveLength(WRITES + 1);
  expect(kept.messages).toHaveLength(WRITES + 2);
  const bodies = new Set([...kept.notes, ...kept.messages].map(({ body }) => body));
  for (const body of [...acknowledged.notes, ...acknowledged.messages])
    expect(bodies).toContain(body);
  const keys = new Set(kept.readings.map(({ clientKey }) => clientKey));
  for (const key of acknowledged.readings) expect(keys).toContain(key);
});

test('no photo points to a missing object, and none waits for ever', async () => {
  const { db } = shop;
  const rows = await db.select().from(photos);
  const objects = await objectsIn(app.now().bucket);
  const ready = rows.filter(({ state }) => state === 'ready');
  // Beside two of each ticket that stood there before.
  expect(ready).toHaveLength(UPLOADS + 6);
  expect(rows).toHaveLength(ready.length);
  for (const { publicId, variants } of ready)
    for (const { key } of variants ?? []) expect(objects.has(key), publicId).toBe(true);
  const shown = await client.send({
    method: 'GET',
    path: `/api/photos/${[...acknowledged.photos][7]}/page`,
  });
  expect(shown.status).toBe(200);
});

test('every receipt is in the outbox once and is mailed; nothing is stuck', async () => {
  const { db } = shop;
  for (const number of acknowledged.intakes.values()) {
    const [row] = await db
      .select({ n: count() })
      .from(outbox)
      .where(eq(outbox.onceKey, `receipt:${number}:1`));
    expect(row?.n, number).toBe(1);
  }
  // Time passes: leases of killed processes run out, and the second looks at photos come due.
  await db.update(outbox).set({ dueAt: new Date() }).where(isNull(outbox.doneAt));
  const letters = await awaitLetters(email, WRITES, 40_000);
  for (const number of acknowledged.intakes.values())
    expect(
      letters.some(({ subject }) => subject.includes(number)),
      number,
    ).toBe(true);
  const undone = () => db.select().from(outbox).where(isNull(outbox.doneAt));
  for (const until = Date.now() + 40_000; (await undone()).length > 0 && Date.now() < until;)
    await pause(250);
  expect(await undone()).toEqual([]);
});
