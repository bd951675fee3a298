/** What every change of a ticket leaves, and two who change one ticket at once. */
import { asc, eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, expect, test } from 'vitest';
import { ticketEvents } from '@/db/schema/tickets';
import { ESTIMATE, openDeskShop, problem, said, type DeskShop } from '../fixtures/desk-shop';

let shop: DeskShop;
let number: string;
beforeAll(async () => {
  shop = await openDeskShop();
});
beforeEach(async () => {
  ({ number } = await shop.taken());
});
afterAll(() => shop?.close());

const rowsOf = async () => {
  const { id } = await shop.ticket(number);
  const of = eq(ticketEvents.ticketId, id);
  return shop.db.select().from(ticketEvents).where(of).orderBy(asc(ticketEvents.id));
};
const give = (personId: number | null, version: number) =>
  shop.call('senior', 'PUT', `/api/tickets/${number}/bench`, { json: { personId }, version });

test('a stale version is refused with both versions and nothing is overwritten', async () => {
  await said(await give(shop.people.senior.id, 1));
  const stale = await shop.step('technician', number, 'begin', 1);
  expect(stale.status).toBe(412);
  expect(await stale.json()).toMatchObject({ yours: 1, current: 2, stage: 'received' });
  const given = await give(null, 1);
  expect(given.status).toBe(412);
  expect(await given.json()).toMatchObject({ yours: 1, current: 2 });
  expect(await shop.detail(number)).toMatchObject({
    stage: 'received',
    version: 2,
    assignedTo: { name: 'Anselm Brouk' },
  });
});

test('a step repeated is refused as repeated, with the version it was taken from and with the new one', async () => {
  expect((await shop.step('technician', number, 'begin', 1)).status).toBe(200);
  for (const version of [1, 2]) {
    const again = await shop.step('technician', number, 'begin', version);
    expect(again.status).toBe(409);
    expect((await problem(again)).detail).toContain('«on the bench»');
  }
  expect(await rowsOf()).toHaveLength(2);
});

test('a step repeated with its key gets the first answer again', async () => {
  const once = { headers: { 'idempotency-key': `step-${number}` } };
  const first = await shop.step('technician', number, 'begin', 1, once);
  const again = await shop.step('technician', number, 'begin', 1, once);
  expect(await again.json()).toEqual(await first.json());
  expect([again.headers.get('etag'), again.headers.get('idempotency-replayed')]).toEqual([
    '"2"',
    'true',
  ]);
  expect(await rowsOf()).toHaveLength(2);
});

test('without a version, or of no ticket, nothing is changed', async () => {
  const path = `/api/tickets/${number}`;
  const json = { step: 'begin' };
  expect((await shop.call('senior', 'POST', `${path}/steps`, { json })).status).toBe(428);
  const nobody = { personId: null };
  expect((await shop.call('senior', 'PUT', `${path}/bench`, { json: nobody })).status).toBe(428);
  expect((await shop.step('senior', '9901-0001', 'begin', 1)).status).toBe(404);
  expect((await shop.ticket(number)).version).toBe(1);
});

test('of ten steps at once one is taken, and one event and one letter left', async () => {
  await shop.walk(number, ['begin', 'send-estimate']);
  const answers = await Promise.all(
    Array.from({ length: 10 }, (_, i) =>
      shop.step('senior', number, i % 2 ? 'approve' : 'decline', 3, { note: 'by phone' }),
    ),
  );
  const statuses = answers.map((a) => a.status).sort();
  expect(statuses).toEqual([200, ...Array<number>(9).fill(409)]);
  expect((await rowsOf()).filter((e) => e.fromStage === 'estimate-sent')).toHaveLength(1);
});

test('a step and an assignment from one version do not both pass', async () => {
  const answers = await Promise.all([
    give(shop.people.technician.id, 1),
    shop.step('senior', number, 'begin', 1),
  ]);
  expect(answers.map((a) => a.status).sort()).toEqual([200, 412]);
});

test('who takes it to the bench has it, unless somebody has it already', async () => {
  await said(await shop.step('technician', number, 'begin', 1));
  expect((await shop.detail(number)).assignedTo).toMatchObject({ name: 'Joren Vaal' });
  ({ number } = await shop.taken());
  await said(await give(shop.people.owner.id, 1));
  await said(await shop.step('technician', number, 'begin', 2));
  expect((await shop.detail(number)).assignedTo).toMatchObject({ name: 'Sietske Harrow' });
});

