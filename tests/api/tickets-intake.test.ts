/** Taking in at the counter: who and what the shop knows already, numbers, promises, the receipt. */
import { eq, like } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { customers, instruments, models } from '@/db/schema/shop';
import { ticketNumbers, tickets } from '@/db/schema/tickets';
import { monthOf } from '@/domain/tickets/numbers';
import { dayOf } from '@/domain/time/shop-day';
import {
  intakeOf,
  mailbox,
  openDeskShop,
  problem,
  said,
  ZONE,
  type DeskShop,
  type Problem,
  type Taken,
} from '../fixtures/desk-shop';
import { SOON } from '../fixtures/soon';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

const running = (number: string) => Number(number.split('-')[1]);
const DAY = 24 * 3_600_000;
const dayFromNow = (days: number) => dayOf(new Date(Date.now() + days * DAY), ZONE);

describe('the customer', () => {
  test('a new one is written once; the same name and e-mail is the same one later', async () => {
    const email = mailbox();
    const given = { name: 'Ida Brandsma', email, phone: '0123', address: 'Lane 2, Exampleton' };
    const first = await shop.taken({ customer: given });
    const again = await shop.taken({
      customer: { name: 'ida brandsma', email: email.toUpperCase(), phone: '999' },
    });
    const other = await shop.taken({ customer: { name: 'Jan Brandsma', email } });
    const [one, two, three] = await Promise.all(
      [first, again, other].map((t) => shop.detail(t.number)),
    );
    expect(two?.customer).toEqual(one?.customer);
    expect(three?.customer.id).not.toBe(one?.customer.id);
    const rows = await shop.db.select().from(customers).where(eq(customers.email, email));
    expect(rows.map(({ name, phone }) => [name, phone])).toEqual([
      ['Ida Brandsma', '0123'],
      ['Jan Brandsma', null],
    ]);
    expect(rows[0]).toMatchObject(given);
  });

  test('one that was found is taken by key, and finding goes by name, e-mail and phone', async () => {
    const email = mailbox();
    await shop.taken({ customer: { name: 'Quirine Vos', email, phone: '0800 77' } });
    for (const q of ['quirine', email, '0800 77']) {
      const path = `/api/customers?q=${encodeURIComponent(q)}`;
      const answer = await shop.call('counter', 'GET', path);
      const { items } = await said<{ items: { id: number; name: string }[] }>(answer);
      expect(items.map((c) => c.name)).toEqual(['Quirine Vos']);
      const { number } = await shop.taken({ customer: { id: items[0]?.id } });
      expect((await shop.detail(number)).customer).toEqual({
        id: items[0]?.id,
        name: 'Quirine Vos',
      });
    }
  });

  test('one that is not there is refused by name, and nothing is written', async () => {
    const before = await shop.db.$count(tickets);
    const answer = await shop.take(intakeOf({ customer: { id: 999_999 } }));
    expect(answer.status).toBe(422);
    expect((await problem(answer)).errors?.[0]?.path).toBe('customer.id');
    expect(await shop.db.$count(tickets)).toBe(before);
  });
});

describe('the instrument', () => {
  test('is taken in once: not again while its ticket is open', async () => {
    const instrument = { maker: 'Tessaly', model: 'T9', serial: 'OPEN-1' };
    const body = intakeOf({ instrument, customer: { name: 'Ida', email: mailbox() } });
    const answers = await Promise.all(Array.from({ length: 10 }, () => shop.take(body)));
    const made = answers.filter((a) => a.status === 201);
    expect(answers.filter((a) => a.status === 409)).toHaveLength(9);
    expect(made).toHaveLength(1);
    const late = await shop.take(body);
    expect(late.status).toBe(409);
    const refused = (await late.json()) as Problem & { openTicket: string };
    expect(refused.errors?.[0]?.path).toBe('instrument.serial');
    const numbers = await Promise.all(made.map((a) => said<Taken>(a)));
    expect([refused.openTicket]).toEqual(numbers.map((t) => t.number));
  });

  test('the same serial comes back as the same instrument with its history', async () => {
    const instrument = { maker: 'Tessaly', model: 'T9', serial: 'BACK-1' };
    const first = await shop.taken({ instrument, symptoms: ['dead'] });
    const customer = { id: (await shop.detail(first.number)).customer.id };
    await shop.stand(first.number, 'handed-over');
    const second = await shop.taken({ instrument, customer, symptoms: ['drifts'] });
    const { board, instrument: known } = await shop.detail(second.number);
    expect(board).toBe('LB-40 rev C');
    expect((await shop.detail(first.number)).instrument).toEqual(known);
    const found = await shop.call('counter', 'GET', '/api/instruments?q=BACK-1');
    const { items } = await said<{ items: { tickets: { number: string; symptoms: string }[] }[] }>(
      found,
    );
    expect(items).toHaveLength(1);
    expect(items[0]?.tickets.map((t) => t.number)).toEqual([second.number, first.number]);
  });

  test('of a new owner it changes hands; the earlier ticket stays with who brought it', async () => {
    const instrument = { maker: 'Tessaly', model: 'T9', serial: 'SOLD-1' };
    const seller = await shop.taken({ instrument, customer: { name: 'Seller' } });
    await shop.stand(seller.number, 'handed-over');
    const customer = { name: 'Buyer' };
    const unsaid = await shop.take(intakeOf({ instrument, customer }));
    expect(unsaid.status).toBe(409);
    expect((await problem(unsaid)).errors?.[0]?.path).toBe('changedHands');
    expect(await shop.db.$count(customers, eq(customers.name, 'Buyer'))).toBe(0);
    const buyer = await shop.taken({ instrument, customer, changedHands: true });
    const [one, two] = [await shop.detail(seller.number), await shop.detail(buyer.number)];
    expect(two.instrument.id).toBe(one.instrument.id);
    expect([one.customer.name, two.customer.name]).toEqual(['Seller', 'Buyer']);
    const of = eq(instruments.serial, 'SOLD-1');
    const [row] = await shop.db.select().from(instruments).where(of);
    expect(row).toMatchObject({ customerId: two.customer.id, version: 2 });
    const cookie = await shop.enter(buyer);
    const status = await shop.get(cookie, `/api/status/${buyer.number}`);
    expect(status.status).toBe(200);
    expect(await status.text()).not.toContain('Seller');
    expect((await shop.get(cookie, `/api/status/${seller.number}`)).status).toBe(404);
  });

  test('of a model not met before is taken in, with no board yet; another model may have the serial', async () => {
    const instrument = { maker: 'Ostrel', model: 'O-Newly', serial: 'TWIN' };
    const { number } = await shop.taken({ instrument });
    expect((await shop.detail(number)).board).toBeNull();
    const twin = await shop.taken({ instrument: { ...instrument, maker: 'Corvane' } });
    const ids = [number, twin.number].map(async (n) => (await shop.detail(n)).instrument.id);
    expect(new Set(await Promise.all(ids)).size).toBe(2);
    const rows = await shop.db.select().from(models).where(eq(models.name, 'O-Newly'));
    expect(rows.map((m) => m.maker).sort()).toEqual(['Corvane', 'Ostrel']);
  });
});

