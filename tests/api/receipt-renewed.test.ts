/** The receipt page after a new claim code: what it says of the letter, and who is let in no longer. */
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { customers } from '@/db/schema/shop';
import { insertBoard, insertCustomer, insertTicket, openSession } from '../fixtures/rows';
import { openStaffShop, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let counter: { id: number; cookie: string };
beforeAll(async () => {
  shop = await openStaffShop();
  const { id } = await shop.hire('counter');
  counter = { id, cookie: await openSession(shop.db, id) };
});
afterAll(() => shop?.close());

async function ticket() {
  const customer = await insertCustomer(shop.db);
  const { id: board, modelId: model } = await insertBoard(shop.db);
  const of = { customer: customer.id, model, board, staff: counter.id };
  return { customer, ...(await insertTicket(shop.db, of)) };
}

/** Makes a new code and answers the receipt that follows, with its code and as plain text. */
async function renewed(number: string) {
  const path = `/tickets/${number}/receipt`;
  const headers = { cookie: counter.cookie };
  const answer = await shop.ask({ method: 'POST', path, form: {}, headers });
  const fresh = answer.headers.getSetCookie()[0]?.split(';')[0] ?? '';
  const cookie = `${counter.cookie}; ${fresh}`;
  const html = await (await shop.ask({ method: 'GET', path, headers: { cookie } })).text();
  const text = html.replace(/<[^>]+>/g, ' ').replace(/\s+/g, ' ');
  return { code: /receipt-code mono[^>]*>([^<]+)</.exec(html)?.[1] ?? '', text };
}

test('the new code is mailed to the customer, and the page says where to', async () => {
  const { number, customer } = await ticket();
  const { code, text } = await renewed(number);
  expect(text).toContain(`It is mailed to ${customer.email}. The old code no longer works`);
  expect((await shop.letter(customer.email)).text).toContain(code);
});

test('without an address the page says to hand the receipt over', async () => {
  const { number, customer } = await ticket();
  await shop.db.update(customers).set({ email: null }).where(eq(customers.id, customer.id));
  const { text } = await renewed(number);
  expect(text).toContain('No e-mail address of the customer is known: hand over this receipt.');
});

test('sessions by the old code of this ticket end, the customer’s others stay', async () => {
  const { number, id, customer } = await ticket();
  const byCode = await openSession(shop.db, customer.account, id);
  const byLink = await openSession(shop.db, customer.account);
  const see = async (cookie: string) => {
    const path = `/api/status/${number}`;
    return (await shop.ask({ method: 'GET', path, headers: { cookie } })).status;
  };
  expect([await see(byCode), await see(byLink)]).toEqual([200, 200]);
  await renewed(number);
  expect([await see(byCode), await see(byLink)]).toEqual([401, 200]);
});