test('a ticket is given to the bench alone, by the bench alone, while it is open', async () => {
  const gone = await shop.hire('technician', { disabledAt: new Date() });
  for (const id of [shop.people.counter.id, gone.id, 999_999]) {
    const refused = await give(id, 1);
    expect(refused.status).toBe(422);
    expect((await problem(refused)).errors?.[0]?.path).toBe('personId');
  }
  const json = { personId: shop.people.technician.id };
  const path = `/api/tickets/${number}/bench`;
  expect((await shop.call('counter', 'PUT', path, { json, version: 1 })).status).toBe(403);
  expect((await give(shop.people.technician.id, 1)).headers.get('etag')).toBe('"2"');
  expect((await give(null, 2)).status).toBe(200);
  expect((await shop.detail(number)).assignedTo).toBeNull();
  const left = (await rowsOf()).filter((e) => e.kind === 'assigned');
  expect(left.map((e) => [e.actorName, e.note, e.open])).toEqual([
    ['Anselm Brouk', 'Joren Vaal', false],
    ['Anselm Brouk', 'nobody', false],
  ]);
  await shop.stand(number, 'handed-over');
  expect((await give(shop.people.technician.id, 3)).status).toBe(409);
});

test('a closed ticket takes no caution', async () => {
  await shop.stand(number, 'returned-unrepaired');
  const path = `/api/tickets/${number}/cautions`;
  const json = { caution: 'leads', ticked: true };
  expect((await shop.call('technician', 'PUT', path, { json })).status).toBe(409);
  expect((await shop.detail(number)).cautions).toEqual([]);
});

test('notes stay in order with their writers, among the staff', async () => {
  const path = `/api/tickets/${number}/notes`;
  const write = (who: 'counter' | 'technician', body: string) =>
    shop.call(who, 'POST', path, { json: { body } });
  expect((await write('counter', ' \n ')).status).toBe(422);
  expect((await write('counter', 'x'.repeat(4_001))).status).toBe(422);
  expect((await write('counter', 'rang twice')).status).toBe(201);
  await said(await write('technician', 'RT1 <b>open</b>\r\nRV1 short'));
  const { items } = await said<{ items: { author: string; body: string }[] }>(
    await shop.call('owner', 'GET', path),
  );
  expect(items.map((n) => [n.author, n.body])).toEqual([
    ['Marit Ooster', 'rang twice'],
    ['Joren Vaal', 'RT1 <b>open</b>\nRV1 short'],
  ]);
  const page = await shop.get(shop.cookies.counter, `/tickets/${number}`);
  expect(await page.text()).toContain('RT1 &lt;b&gt;open&lt;/b&gt;');
});

test('every step leaves who, when, from, to and note, and the time of the stage', async () => {
  const began = Date.now();
  await shop.walk(number, ['begin', 'wait-for-parts', 'parts-arrived', 'send-estimate', 'decline']);
  const { events, stageAt, receivedAt } = await shop.detail(number);
  expect(events.map((e) => [e.who, e.from, e.to, e.note])).toEqual([
    ['Marit Ooster', null, 'received', ''],
    ['Anselm Brouk', 'received', 'on-the-bench', 'as agreed'],
    ['Anselm Brouk', 'on-the-bench', 'waiting-for-parts', 'as agreed'],
    ['Anselm Brouk', 'waiting-for-parts', 'on-the-bench', 'as agreed'],
    ['Anselm Brouk', 'on-the-bench', 'estimate-sent', 'as agreed'],
    ['Anselm Brouk', 'estimate-sent', 'declined', 'as agreed'],
  ]);
  const times = events.map((e) => Date.parse(e.at));
  expect(times).toEqual(times.toSorted((a, b) => a - b));
  expect([events[0]?.at, events.at(-1)?.at]).toEqual([receivedAt, stageAt]);
  expect(Date.parse(stageAt)).toBeGreaterThanOrEqual(began);
  expect(Date.parse(stageAt)).toBeLessThanOrEqual(Date.now());
  expect((await shop.ticket(number)).closedAt).toBeNull();
  await shop.walk(number, ['return-unrepaired']);
  const closed = await shop.ticket(number);
  expect(closed.closedAt).toEqual(closed.stageAt);
});

test('an estimate sent anew replaces the first one, and both stay in the events', async () => {
  await shop.walk(number, ['begin', 'send-estimate', 'back-to-bench']);
  const anew = { total: { amount: 9_900, currency: 'EUR' }, work: 'RT1, RV1 and F1' };
  const more = { estimate: anew, note: 'the fuse too' };
  await said(await shop.step('senior', number, 'send-estimate', 4, more));
  const { estimate, events } = await shop.detail(number);
  expect(estimate).toEqual(anew);
  expect(estimate).not.toEqual(ESTIMATE);
  expect(events.filter((e) => e.to === 'estimate-sent').map((e) => e.note)).toEqual([
    'as agreed',
    'the fuse too',
  ]);
});

test('what happened stays: events cannot be changed or taken away in the database', async () => {
  const { id } = await shop.ticket(number);
  const of = eq(ticketEvents.ticketId, id);
  await expect(shop.db.update(ticketEvents).set({ note: 'forged' }).where(of)).rejects.toThrow();
  await expect(shop.db.delete(ticketEvents).where(of)).rejects.toThrow();
  expect((await rowsOf()).map((e) => e.note)).toEqual(['']);
});
