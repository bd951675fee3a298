/** Lists whose address asks for what is not there, and small print of the customer's page. */
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { crossSite } from '@/server/http/origin';
import { boards } from '@/db/schema/shop';
import { openSession } from '../fixtures/rows';
import { openDeskShop, type DeskShop } from '../fixtures/desk-shop';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
  for (let i = 0; i < 27; i += 1)
    await shop.taken({ instrument: { maker: 'Tessaly', model: 'T9', serial: `L-${i}` } });
});
afterAll(() => shop?.close());

const page = async (path: string) =>
  (await (await shop.get(shop.cookies.owner, path)).text())
    .replace(/<[^>]+>/g, ' ')
    .replace(/\s+/g, ' ');

describe('past the end', () => {
  test('the queue shows its last page', async () => {
    const text = await page('/queue?page=99');
    expect(text).toContain('26–27 of 27 tickets');
    expect(text).not.toContain('wait here for the bench');
    expect(text).toMatch(/\d{4}-\d{4}/);
    const none = await page('/queue?page=99&q=nosuch');
    expect(none).toContain('No ticket fits this filter.');
  });

  test('boards, people, fault notes, the audit log and the outbox do as well', async () => {
    const createdAt = new Date();
    const about = { revision: 'A', maker: 'Ostrel', about: '', positions: [], createdAt };
    await shop.db
      .insert(boards)
      .values(Array.from({ length: 60 }, (_, i) => ({ code: `OS-${i}`, ...about })));
    expect(await page('/boards?page=9')).toContain('51–61 of 61 boards');
    for (let i = 0; i < 24; i += 1) await shop.hire('counter');
    expect(await page('/people?page=99')).toContain('26–28 of 28 people');
    for (const path of ['/audit', '/outbox', '/faults', '/faults?state=draft'])
      expect(await page(`${path}${path.includes('?') ? '&' : '?'}page=99`), path).not.toMatch(
        /\d{3,}–\d/,
      );
  });
});

describe('the filter of the queue', () => {
  test('cuts what is too long, and keeps the rest of what was asked', async () => {
    const { number } = await shop.taken();
    await shop.stand(number, 'ready');
    const long = encodeURIComponent(`${'x'.repeat(100)}yz`);
    const html = await (
      await shop.get(shop.cookies.counter, `/queue?stage=ready&q=${long}`)
    ).text();
    expect(html).toMatch(/<option value="ready" selected/);
    expect(html).toContain(`value="${'x'.repeat(100)}"`);
    expect(html).toContain('No ticket fits this filter.');
    const wrong = await shop.get(shop.cookies.counter, '/queue?stage=ready&who=everybody');
    const shown = [...(await wrong.text()).matchAll(/href="\/tickets\/([\d-]+)"/g)];
    expect(shown.map((m) => m[1])).toEqual([number]);
  });

  test('is not filled in by the browser from an earlier visit', async () => {
    const html = await (await shop.get(shop.cookies.counter, '/queue')).text();
    const form =
      /<form[^>]*role="search"[^>]*Filter the queue[\s\S]*?<\/form>/.exec(html)?.[0] ?? '';
    const fields = form.match(/<(?:input(?![^>]*type="hidden")|select)[^>]*>/g) ?? [];
    expect(fields).toHaveLength(4);
    for (const field of fields) expect(field).toContain('autocomplete="off"');
  });
});

test('what was left with the shop is written without a space before the comma', async () => {
  const taken = await shop.taken({ accessories: ['leads'] });
  const html = await (await shop.get(await shop.enter(taken), `/status/${taken.number}`)).text();
  expect(html).toContain('Tessaly T9, with test leads');
  expect(html).not.toMatch(/\s,/);
});

test('no address is exempt from the cross-site check', async () => {
  const cookie = await openSession(shop.db, shop.people.owner.id);
  const headers = { cookie, origin: 'https://elsewhere.example', 'sec-fetch-site': 'cross-site' };
  const answer = await shop.ask({ method: 'POST', path: '/api/payments/webhook', headers });
  expect(answer.status).toBe(403);
  const request = new Request('http://shop.example/', { method: 'POST', headers });
  expect(crossSite(request, 'http://shop.example')).toBe(true);
});
