/** What lets a repaired instrument go: readings that prove something, or words that a senior signs. */
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { tickets } from '@/db/schema/tickets';
import { startApp, type TestApp } from '../fixtures/app';
import { openBenchShop, reading, type BenchShop, type Who } from '../fixtures/bench-shop';
import { said, type Detail, type Problem } from '../fixtures/desk-shop';

let app: TestApp;
let shop: BenchShop;
beforeAll(async () => {
  app = await startApp();
  shop = await openBenchShop({ databaseUrl: app.databaseUrl, origin: app.origin });
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const detail = async (number: string) =>
  said<Detail>(await shop.call('senior', 'GET', `/api/tickets/${number}`));
const measure = async (number: string, more: Record<string, unknown>) => {
  const json = reading({ phase: 'after-repair', ...more });
  await said(await shop.call('technician', 'POST', `/api/tickets/${number}/readings`, { json }));
};
const step = async (who: Who, number: string, name: string, note = '') => {
  const { version } = await detail(number);
  const ask = { json: { step: name, note }, version };
  return shop.call(who, 'POST', `/api/tickets/${number}/steps`, ask);
};
const why = async (answer: Response) => {
  const { detail: words, errors } = (await answer.json()) as Problem;
  return { status: answer.status, words, path: errors?.[0]?.path };
};
const row = async (number: string) => {
  const [found] = await shop.db.select().from(tickets).where(eq(tickets.number, number));
  return found;
};
/** What a sound board shows between V and P: RT1 alone, 1.1 kΩ (content/demo/boards/lb-40.json). */
const SOUND = { position: 'volts', typed: '1k1' };

test('a reading between points that no net bears proves nothing, one on the network does', async () => {
  const number = await shop.ticket({ stage: 'in-repair' });
  await measure(number, { to: 'NOWHERE', typed: '1k1' });
  await measure(number, { from: null, to: null, part: 'R99', typed: '1k1' });
  const begin = (await detail(number)).steps.find((s) => s.step === 'begin-release-check');
  expect(begin?.blocked).toContain('can be judged');
  const refused = await why(await step('technician', number, 'begin-release-check'));
  expect(refused.status).toBe(409);
  expect(refused.words).toContain('No reading after repair can be judged on the board’s network');
  await measure(number, SOUND);
  expect((await step('technician', number, 'begin-release-check')).status).toBe(200);
  const release = (await detail(number)).steps.find((s) => s.step === 'release');
  expect(release).toMatchObject({ blocked: null, exception: null });
  expect((await step('senior', number, 'release', 'All ranges passed.')).status).toBe(200);
  expect(await row(number)).toMatchObject({ stage: 'ready', exceptionReason: null });
});

test('a reading of one part judged alone counts as well', async () => {
  const number = await shop.ticket({ stage: 'in-repair' });
  await measure(number, { from: null, to: null, part: 'U2', typed: '4M7' });
  expect((await step('technician', number, 'begin-release-check')).status).toBe(200);
});

test('what the readings still accuse goes as an exception that a senior signs and the customer reads', async () => {
  const number = await shop.ticket({ stage: 'release-check' });
  // RT1 open: nothing conducts between V and P.
  await measure(number, { position: 'volts', typed: 'OL' });
  const offered = (await detail(number)).steps.find((s) => s.step === 'release');
  expect(offered?.exception).toContain('RT1');
  expect(offered?.note).toBe('why it may leave all the same');
  const page = await shop.call('senior', 'GET', `/tickets/${number}`);
  expect(await page.text()).toContain('signed by you; the customer reads it');
  expect((await step('technician', number, 'release', 'x')).status).toBe(403);
  expect(await why(await step('senior', number, 'release', ' '))).toMatchObject({
    status: 422,
    path: 'note',
  });
  const long = await why(await step('senior', number, 'release', 'x'.repeat(1001)));
  expect(long).toMatchObject({ status: 422, path: 'note' });
  expect(await row(number)).toMatchObject({ stage: 'release-check', exceptionReason: null });
  const words = 'Ohms ranges stay out of use: the label says so.';
  expect((await step('senior', number, 'release', words)).status).toBe(200);
  expect(await row(number)).toMatchObject({
    stage: 'ready',
    exceptionReason: words,
    exceptionBy: shop.people.senior.userId,
  });
  const own = await shop.call('customer', 'GET', `/api/status/${number}`);
  expect(await said<{ exception: string }>(own)).toMatchObject({ exception: words });
});

test('the incident alone accuses nothing after a repair', async () => {
  const number = await shop.ticket({ stage: 'release-check', incident: 'mains-on-ohms' });
  await measure(number, SOUND);
  expect((await detail(number)).steps.find((s) => s.step === 'release')?.exception).toBeNull();
});

test('where no network of the board is known, a reading and words do', async () => {
  const number = await shop.ticket({ stage: 'in-repair', board: null });
  const without = await why(await step('technician', number, 'begin-release-check', 'x'));
  expect(without).toMatchObject({ status: 409 });
  await measure(number, { typed: '1k1' });
  expect(await why(await step('technician', number, 'begin-release-check'))).toMatchObject({
    status: 422,
    path: 'note',
  });
  const words = 'Input 10.0 MΩ on all ranges.';
  expect((await step('technician', number, 'begin-release-check', words)).status).toBe(200);
  expect((await step('senior', number, 'release', 'Compared with the reference.')).status).toBe(
    200,
  );
});
