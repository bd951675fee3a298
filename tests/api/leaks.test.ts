/** What the customer gets, read whole: their pages, their JSON, their photos, their letters. */
import { randomBytes } from 'node:crypto';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { Status } from '@/contracts/status';
import { startApp, type TestApp } from '../fixtures/app';
import { ask, wholeAnswer } from '../fixtures/ask';
import { awaitLetters } from '../fixtures/inbox';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { mark, marksIn } from '../fixtures/marks';
import { insertFault } from '../fixtures/rows';

let app: TestApp;
let shop: MarkedShop;
beforeAll(async () => {
  app = await startApp({ env: { ...MARKED_SETTINGS, WORKER: '1' } });
  shop = await openMarkedShop(app);
  const { boards, staff } = shop;
  for (const state of ['draft', 'published'] as const)
    await insertFault(shop.db, { boardId: boards.anna.id, author: staff.colleague.id, state });
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const headersOf = (name: string) => {
  const asker = shop.askers.find((one) => one.name === name);
  if (!asker) throw new Error(`Nobody is called ${name}.`);
  return asker.headers;
};
const get = (who: string, path: string, more: Record<string, string> = {}) =>
  ask(app, { method: 'GET', path, headers: { ...headersOf(who), ...more } });

type Ticket = MarkedShop['tickets']['anna'];
/** The planted words that are the customer's own: what they said, gave and were shown. */
const openWords = (ticket: Ticket) => [
  shop.boards.anna.maker,
  shop.boards.anna.model,
  ticket.serial,
  ticket.accessoryText,
  ...ticket.said,
  ticket.shared.caption,
];
/** What bears no planted word and must stay inside all the same. */
const closedWords = ({ anna, annaToo, bruno }: MarkedShop['tickets']) => [
  anna.claimHash,
  anna.kept.publicId,
  annaToo.kept.publicId,
  bruno.shared.publicId,
  bruno.kept.publicId,
  bruno.number,
  'the technician',
  '@staff.example',
];
const expectClosed = (text: string) => {
  for (const word of closedWords(shop.tickets)) expect(text).not.toContain(word);
};

test.each(['customer', 'customer, claim code'])(
  'the status of a repair holds the own words and nothing else: %s',
  async (who) => {
    const { anna } = shop.tickets;
    const answer = await get(who, `/api/status/${anna.number}`);
    const json = (await answer.clone().json()) as unknown;
    expect(Status.parse(json)).toEqual(json);
    for (const path of [`/status/${anna.number}`, `/status/${anna.number}?message`]) {
      const text = await wholeAnswer(await get(who, path));
      expect(marksIn(text).toSorted()).toEqual(openWords(anna).toSorted());
      expect(text).not.toContain('astro-island');
      expectClosed(text);
    }
    const text = await wholeAnswer(answer);
    expect(marksIn(text).toSorted()).toEqual(openWords(anna).toSorted());
    expectClosed(text);
  },
);

test('the list of repairs names the own instruments alone', async () => {
  const { anna, annaToo } = shop.tickets;
  const label = [shop.boards.anna.maker, shop.boards.anna.model];
  const byLink = await wholeAnswer(await get('customer', '/status'));
  expect(marksIn(byLink).toSorted()).toEqual(label.toSorted());
  expect(byLink).toContain(anna.number);
  expect(byLink).toContain(annaToo.number);
  expectClosed(byLink);
  const byCode = await wholeAnswer(await get('customer, claim code', '/status'));
  expect(byCode).toContain(anna.number);
  expect(byCode).not.toContain(annaToo.number);
  expectClosed(byCode);
});

test('a shared photo brings no name of a file, a person or a place along', async () => {
  const { anna } = shop.tickets;
  for (const variant of ['thumb', 'page', 'full']) {
    const answer = await get('customer', `/api/photos/${anna.shared.publicId}/${variant}`);
    expect(answer.status).toBe(200);
    const text = Buffer.from(await answer.clone().arrayBuffer()).toString('latin1');
    expect(marksIn(text)).toEqual([]);
    expect(marksIn(await wholeAnswer(answer))).toEqual([]);
  }
});

const said = async (who: string, method: string, path: string, json: unknown, version?: number) => {
  const answer = await ask(app, { method, path, json, version, headers: headersOf(who) });
  if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status} ${await answer.text()}`);
  return (await answer.json()) as { number: string; claimCode: string };
};

/** Takes an instrument in and moves it along; every note on the way is an internal one. */
async function walk(email: string, steps: readonly string[]) {
  const instrument = { maker: mark('maker'), model: mark('model'), serial: mark('serial') };
  const { number, claimCode } = await said('counter', 'POST', '/api/tickets', {
    customer: { name: mark('customer'), email },
    instrument,
    symptomText: mark('symptom'),
    condition: mark('condition'),
  });
  const path = `/api/tickets/${number}`;
  const open = Object.values(instrument);
  for (const caution of ['leads', 'battery', 'capacitors'])
    await said('senior', 'PUT', `${path}/cautions`, { caution, ticked: true });
  const reading = { phase: 'after-repair', place: 1, part: 'F1', typed: '0R1' };
  const clientKey = crypto.randomUUID();
  await said('senior', 'POST', `${path}/readings`, { ...reading, clientKey });
  await said('senior', 'POST', `${path}/notes`, { body: mark('note') });
  await said('senior', 'POST', `${path}/messages`, { body: mark('message') });
  for (const [i, step] of steps.entries()) {
    const total = { amount: 4800, currency: 'EUR' };
    const estimate = step === 'send-estimate' ? { total, work: mark('work') } : null;
    await said('senior', 'POST', `${path}/steps`, { step, note: mark('event'), estimate }, i + 1);
  }
  return { number, claimCode, open };
}

test('no letter tells what is internal; the claim code stands in the receipt alone', async () => {
  const email = `${randomBytes(8).toString('hex')}@customer.example`;
  const repaired = await walk(email, [
    'begin',
    'send-estimate',
    'approve',
    'wait-for-parts',
    'parts-arrived',
    'start-repair',
    'begin-release-check',
    'release',
    'hand-over',
  ]);
  const lost = await walk(email, ['begin', 'give-up', 'return-unrepaired']);
  const form = { email };
  await ask(app, { method: 'POST', path: '/check/link', form });
  // Receipt, message, estimate, parts, ready, handed over; receipt, message, beyond repair, returned; two links.
  const letters = await awaitLetters(email, 12);
  expect(letters).toHaveLength(12);
  const open = [...repaired.open, ...lost.open];
  for (const letter of letters) {
    const text = JSON.stringify(letter);
    const internal = marksIn(text).filter(
      (word) => !open.includes(word) && !word.startsWith('zqcustomer'),
    );
    expect(internal, letter.subject).toEqual([]);
    expect(text).not.toMatch(/@staff\.example|the senior|the counter/);
    const receipt = letter.subject.startsWith('Receipt');
    for (const { claimCode } of [repaired, lost])
      if (text.includes(claimCode)) expect(receipt, letter.subject).toBe(true);
  }
  expect(letters.filter(({ subject }) => subject.startsWith('Receipt'))).toHaveLength(2);
});