describe('numbers', () => {
  test('twenty at once, of one new model, get twenty numbers without a gap; refused ones take none', async () => {
    const month = monthOf(new Date(), ZONE);
    await shop.db.insert(ticketNumbers).values({ month: '0102', last: 41 });
    const before = running((await shop.taken()).number);
    const answers = await Promise.all(
      Array.from({ length: 30 }, (_, i) => {
        const instrument = { maker: 'Brandreth', model: 'B-Rush', serial: `R-${i}` };
        return shop.take(intakeOf({ instrument, ...(i % 3 ? {} : { symptoms: [] }) }));
      }),
    );
    const made = answers.filter((a) => a.status === 201);
    expect(answers.filter((a) => a.status === 422)).toHaveLength(10);
    const numbers = await Promise.all(made.map(async (a) => (await said<Taken>(a)).number));
    expect(numbers.every((n) => n.startsWith(`${month}-`))).toBe(true);
    expect(numbers.map(running).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 20 }, (_, i) => before + 1 + i),
    );
    expect(await shop.db.$count(models, eq(models.name, 'B-Rush'))).toBe(1);
    expect(await shop.db.$count(instruments, like(instruments.serial, 'R-%'))).toBe(20);
    const other = eq(ticketNumbers.month, '0102');
    expect(await shop.db.select().from(ticketNumbers).where(other)).toEqual([
      { month: '0102', last: 41 },
    ]);
  });
});

describe('what is not taken in names its field', () => {
  const unit = { maker: 'Tessaly', model: 'T9', serial: 'X-1' };
  test.each<[string, Record<string, unknown>, string]>([
    ['no symptom', { symptoms: [], symptomText: ' \n' }, 'symptoms'],
    ['a symptom of its own', { symptoms: ['haunted'] }, 'symptoms[0]'],
    ['no serial', { instrument: { ...unit, serial: ' ' } }, 'instrument.serial'],
    ['a serial of two lines', { instrument: { ...unit, serial: 'a\nb' } }, 'instrument.serial'],
    ['no one’s e-mail', { customer: { name: 'Ida', email: 'ida at home' } }, 'customer.email'],
    ['nobody', { customer: {} }, 'customer.name'],
    ['a customer’s name for a key', { customer: { id: 'Ida', name: 'Ida' } }, 'customer.id'],
    ['yesterday promised', { promisedOn: dayFromNow(-1) }, 'promisedOn'],
    ['more than a year promised', { promisedOn: dayFromNow(367) }, 'promisedOn'],
    ['a day that no month has', { promisedOn: '2027-02-30' }, 'promisedOn'],
    ['an incident of its own', { incident: 'gremlins' }, 'incident'],
  ])('%s', async (_name, more, path) => {
    const before = await shop.db.select().from(ticketNumbers);
    const answer = await shop.take(intakeOf(more));
    expect(answer.status).toBe(422);
    expect((await problem(answer)).errors?.map((e) => e.path)).toEqual([path]);
    expect(await shop.db.select().from(ticketNumbers)).toEqual(before);
  });

  test.each([0, 1, 365])(
    'a promise %i days from now by the shop’s calendar is kept',
    async (days) => {
      const promisedOn = dayFromNow(days);
      const { number } = await shop.taken({ promisedOn });
      expect((await shop.detail(number)).promisedOn).toBe(promisedOn);
    },
  );

  test('no customer’s words are lost', async () => {
    const said = {
      symptomText: 'Smoke,\r\nthen “pop” – 😀',
      condition: 'Cracked',
      incident: 'wet',
    };
    const with_ = { accessories: ['leads', 'case'], accessoryText: 'a strap', promisedOn: SOON };
    const { number } = await shop.taken({ ...said, ...with_, symptoms: ['burnt', 'dead'] });
    expect(await shop.detail(number)).toMatchObject({
      ...said,
      ...with_,
      symptomText: 'Smoke,\nthen “pop” – 😀',
      symptoms: ['burnt', 'dead'],
      stage: 'received',
      assignedTo: null,
      version: 1,
    });
  });
});
