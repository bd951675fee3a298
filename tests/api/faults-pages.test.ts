/** The steps as plain forms, revisions and comparisons on the page of a note; all of it without script. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { openFaultShop, type FaultShop } from '../fixtures/fault-shop';

let shop: FaultShop;
beforeAll(async () => {
  shop = await openFaultShop();
});
afterAll(() => shop?.close());

const page = async (who: 'counter' | 'tech' | 'other' | 'senior', path: string) => {
  const answer = await shop.call(who, 'GET', path);
  return { status: answer.status, html: await answer.text() };
};

test('a note goes its way by forms: to review, back with a reason, again, published', async () => {
  const note = await shop.draft('tech', 'By forms alone');
  const post = (who: 'tech' | 'senior', version: number, step: string, why = '') =>
    shop.call(who, 'POST', `/faults/${note.id}`, {
      form: { step, note: why, version: String(version) },
    });
  expect((await page('tech', `/faults/${note.id}`)).html).toContain('Send to review');
  const sent = await post('tech', 1, 'submit');
  expect([sent.status, sent.headers.get('location')]).toEqual([303, `/faults/${note.id}`]);

  const noReason = await post('senior', 2, 'send-back');
  expect(noReason.status).toBe(422);
  expect(await noReason.text()).toContain('Write what is still missing.');
  expect((await post('senior', 2, 'send-back', 'Which reading proves it?')).status).toBe(303);
  expect((await page('tech', `/faults/${note.id}`)).html).toContain('Which reading proves it?');

  expect((await post('tech', 3, 'submit')).status).toBe(303);
  const stale = await post('senior', 3, 'publish');
  expect(stale.status).toBe(412);
  expect((await post('tech', 4, 'publish')).status).toBe(403);
  expect((await post('senior', 4, 'publish')).status).toBe(303);
  expect((await page('counter', `/faults/${note.id}`)).html).toContain(
    'By forms alone: the proof.',
  );
});

test('a counter cannot post a step, whoever’s note it is', async () => {
  const note = await shop.published('Not for the counter');
  const form = { step: 'retire', note: 'x', version: String(note.version) };
  const answer = await shop.call('counter', 'POST', `/faults/${note.id}`, { form });
  expect(answer.status).toBe(404);
  expect((await shop.get('counter', note.id)).state).toBe('published');
});

test('the page says what holds for which label, and compares revisions', async () => {
  const note = await shop.published('Old words stand');
  const saved = await shop.read<{ id: number; version: number }>(
    await shop.save('senior', note, shop.input('New words stand')),
  );
  const reader = await page('counter', `/faults/${note.id}`);
  expect(reader.html).toContain('Tessaly T11, Tessaly T9');
  expect(reader.html).not.toContain('New words');
  expect((await page('counter', `/faults/${note.id}?compare=1-2`)).status).toBe(404);
  expect((await page('tech', `/faults/${note.id}?revision=2`)).status).toBe(404);
  const compared = await page('senior', `/faults/${note.id}?compare=1-2`);
  expect(compared.html).toMatch(/<del>Old<\/del><ins>New<\/ins> words stand/);
  expect((await page('senior', `/faults/${note.id}?compare=1-99`)).status).toBe(404);
  await shop.read(await shop.step('senior', saved, 'publish'));
  expect((await page('counter', `/faults/${note.id}?compare=1-2`)).status).toBe(200);
});

test('addresses that name nothing are not there', async () => {
  for (const path of ['/faults/0', '/faults/x', '/faults/999999', '/faults/1e9/edit'])
    expect((await page('senior', path)).status, path).toBe(404);
});

test('the editor opens with what the ticket knows, and without one', async () => {
  expect((await page('tech', '/faults/new')).status).toBe(200);
  expect((await page('tech', '/faults/new?ticket=2612-9999')).status).toBe(200);
  expect((await page('counter', '/faults/new')).status).toBe(404);
});
