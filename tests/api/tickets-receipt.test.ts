/** What the counter hands over: the receipt, its letter, the claim code; the intake form; an intake repeated. */
import { eq, like } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { openDatabase } from '@/db/client';
import { outbox } from '@/db/schema/outbox';
import { customers } from '@/db/schema/shop';
import { ticketEvents, tickets } from '@/db/schema/tickets';
import { intakeOf, mailbox, openDeskShop, problem, said } from '../fixtures/desk-shop';
import type { DeskShop, Taken } from '../fixtures/desk-shop';
import { awaitLetters } from '../fixtures/inbox';
import { fieldsIn } from '../fixtures/page-text';
import { SOON } from '../fixtures/soon';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

const CODE = /^[2-9A-HJKMNP-TV-Z]{4}-[2-9A-HJKMNP-TV-Z]{4}-[2-9A-HJKMNP-TV-Z]{2}$/;
const receiptsOf = (number: string) =>
  shop.db
    .select()
    .from(outbox)
    .where(like(outbox.onceKey, `receipt:${number}:%`));

/** Every value of every table, as one text. */
async function everything(): Promise<string> {
  const { pool } = openDatabase(shop.app.databaseUrl, 1);
  const [names] = await pool.query('SHOW TABLES');
  let text = '';
  for (const row of names as Record<string, string>[]) {
    const [rows] = await pool.query(`SELECT * FROM \`${Object.values(row)[0]}\``);
    text += JSON.stringify(rows);
  }
  await pool.end();
  return text;
}

describe('the receipt', () => {
  test('goes out once, with number and claim code, and the code stands nowhere in the tables', async () => {
    const email = mailbox();
    const key = { 'idempotency-key': `receipt-${email}` };
    const body = intakeOf({ customer: { name: 'Ida Brandsma', email } });
    const { number, claimCode } = await said<Taken>(await shop.take(body, key));
    expect(claimCode).toMatch(CODE);
    expect(await receiptsOf(number)).toHaveLength(1);
    await said(await shop.take(body, key));
    const [letter] = await awaitLetters(email, 1);
    expect(letter?.subject).toBe(`Receipt ${number}: your Tessaly T9 is with us`);
    expect(letter?.text).toContain(number);
    expect(letter?.text).toContain(claimCode);
    expect(letter?.links.join(' ')).not.toContain(claimCode);
    await expect.poll(async () => (await receiptsOf(number))[0]?.doneAt).not.toBeNull();
    expect(await awaitLetters(email, 1)).toHaveLength(1);
    expect(await receiptsOf(number)).toHaveLength(1);
    const tables = (await everything()).toUpperCase();
    expect(tables).toContain(number);
    expect(tables).not.toContain(claimCode);
    expect(tables).not.toContain(claimCode.replaceAll('-', ''));
    expect((await shop.ticket(number)).claimHash).toMatch(/^[0-9a-f]{64}$/);
    expect(shop.app.log()).not.toContain(claimCode);
  });

  test('of a customer without e-mail is printed alone', async () => {
    const { number } = await shop.taken();
    expect(await receiptsOf(number)).toEqual([]);
  });

  test('the code is on the first print alone; later a new one is made, mailed, and left as an event', async () => {
    const email = mailbox();
    const fields = { name: 'Ilse Verhage', email, maker: 'Tessaly', model: 'T9', serial: 'P-1' };
    const { counter } = shop.cookies;
    const form = { ...fields, symptoms: ['dead'] };
    const taken = await shop.form(counter, '/intake', form);
    expect(taken.status).toBe(303);
    const path = taken.headers.get('location') ?? '';
    const number = /^\/tickets\/(.+)\/receipt$/.exec(path)?.[1] ?? '';
    const cookie = (taken.headers.get('set-cookie') ?? '').split(';')[0] ?? '';
    const shown = async (cookies: string) =>
      /receipt-code mono[^>]*>([^<]+)</.exec(await (await shop.get(cookies, path)).text())?.[1];
    const first = (await shown(`${counter}; ${cookie}`)) ?? '';
    expect(first).toMatch(CODE);
    expect(await shown(counter)).toBeUndefined();
    const customer = await shop.enter({ number, claimCode: first });
    const renewed = await shop.form(counter, path, {});
    expect([renewed.status, renewed.headers.get('location')]).toEqual([303, path]);
    const anew = (renewed.headers.get('set-cookie') ?? '').split(';')[0] ?? '';
    const second = (await shown(`${counter}; ${anew}`)) ?? '';
    expect(second).toMatch(CODE);
    expect(second).not.toBe(first);
    expect((await shop.claim(number, first)).status).toBe(422);
    expect((await shop.claim(number, second)).status).toBe(303);
    // Whoever came in with the old code is out.
    expect((await shop.get(customer, `/api/status/${number}`)).status).toBe(401);
    const letters = await awaitLetters(email, 2);
    expect(letters.map((l) => [l.text.includes(first), l.text.includes(second)])).toEqual([
      [true, false],
      [false, true],
    ]);
    const { id } = await shop.ticket(number);
    const events = await shop.db.select().from(ticketEvents).where(eq(ticketEvents.ticketId, id));
    expect(events.map((e) => [e.kind, e.open])).toEqual([
      ['step', true],
      ['claim', false],
    ]);
  });

  test('another ticket’s receipt does not show the code', async () => {
    const one = await shop.form(shop.cookies.counter, '/intake', {
      ...{ name: 'Ilse', maker: 'Tessaly', model: 'T9', serial: 'P-2', symptomText: 'dead' },
    });
    const cookie = (one.headers.get('set-cookie') ?? '').split(';')[0] ?? '';
    const other = await shop.taken();
    const page = await shop.get(
      `${shop.cookies.counter}; ${cookie}`,
      `/tickets/${other.number}/receipt`,
    );
    expect(await page.text()).not.toContain('receipt-code mono');
  });
});

