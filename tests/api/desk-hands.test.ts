/** One instrument, one open ticket, one owner at a time; one form, one ticket. */
import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { customers, instruments } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import {
  intakeOf,
  openDeskShop,
  problem,
  said,
  type DeskShop,
  type Problem,
  type Taken,
} from '../fixtures/desk-shop';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

const unit = (serial: string) => ({ maker: 'Tessaly', model: 'T9', serial });
const received = async (number: string) =>
  (await shop.detail(number)).events.find((e) => e.kind === 'step' && e.to === 'received')?.note;
const formOf = (more: Record<string, string | string[]> = {}) => ({
  name: 'Ilse Verhage',
  ...unit('F-1'),
  symptoms: ['dead'],
  ...more,
});
const send = (form: Record<string, string | string[]>) =>
  shop.form(shop.cookies.counter, '/intake', form);

describe('an instrument that is in the shop', () => {
  test('is refused with the ticket that is open on it, on the page with a link; nothing is written', async () => {
    const first = await shop.taken({ instrument: unit('IN-1') });
    const before = [await shop.db.$count(tickets), await shop.db.$count(customers)];
    const answer = await shop.take(intakeOf({ instrument: unit('in-1'), changedHands: true }));
    expect(answer.status).toBe(409);
    const told = (await answer.json()) as Problem & { openTicket: string };
    expect(told.openTicket).toBe(first.number);
    expect(told.detail).toContain(`ticket ${first.number} is open`);
    expect(told.errors?.map((e) => e.path)).toEqual(['instrument.serial']);
    const page = await send(formOf({ serial: 'IN-1', condition: 'Cracked window' }));
    expect(page.status).toBe(409);
    const html = await page.text();
    expect(html).toContain(`href="/tickets/${first.number}"`);
    expect(html).toContain('Serial number: ');
    expect(html).toContain('Cracked window');
    expect([await shop.db.$count(tickets), await shop.db.$count(customers)]).toEqual(before);
  });

  test('comes back once its ticket is closed', async () => {
    const instrument = unit('IN-2');
    const first = await shop.taken({ instrument });
    const { customer } = await shop.detail(first.number);
    await shop.stand(first.number, 'handed-over');
    const again = await shop.taken({ instrument, customer: { id: customer.id } });
    expect((await shop.detail(again.number)).instrument).toEqual(
      (await shop.detail(first.number)).instrument,
    );
    expect(await received(again.number)).toBe('');
  });

  test('taken in by eight at once has one ticket, whether the shop knew it or not', async () => {
    const known = unit('RUSH-1');
    const first = await shop.taken({ instrument: known });
    const { id } = (await shop.detail(first.number)).customer;
    await shop.stand(first.number, 'returned-unrepaired');
    for (const instrument of [known, unit('RUSH-2')]) {
      const answers = await Promise.all(
        Array.from({ length: 8 }, () => shop.take(intakeOf({ instrument, customer: { id } }))),
      );
      const statuses = answers.map((a) => a.status).sort();
      expect(statuses).toEqual([201, ...Array<number>(7).fill(409)]);
    }
  });
});

describe('an instrument of another customer', () => {
  const instrument = unit('SOLD-9');
  let seller: Taken;
  beforeAll(async () => {
    seller = await shop.taken({ instrument, customer: { name: 'Sytske Oud' } });
    await shop.stand(seller.number, 'handed-over');
  });

  test('is refused with the name of who brought it, and stays theirs', async () => {
    const before = await shop.db.$count(customers);
    const answer = await shop.take(intakeOf({ instrument, customer: { name: 'Bram Nieuw' } }));
    expect(answer.status).toBe(409);
    const { detail, errors } = await problem(answer);
    expect(detail).toContain('last brought by Sytske Oud');
    expect(errors?.map((e) => e.path)).toEqual(['changedHands']);
    const of = eq(instruments.serial, instrument.serial);
    const [row] = await shop.db.select().from(instruments).where(of);
    expect(row?.customerId).toBe((await shop.detail(seller.number)).customer.id);
    expect(await shop.db.$count(customers)).toBe(before);
  });

  test('on the page a tick is offered, and passes; the event says so, the customer is not told', async () => {
    const form = formOf({ ...instrument, name: 'Bram Nieuw' });
    expect(await (await shop.get(shop.cookies.counter, '/intake')).text()).not.toContain(
      'changedHands',
    );
    const refused = await send(form);
    expect(refused.status).toBe(409);
    const html = await refused.text();
    expect(html).toMatch(/<input[^>]*name="changedHands"/);
    expect(html).toContain('last brought by Sytske Oud');
    expect(html).toContain('value="Bram Nieuw"');
    const passed = await send({ ...form, changedHands: 'yes' });
    expect(passed.status).toBe(303);
    const number = /\d{4}-\d+/.exec(passed.headers.get('location') ?? '')?.[0] ?? '';
    expect(await received(number)).toBe(
      'Changed hands: brought by Bram Nieuw, before by Sytske Oud.',
    );
    const old = await shop.get(await shop.enter(seller), `/status/${seller.number}`);
    expect(await old.text()).not.toContain('Bram Nieuw');
  });
});

describe('one form', () => {
  test('sent twice at once makes one ticket, and both are led to its receipt', async () => {
    const page = await (await shop.get(shop.cookies.counter, '/intake')).text();
    const once = /name="once" value="([^"]+)"/.exec(page)?.[1] ?? '';
    expect(once).not.toBe('');
    const before = await shop.db.$count(tickets);
    const form = formOf({ serial: 'TWICE', once });
    const answers = await Promise.all([send(form), send(form), send(form)]);
    expect(answers.map((a) => a.status)).toEqual([303, 303, 303]);
    expect(new Set(answers.map((a) => a.headers.get('location'))).size).toBe(1);
    expect(await shop.db.$count(tickets)).toBe(before + 1);
  });

  test('refused keeps its mark, and is taken when it is put right', async () => {
    const once = randomUUID();
    const refused = await send(formOf({ serial: 'MENDED', symptoms: [], once }));
    expect(refused.status).toBe(422);
    expect(await refused.text()).toContain(once);
    expect((await send(formOf({ serial: 'MENDED', once }))).status).toBe(303);
    const other = await send(formOf({ serial: 'OTHER', once }));
    expect(other.status).toBe(409);
    expect(await other.text()).toContain('taken in already, with other words');
  });

  test('over the API the same key is the same ticket', async () => {
    const key = { 'idempotency-key': randomUUID() };
    const json = intakeOf({ instrument: unit('KEY') });
    const [one, two] = await Promise.all([shop.take(json, key), shop.take(json, key)]);
    expect(await said<Taken>(one)).toEqual(await said<Taken>(two));
  });
});
