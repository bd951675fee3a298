/** The life of a ticket after intake: who may take which step from where, and what every step leaves. */
import { asc, eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { ticketEvents } from '@/db/schema/tickets';
import { STAGES, STEPS, type Stage, type Step } from '@/domain/tickets/stages';
import { reading } from '../fixtures/bench-shop';
import {
  ESTIMATE,
  openDeskShop,
  problem,
  ROLES,
  said,
  type DeskShop,
  type Taken,
} from '../fixtures/desk-shop';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

const eventsOf = async (number: string) => {
  const { id } = await shop.ticket(number);
  const of = eq(ticketEvents.ticketId, id);
  return shop.db.select().from(ticketEvents).where(of).orderBy(asc(ticketEvents.id));
};
const sheet = (number: string, json: unknown) =>
  shop.call('technician', 'POST', `/api/tickets/${number}/readings`, { json });
const single = (phase: string) => reading({ phase, part: 'RT1', from: null, to: null });

/** The line of the shop, written down apart from the machine: from where, by whom, to where. */
const BENCH = ['technician', 'senior', 'owner'];
const TABLE: Record<Step, { from: Stage[]; to: Stage; who?: string[]; note?: true }> = {
  begin: { from: ['received'], to: 'on-the-bench', who: BENCH },
  'send-estimate': { from: ['on-the-bench'], to: 'estimate-sent', who: BENCH },
  approve: { from: ['estimate-sent'], to: 'approved', note: true },
  decline: { from: ['estimate-sent'], to: 'declined', note: true },
  'start-repair': { from: ['approved'], to: 'in-repair', who: BENCH },
  'wait-for-parts': {
    from: ['on-the-bench', 'approved', 'in-repair'],
    to: 'waiting-for-parts',
    who: BENCH,
    note: true,
  },
  'parts-arrived': { from: ['waiting-for-parts'], to: 'in-repair' },
  'begin-release-check': { from: ['in-repair'], to: 'release-check', who: BENCH },
  'back-to-repair': { from: ['release-check'], to: 'in-repair', who: BENCH, note: true },
  release: { from: ['release-check'], to: 'ready', who: ['senior', 'owner'], note: true },
  'back-to-bench': {
    from: ['estimate-sent', 'declined', 'beyond-repair'],
    to: 'on-the-bench',
    who: BENCH,
    note: true,
  },
  'give-up': {
    from: ['on-the-bench', 'in-repair', 'release-check', 'waiting-for-parts'],
    to: 'beyond-repair',
    who: BENCH,
    note: true,
  },
  'hand-over': { from: ['ready'], to: 'handed-over' },
  'return-unrepaired': { from: ['declined', 'beyond-repair'], to: 'returned-unrepaired' },
};

describe('every step, from every stage, by every role', () => {
  let number: string;
  beforeAll(async () => {
    ({ number } = await shop.taken());
    await shop.tick(number);
    await said(await sheet(number, single('after-repair')));
  });

  test.each(STEPS)('%s', async (name) => {
    const { from, to, who = [...ROLES], note } = TABLE[name];
    const before = (await eventsOf(number)).length;
    let left = 0;
    for (const stage of STAGES)
      for (const role of ROLES) {
        const stageBefore = stage === 'waiting-for-parts' ? ('in-repair' as const) : null;
        await shop.stand(number, stage, { version: 7, stageBefore });
        const may = who.includes(role);
        const expected = !may ? 403 : from.includes(stage) ? 200 : 409;
        const where = `${name} from ${stage} by ${role}`;
        const offered = (await shop.detail(number, role)).steps.find((s) => s.step === name);
        expect(offered?.to, where).toBe(expected === 200 ? to : undefined);
        if (expected === 200 && note) {
          const silent = await shop.step(role, number, name, 7, { note: ' ' });
          expect(silent.status, where).toBe(422);
          expect((await problem(silent)).errors?.[0]?.path, where).toBe('note');
        }
        const words = { note: 'x', estimate: ESTIMATE };
        const answer = await shop.step(role, number, name, 7, words);
        expect(answer.status, where).toBe(expected);
        if (expected === 200) {
          left += 1;
          expect(await answer.json()).toEqual({ stage: to, version: 8 });
          expect(answer.headers.get('etag')).toBe('"8"');
        } else expect(await shop.ticket(number), where).toMatchObject({ stage, version: 7 });
      }
    const rows = (await eventsOf(number)).slice(before);
    expect(rows.map((e) => [e.kind, e.step, e.toStage])).toEqual(
      Array.from({ length: left }, () => ['step', name, to]),
    );
    expect(left).toBe(from.length * who.length);
  });
});

describe('what must be true first', () => {
  let taken: Taken;
  beforeEach(async () => {
    taken = await shop.taken();
  });

  test.each<[string, unknown, string]>([
    ['none', undefined, 'estimate'],
    ['without work', { ...ESTIMATE, work: ' ' }, 'estimate.work'],
    ['without a total', { work: 'RT1' }, 'estimate.total'],
    ['of nothing', { ...ESTIMATE, total: { amount: 0, currency: 'EUR' } }, 'estimate.total'],
    ['below nothing', { ...ESTIMATE, total: { amount: -5, currency: 'EUR' } }, 'estimate.total'],
    [
      'of half a cent',
      { ...ESTIMATE, total: { amount: 7.5, currency: 'EUR' } },
      'estimate.total.amount',
    ],
    ['in other money', { ...ESTIMATE, total: { amount: 7, currency: 'XTS' } }, 'estimate.total'],
    [
      'past all bounds',
      { ...ESTIMATE, total: { amount: 1e12, currency: 'EUR' } },
      'estimate.total',
    ],
  ])('an estimate %s is refused and nothing moves', async (_name, estimate, path) => {
    await shop.walk(taken.number, ['begin']);
    const answer = await shop.step('technician', taken.number, 'send-estimate', 2, { estimate });
    expect(answer.status).toBe(422);
    expect((await problem(answer)).errors?.[0]?.path).toBe(path);
    expect(await shop.detail(taken.number)).toMatchObject({
      stage: 'on-the-bench',
      estimate: null,
    });
  });

  test('the estimate of the page is typed in trade money', async () => {
    await shop.walk(taken.number, ['begin']);
    const path = `/tickets/${taken.number}`;
    const fields = { do: 'step', step: 'send-estimate', version: '2', work: 'RT1\nRV1' };
    const send = (total: string) => shop.form(shop.cookies.technician, path, { ...fields, total });
    const refused = await send('seventy');
    expect(refused.status).toBe(422);
    expect(await refused.text()).toContain('Not a sum: write it like 72.48.');
    expect((await send('72.48')).headers.get('location')).toBe(`${path}#stage`);
    expect((await shop.detail(taken.number)).estimate).toEqual({
      total: { amount: 7248, currency: 'EUR' },
      work: 'RT1\nRV1',
    });
  });

  test('no reading before the three cautions are ticked, nor after one is taken back', async () => {
    const { number } = taken;
    const caution = (name: string, ticked: boolean) =>
      shop.call('technician', 'PUT', `/api/tickets/${number}/cautions`, {
        json: { caution: name, ticked },
      });
    for (const name of ['leads', 'battery', 'capacitors']) {
      expect((await sheet(number, single('as-found'))).status).toBe(409);
      expect((await caution(name, true)).status).toBe(200);
    }
    expect((await sheet(number, single('as-found'))).status).toBe(201);
    expect((await caution('battery', false)).status).toBe(200);
    expect((await sheet(number, single('as-found'))).status).toBe(409);
    const forCounter = await shop.call('counter', 'PUT', `/api/tickets/${number}/cautions`, {
      json: { caution: 'battery', ticked: true },
    });
    expect(forCounter.status).toBe(403);
    const left = (await eventsOf(number)).filter((e) => e.kind === 'caution');
    expect(left.map((e) => [e.step, e.note, e.actorName, e.open])).toEqual([
      ['leads', 'ticked', 'Joren Vaal', false],
      ['battery', 'ticked', 'Joren Vaal', false],
      ['capacitors', 'ticked', 'Joren Vaal', false],
      ['battery', 'unticked', 'Joren Vaal', false],
    ]);
  });

  test('a caution ticked by ten at once is one event', async () => {
    const path = `/api/tickets/${taken.number}/cautions`;
    const tick = () =>
      shop.call('senior', 'PUT', path, { json: { caution: 'leads', ticked: true } });
    const answers = await Promise.all(Array.from({ length: 10 }, tick));
    expect(answers.map((a) => a.status)).toEqual(Array<number>(10).fill(200));
    const left = (await eventsOf(taken.number)).filter((e) => e.kind === 'caution');
    expect(left).toHaveLength(1);
  });

  test('no repair before the cautions, no release check before a reading after repair', async () => {
    const { number } = taken;
    await shop.walk(number, ['begin', 'send-estimate', 'approve']);
    expect((await shop.step('senior', number, 'start-repair', 4)).status).toBe(409);
    const [next] = (await shop.detail(number, 'senior')).steps;
    expect(next).toMatchObject({ step: 'start-repair' });
    expect(next?.blocked).toContain('cautions');
    await shop.tick(number);
    await shop.walk(number, ['start-repair']);
    const early = await shop.step('senior', number, 'begin-release-check', 5);
    expect(early.status).toBe(409);
    expect((await problem(early)).detail).toContain('No reading after repair');
    await said(await sheet(number, single('after-repair')));
    expect(await shop.walk(number, ['begin-release-check', 'release', 'hand-over'])).toBe(8);
  });
});
