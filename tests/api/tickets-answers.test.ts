/** What customers and the shop say to each other: the answer to an estimate, messages, letters. */
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Status } from '@/contracts/status';
import { messages, ticketEvents } from '@/db/schema/tickets';
import { STAGES, STEPS } from '@/domain/tickets/stages';
import { mailbox, openDeskShop, said, type DeskShop, type Taken } from '../fixtures/desk-shop';
import { awaitLetters } from '../fixtures/inbox';
import { fieldsIn } from '../fixtures/page-text';

let shop: DeskShop;
let taken: Taken;
let email: string;
let cookie: string;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());
beforeEach(async () => {
  email = mailbox();
  taken = await shop.taken({ customer: { name: 'Ida Brandsma', email } });
  cookie = await shop.enter(taken);
});

const answer = (what: string, version: number | string, who = cookie) =>
  shop.form(who, `/status/${taken.number}`, { do: what, version: String(version) });
const write = (body: string) =>
  shop.form(cookie, `/status/${taken.number}`, { do: 'message', body });
const status = async () => said<Status>(await shop.get(cookie, `/api/status/${taken.number}`));
const unseen = async () => (await shop.detail(taken.number)).unseen;
const eventsOf = async (kind: string) => {
  const { id } = await shop.ticket(taken.number);
  const rows = await shop.db.select().from(ticketEvents).where(eq(ticketEvents.ticketId, id));
  return rows.filter((e) => e.kind === kind);
};

describe('the answer to an estimate', () => {
  test.each([
    ['approve', 'approved', 'You approved the estimate.'],
    ['decline', 'declined', 'You declined the estimate.'],
  ])('%s: once, from the page, without a note', async (what, stage, words) => {
    const version = await shop.walk(taken.number, ['begin', 'send-estimate']);
    const page = await (await shop.get(cookie, `/status/${taken.number}`)).text();
    expect(fieldsIn(page).get('version')).toEqual([String(version)]);
    const answers = await Promise.all([1, 2, 3].map(() => answer(what, version)));
    expect(answers.map((a) => a.status).sort()).toEqual([303, 409, 409]);
    expect((await answer('approve', version + 1)).status).toBe(409);
    expect(await status()).toMatchObject({ stage, estimate: { open: false } });
    const thanks = await shop.get(cookie, `/status/${taken.number}?${what}`);
    expect(await thanks.text()).toContain(words);
    const last = (await eventsOf('step')).filter((e) => e.toStage === stage);
    expect(last.map((e) => [e.step, e.actorName, e.note])).toEqual([[what, 'Ida Brandsma', '']]);
  });

  test('is taken while an estimate stands, and at no other stage', async () => {
    for (const stage of STAGES) {
      await shop.stand(taken.number, stage, {
        version: 7,
        estimateMinor: 1,
        estimateCurrency: 'EUR',
      });
      expect((await status()).estimate?.open).toBe(stage === 'estimate-sent');
      const given = await answer('approve', 7);
      expect(given.status, stage).toBe(stage === 'estimate-sent' ? 303 : 409);
    }
  });

  test('to an estimate that was replaced meanwhile is refused', async () => {
    const version = await shop.walk(taken.number, ['begin', 'send-estimate']);
    await shop.walk(taken.number, ['back-to-bench', 'send-estimate']);
    expect((await answer('approve', version)).status).toBe(412);
    expect((await status()).stage).toBe('estimate-sent');
  });

  test.each(STEPS.filter((s) => s !== 'approve' && s !== 'decline'))(
    '%s is no step of a customer',
    async (name) => {
      expect((await answer(name, 1)).status).toBe(422);
      const path = `/api/tickets/${taken.number}/steps`;
      const headers = { cookie, 'if-match': '"1"' };
      const json = { step: name, note: 'x' };
      expect((await shop.ask({ method: 'POST', path, json, headers })).status).toBe(403);
      expect((await shop.ticket(taken.number)).version).toBe(1);
    },
  );

  test('by another customer moves nothing', async () => {
    const version = await shop.walk(taken.number, ['begin', 'send-estimate']);
    const other = await shop.enter(await shop.taken());
    expect((await answer('approve', version, other)).status).toBe(404);
    expect((await status()).stage).toBe('estimate-sent');
  });

  test('the counter writes down how the customer answered by phone', async () => {
    const version = await shop.walk(taken.number, ['begin', 'send-estimate']);
    const given = await shop.step('counter', taken.number, 'approve', version, {
      note: 'by phone',
    });
    expect(given.status).toBe(200);
    expect((await shop.detail(taken.number)).events.at(-1)).toMatchObject({
      who: 'Marit Ooster',
      note: 'by phone',
    });
    expect(JSON.stringify(await status())).not.toContain('by phone');
  });
});