describe('an intake repeated', () => {
  test('with its key is one ticket and one answer, also when both come at once', async () => {
    const key = { 'idempotency-key': 'counter-1' };
    const body = intakeOf();
    const before = await shop.db.$count(tickets);
    const answers = await Promise.all([1, 2, 3].map(() => shop.take(body, key)));
    const late = await shop.take(body, key);
    expect(answers.map((a) => a.status).concat(late.status)).toEqual([201, 201, 201, 201]);
    const texts = await Promise.all([...answers, late].map((a) => a.text()));
    expect(new Set(texts).size).toBe(1);
    expect(late.headers.get('idempotency-replayed')).toBe('true');
    expect(await shop.db.$count(tickets)).toBe(before + 1);
  });

  test('with another body under the key it is refused; another’s key is another key', async () => {
    const key = { 'idempotency-key': 'counter-2' };
    const body = intakeOf();
    const first = await said<Taken>(await shop.take(body, key));
    const refused = await shop.take({ ...body, symptoms: ['dead'] }, key);
    expect(refused.status).toBe(422);
    expect((await problem(refused)).errors?.[0]?.path).toBe('Idempotency-Key');
    const more = { json: intakeOf(), headers: key };
    const senior = await shop.call('senior', 'POST', '/api/tickets', more);
    expect((await said<Taken>(senior)).number).not.toBe(first.number);
  });

  test('a refused one leaves its key free', async () => {
    const key = { 'idempotency-key': 'counter-3' };
    expect((await shop.take(intakeOf({ symptoms: [] }), key)).status).toBe(422);
    expect((await shop.take(intakeOf(), key)).status).toBe(201);
  });
});

describe('the intake form', () => {
  const typed = {
    name: 'Ida "the" Brandsma',
    email: 'ida@customer.example',
    phone: '0123',
    address: 'Lane 2',
    maker: 'Lumeford',
    model: 'LM-90 <b>',
    serial: 'K-7',
    symptomText: 'It smoked.\nTwice.',
    incident: 'wet',
    accessoryText: 'a strap',
    condition: 'scratched',
    promisedOn: SOON,
  };
  const boxes = { symptoms: ['dead', 'burnt'], accessories: ['case'] };
  const everyBox = { ...typed, ...boxes };

  test.each<[string, Record<string, string | string[]>, string]>([
    ['an e-mail that is none', { email: 'ida at home' }, 'Not an e-mail address'],
    ['no serial', { serial: '' }, 'Nothing was given'],
    ['no customer', { name: '' }, 'No customer was given'],
    ['no symptom', { symptoms: [], symptomText: '' }, 'No symptom was given'],
    ['a promise long gone', { promisedOn: '2020-01-01' }, 'Promise a day between today'],
    ['a customer who is not there', { customerId: '999999' }, 'no such customer'],
  ])('refused for %s keeps what was typed', async (_name, wrong, sentence) => {
    const sent = { ...everyBox, ...wrong };
    const answer = await shop.form(shop.cookies.counter, '/intake', sent);
    expect(answer.status).toBe(422);
    const html = await answer.text();
    expect(html).toContain(sentence);
    const fields = fieldsIn(html);
    for (const name of Object.keys(typed) as (keyof typeof typed)[])
      expect(fields.get(name), name).toEqual([sent[name]]);
    expect(fields.get('symptoms[]') ?? []).toEqual(sent.symptoms);
    expect(fields.get('accessories[]')).toEqual(['case']);
    const kept = eq(customers.name, typed.name);
    expect(await shop.db.$count(customers, kept)).toBe(0);
  });

  test('sent twice it makes one ticket, and a form of its own the next', async () => {
    const page = await shop.get(shop.cookies.counter, '/intake');
    const [once = ''] = fieldsIn(await page.text()).get('once') ?? [];
    const fields = { ...everyBox, name: 'Twice', email: '', serial: 'K-8', once };
    const send = () => shop.form(shop.cookies.counter, '/intake', fields);
    const places = (await Promise.all([send(), send()])).map((a) => a.headers.get('location'));
    expect(places[0]).toMatch(/^\/tickets\/.+\/receipt$/);
    expect(places[1]).toBe(places[0]);
    expect(await shop.db.$count(customers, eq(customers.name, 'Twice'))).toBe(1);
  });

  test('filled rightly it takes in all of it', async () => {
    const email = mailbox();
    const answer = await shop.form(shop.cookies.counter, '/intake', { ...everyBox, email });
    expect(answer.status).toBe(303);
    const number = /tickets\/([^/]+)/.exec(answer.headers.get('location') ?? '')?.[1] ?? '';
    const { name, email: _e, phone: _p, address: _a, maker, model, serial, ...rest } = typed;
    expect(await shop.detail(number)).toMatchObject({ ...rest, ...boxes, customer: { name } });
    expect((await shop.detail(number)).instrument).toMatchObject({ maker, model, serial });
  });
});
