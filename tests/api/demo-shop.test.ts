/** The demo shop as `npm start` fills it: cut off twice on the way, and whole in the end. */
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { createInterface } from 'node:readline';
import { setTimeout as pause } from 'node:timers/promises';
import { count, countDistinct, eq, isNotNull } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { openDatabase } from '@/db/client';
import { faultNotes } from '@/db/schema/faults';
import { users } from '@/db/schema/people';
import { photos, pins } from '@/db/schema/photos';
import { boardParts, boards, models } from '@/db/schema/shop';
import { ticketEvents, tickets } from '@/db/schema/tickets';
import { STAGES } from '@/domain/tickets/stages';
import { demoState } from '@/server/demo/shop';
import { demoBoards } from '@/server/demo/content';
import { openStore } from '@/server/storage/store';
import { settings } from '../fixtures/app';
import { createDatabase, type TestDatabase } from '../fixtures/database';
import { checkout, testServices } from '../fixtures/services';

const LONG = 600_000;

type Run = { child: ChildProcess; words: string[]; ended: Promise<number | null> };
const running = new Set<ChildProcess>();

/** Runs the command on a database with a bucket of the same name. */
async function seeding(database: TestDatabase): Promise<Run> {
  const services = await testServices();
  const env = settings(services, database.url, database.name.replaceAll('_', '-'));
  const child = spawn(process.execPath, ['--import', 'tsx', 'src/cli/seed.ts'], {
    cwd: checkout,
    env: { ...process.env, ...env, PUBLIC_ORIGIN: 'http://127.0.0.1:4321', LOG_LEVEL: 'warn' },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  running.add(child);
  const words: string[] = [];
  createInterface(child.stdout).on('line', (line) => words.push(line));
  const ended = once(child, 'close').then(([code]) => {
    running.delete(child);
    return code as number | null;
  });
  return { child, words, ended };
}

/** Kills a run as soon as what is asked for is so; it must not have ended before. */
async function killedWhen(run: Run, met: () => Promise<boolean> | boolean): Promise<void> {
  while (!(await met())) {
    if (run.child.exitCode !== null) throw new Error(`It ended too early: ${run.words.join(' ')}`);
    await pause(20);
  }
  run.child.kill('SIGKILL');
  expect(await run.ended).toBeNull();
}

let database: TestDatabase;
let shop: ReturnType<typeof openDatabase>;
let store: Awaited<ReturnType<typeof openStore>>;
const told: string[][] = [];
const states: string[] = [];

const nameOfBucket = () => database.name.replaceAll('_', '-');
const readyPhotos = async () =>
  (await shop.db.select().from(photos).where(eq(photos.state, 'ready'))).length;

beforeAll(async () => {
  database = await createDatabase();
  shop = openDatabase(database.url, 3);
  const { s3 } = await testServices();
  store = await openStore({ ...s3, publicEndpoint: s3.endpoint, bucket: nameOfBucket() });
  const first = await seeding(database);
  await killedWhen(first, async () => {
    const [row] = await shop.db.select({ n: count() }).from(tickets);
    return (row?.n ?? 0) > 5;
  });
  states.push(await demoState(shop.db));
  const second = await seeding(database);
  await killedWhen(
    second,
    async () => second.words.includes('board photos') && (await readyPhotos()) > 2,
  );
  states.push(await demoState(shop.db));
  const third = await seeding(database);
  expect(await third.ended).toBe(0);
  states.push(await demoState(shop.db));
  told.push(first.words, second.words, third.words);
}, LONG);

afterAll(async () => {
  for (const child of running) child.kill('SIGKILL');
  await shop?.pool.end();
  await database?.drop();
});

const sizeOf = async (table: typeof users | typeof models | typeof boards | typeof tickets) =>
  (await shop.db.select({ n: count() }).from(table))[0]?.n;

test('a shop cut off while it was written is begun anew, one word a line, until it is done', () => {
  expect(states).toEqual(['begun', 'begun', 'done']);
  expect(told[1]?.[0]).toBe('again');
  expect(told[2]).toEqual([
    'again',
    'people',
    'boards',
    'tickets',
    'fault notes',
    'board photos',
    'done',
  ]);
});

test('it has 12 people, five of them customers, 8 models on 5 boards, 60 tickets, 25 fault notes', async () => {
  expect(await sizeOf(users)).toBe(12);
  const customers = await shop.db.select().from(users).where(eq(users.role, 'customer'));
  expect(customers).toHaveLength(5);
  expect(await sizeOf(models)).toBe(8);
  expect(await sizeOf(boards)).toBe(5);
  expect(await sizeOf(tickets)).toBe(60);
  expect((await shop.db.select({ n: count() }).from(faultNotes))[0]?.n).toBe(25);
});

test('every stage a ticket can stand at has one', async () => {
  const rows = await shop.db.selectDistinct({ stage: tickets.stage }).from(tickets);
  expect(rows.map((row) => row.stage).sort()).toEqual([...STAGES].sort());
});

test('both sides of every board are photographed, and every part has a pin on one of them', async () => {
  const views = await shop.db
    .select({ code: boards.code, side: photos.side, ref: boardParts.ref })
    .from(photos)
    .innerJoin(boards, eq(boards.id, photos.boardId))
    .innerJoin(pins, eq(pins.photoId, photos.id))
    .innerJoin(boardParts, eq(boardParts.id, pins.partId));
  for (const board of demoBoards()) {
    const own = views.filter((view) => view.code === board.code);
    expect(new Set(own.map((view) => view.side))).toEqual(new Set(['front', 'back']));
    const pinned = new Set(own.map((view) => view.ref));
    expect([...pinned].sort()).toEqual(board.parts.map((part) => part.ref).sort());
  }
});

test('every pin lies in its photo and stands for a part of the board that the photo shows', async () => {
  const rows = await shop.db
    .select({
      x: pins.x,
      y: pins.y,
      label: pins.label,
      ref: boardParts.ref,
      partBoard: boardParts.boardId,
      photoBoard: photos.boardId,
      ticketBoard: tickets.boardId,
    })
    .from(pins)
    .innerJoin(photos, eq(photos.id, pins.photoId))
    .leftJoin(tickets, eq(tickets.id, photos.ticketId))
    .leftJoin(boardParts, eq(boardParts.id, pins.partId));
  expect(rows.length).toBeGreaterThan(100);
  for (const row of rows) {
    expect(row.ref).toBe(row.label);
    expect(row.partBoard).toBe(row.photoBoard ?? row.ticketBoard);
    for (const share of [row.x, row.y]) {
      expect(share).toBeGreaterThan(0);
      expect(share).toBeLessThan(1);
    }
  }
});

test('ten tickets have photos: as found, after the repair where there was one, some shared', async () => {
  const rows = await shop.db.select().from(photos).where(isNotNull(photos.ticketId));
  expect(new Set(rows.map((row) => row.ticketId)).size).toBe(10);
  expect(rows.some((row) => row.phase === 'after')).toBe(true);
  const shared = rows.filter((row) => row.shared);
  expect(shared.length).toBeGreaterThan(3);
  expect(shared.every((row) => row.caption !== '')).toBe(true);
});

test('what a photo left in a ticket’s history lies between its other events, by its time', async () => {
  const rows = await shop.db
    .select({ ticketId: ticketEvents.ticketId, kind: ticketEvents.kind, at: ticketEvents.at })
    .from(ticketEvents);
  for (const photo of rows.filter((row) => row.kind === 'photo')) {
    const own = rows.filter((row) => row.ticketId === photo.ticketId && row.kind === 'step');
    expect(own.some((step) => step.at < photo.at)).toBe(true);
    expect(photo.at.getTime()).toBeLessThan(Date.now());
  }
});

test('every object of every photo is in the store, and nothing is there beside them', async () => {
  const rows = await shop.db.select().from(photos);
  expect(rows.map((row) => row.state)).toEqual(rows.map(() => 'ready'));
  const wanted = rows.flatMap((row) => row.variants ?? []);
  expect(wanted).toHaveLength(rows.length * 4);
  const held = new Map<string, number>();
  let after: string | undefined;
  do {
    const { objects, next } = await store.list('', after);
    for (const { key, bytes } of objects) held.set(key, bytes);
    after = next;
  } while (after);
  for (const { key, bytes } of wanted) expect(held.get(key), key).toBe(bytes);
  expect([...held.keys()].sort()).toEqual(wanted.map(({ key }) => key).sort());
});

test('a shop that is there stays as it is', { timeout: LONG }, async () => {
  const before = await shop.db.select({ n: countDistinct(photos.publicId) }).from(photos);
  const again = await seeding(database);
  expect(await again.ended).toBe(0);
  expect(again.words).toEqual(['done']);
  expect(await sizeOf(tickets)).toBe(60);
  expect(await shop.db.select({ n: countDistinct(photos.publicId) }).from(photos)).toEqual(before);
});

test('a real shop gets no demo', { timeout: LONG }, async () => {
  const real = await createDatabase();
  const { db, pool } = openDatabase(real.url, 2);
  try {
    const owner = { email: 'owner@shop.example', name: 'Owner', role: 'owner' as const };
    await db.insert(users).values({ ...owner, createdAt: new Date() });
    const run = await seeding(real);
    expect(await run.ended).toBe(0);
    expect(run.words).toEqual(['real']);
    expect(await db.select({ email: users.email }).from(users)).toEqual([{ email: owner.email }]);
  } finally {
    await pool.end();
    await real.drop();
  }
});