describe('letters', () => {
  test('tell of the stages a customer waits for, once each, with the way to the ticket', async () => {
    const { number } = taken;
    await shop.tick(number);
    const line = ['begin', 'send-estimate', 'approve', 'wait-for-parts'] as const;
    await shop.walk(number, [...line, 'give-up', 'return-unrepaired']);
    const letters = await awaitLetters(email, 5);
    expect(
      letters
        .map((l) => l.subject)
        .slice(1)
        .sort(),
    ).toEqual(
      [
        `Ticket ${number}: We found the fault. Your answer is needed.`,
        `Ticket ${number}: We are waiting for parts.`,
        `Ticket ${number}: We cannot repair this instrument safely. Please collect it.`,
        `Ticket ${number}: Returned unrepaired.`,
      ].sort(),
    );
    for (const letter of letters.slice(1)) {
      expect(letter.text).toContain(`/check?number=${number}`);
      expect(letter.text).not.toContain('as agreed');
    }
  });
});

describe('messages', () => {
  test('from the customer wait for the shop until somebody has seen them', async () => {
    expect((await write('When?\r\nI need it.')).headers.get('location')).toBe(
      `/status/${taken.number}?message#message`,
    );
    await write('Hello?');
    expect(await unseen()).toBe(2);
    const rows = await shop.list(`q=${taken.number}`);
    expect(rows.items[0]?.unseen).toBe(2);
    const { counter } = shop.cookies;
    expect(await (await shop.get(counter, `/queue?q=${taken.number}`)).text()).toContain(
      '2 messages',
    );
    const items = await shop.call('counter', 'GET', `/api/tickets/${taken.number}/messages`);
    expect(await said(items)).toMatchObject({
      items: [
        { side: 'customer', author: 'Ida Brandsma', body: 'When?\nI need it.' },
        { side: 'customer', author: 'Ida Brandsma', body: 'Hello?' },
      ],
    });
    expect(await unseen()).toBe(2);
    await shop.form(counter, `/tickets/${taken.number}`, { do: 'seen' });
    expect(await unseen()).toBe(0);
    const first = await shop.db.select().from(messages);
    await shop.form(counter, `/tickets/${taken.number}`, { do: 'seen' });
    expect(await shop.db.select().from(messages)).toEqual(first);
  });

  test('that came after the page was read wait on', async () => {
    await write('First.');
    const { counter } = shop.cookies;
    const page = await (await shop.get(counter, `/tickets/${taken.number}`)).text();
    const upTo = /name="upTo" value="(\d+)"/.exec(page)?.[1] ?? '';
    expect(upTo).not.toBe('');
    await write('Second.');
    await shop.form(counter, `/tickets/${taken.number}`, { do: 'seen', upTo });
    expect(await unseen()).toBe(1);
    await shop.form(counter, `/tickets/${taken.number}`, { do: 'message', body: 'Soon.', upTo });
    expect(await unseen()).toBe(1);
  });

  test('from the shop are told of by letter, without their words, and answer what was asked', async () => {
    await write('When?');
    const body = 'On Thursday, we think: 48.00 then.';
    const path = `/api/tickets/${taken.number}/messages`;
    const key = { 'idempotency-key': `message-${taken.number}` };
    const send = () => shop.call('technician', 'POST', path, { json: { body }, headers: key });
    const made = await send();
    expect(made.status).toBe(201);
    expect(await (await send()).json()).toEqual(await made.json());
    expect(await unseen()).toBe(0);
    const [, letter, ...more] = await awaitLetters(email, 2);
    expect(more).toEqual([]);
    expect(letter?.subject).toBe(`Ticket ${taken.number}: a message from the shop`);
    expect(letter?.text).not.toContain('Thursday');
    expect((await status()).messages).toMatchObject([
      { side: 'customer', body: 'When?' },
      { side: 'shop', body },
    ]);
    const page = await (await shop.get(cookie, `/status/${taken.number}`)).text();
    expect(page).toContain(body);
    expect(page).not.toContain('Joren');
    expect((await eventsOf('message')).map((e) => [e.note, e.open])).toEqual([
      ['from the customer', false],
      ['to the customer', false],
    ]);
  });

  test('of nothing or without end are refused beside the field, and keep what was typed', async () => {
    expect((await write(' \n ')).status).toBe(422);
    const long = `<b>${'x'.repeat(4_000)}`;
    const refused = await write(long);
    expect(refused.status).toBe(422);
    expect(fieldsIn(await refused.text()).get('body')).toEqual([long]);
    const json = { body: ' ' };
    const path = `/api/tickets/${taken.number}/messages`;
    expect((await shop.call('counter', 'POST', path, { json })).status).toBe(422);
    expect((await status()).messages).toEqual([]);
  });

  test('of one customer are twenty an hour; the next is refused and not kept', async () => {
    for (let i = 0; i < 20; i++) expect((await write(`no. ${i}`)).status).toBe(303);
    const refused = await write('one more');
    expect(refused.status).toBe(429);
    expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(0);
    expect(fieldsIn(await refused.text()).get('body')).toEqual(['one more']);
    expect((await status()).messages).toHaveLength(20);
  });
});
