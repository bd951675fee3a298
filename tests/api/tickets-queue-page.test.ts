/** The queue as its page and its file show it. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { dayOf } from '@/domain/time/shop-day';
import { openDeskShop, ZONE, type DeskShop } from '../fixtures/desk-shop';

const day = (days: number) => dayOf(new Date(Date.now() + days * 86_400_000), ZONE);
const NUMBERS: string[] = [];

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
  const rows: [customer: string, serial: string, days: number | null][] = [
    ['Oost, "Bram"', '-7', 4],
    ['=HYPERLINK("x")', '@SUM(A1)', -3],
    ['Åsa Berg', '+31', null],
    ['Elin Vik', 'X 1', 0],
  ];
  for (const [name, serial, days] of rows) {
    const instrument = { maker: 'Tessaly', model: 'T9', serial };
    const { number } = await shop.taken({
      customer: { name },
      instrument,
      symptoms: ['dead', 'burnt'],
    });
    await shop.stand(number, 'on-the-bench', { promisedOn: days === null ? null : day(days) });
    NUMBERS.push(number);
  }
});
afterAll(() => shop?.close());

const html = async (path: string, who: 'counter' | 'technician' = 'counter') =>
  (await shop.get(shop.cookies[who], path)).text();
const shown = (page: string) => [...page.matchAll(/href="\/tickets\/([\d-]+)"/g)].map((m) => m[1]);
const byPlace = (...places: number[]) => places.map((place) => NUMBERS[place]);

test.each<[string, Record<string, string>, string]>([
  ['/api/tickets?format=csv&sort=number', {}, '\ufeff'],
  ['/api/tickets?sort=number', { accept: 'text/csv' }, ''],
  ['/api/tickets?sort=number&limit=1', { accept: 'text/csv' }, ''],
  ['/queue?sort=number&format=csv', {}, '\ufeff'],
])('%s with %j is a file of all that match, safe in a spreadsheet', async (path, headers, mark) => {
  const { cookies } = shop;
  const answer = await shop.ask({
    method: 'GET',
    path,
    headers: { cookie: cookies.counter, ...headers },
  });
  expect(answer.headers.get('content-type')).toMatch(/^text\/csv/);
  expect(answer.headers.get('content-disposition')).toContain('tickets.csv');
  const text = new TextDecoder('utf-8', { ignoreBOM: true }).decode(await answer.arrayBuffer());
  const rows = await Promise.all(NUMBERS.map((n) => shop.detail(n)));
  const line = (place: number, serial: string, customer: string) =>
    [
      `${NUMBERS[place]},on-the-bench,Tessaly,T9,${serial},LB-40 rev C,${customer},dead; burnt,unknown,,`,
      `${rows[place]?.receivedAt},${rows[place]?.promisedOn ?? ''}`,
    ].join('');
  expect(text.split('\r\n')).toEqual([
    `${mark}ticket,stage,maker,model,serial,board,customer,symptoms,incident,bench,received,promised`,
    line(0, "'-7", '"Oost, ""Bram"""'),
    line(1, "'@SUM(A1)", '"\'=HYPERLINK(""x"")"'),
    line(2, "'+31", 'Åsa Berg'),
    line(3, 'X 1', 'Elin Vik'),
    '',
  ]);
});

test('the file is long enough for a list longer than one reading of it', async () => {
  const { number } = await shop.taken({ customer: { name: 'Many' } });
  const { id: _id, number: _n, ...row } = await shop.ticket(number);
  const { tickets } = await import('@/db/schema/tickets');
  const copies = Array.from({ length: 1_100 }, (_, i) => ({ ...row, number: `0101-${1_000 + i}` }));
  await shop.db.insert(tickets).values(copies);
  for (const sort of ['promised', '-stage', 'customer']) {
    const path = `/api/tickets?format=csv&sort=${sort}&q=Many`;
    const text = await (await shop.get(shop.cookies.counter, path)).text();
    const numbers = text
      .trim()
      .split('\r\n')
      .slice(1)
      .map((line) => line.split(',')[0]);
    expect(numbers).toHaveLength(1_101);
    expect(new Set(numbers).size).toBe(1_101);
  }
});

test('the page shows overdue tickets first and says so; those without a promise come last', async () => {
  const page = await html('/queue?board=LB-40&q=LB&stage=on-the-bench');
  expect(shown(page)).toEqual([]);
  const all = await html('/queue?stage=on-the-bench');
  expect(shown(all)).toEqual(byPlace(1, 3, 0, 2));
  const rows = all.split('<tr').filter((row) => row.includes('href="/tickets/'));
  expect(rows.map((row) => row.includes('overdue'))).toEqual([true, false, false, false]);
  const late = NUMBERS[1] ?? '';
  await shop.stand(late, 'handed-over');
  expect(await html(`/queue?stage=closed`)).not.toContain('>overdue<');
  await shop.stand(late, 'on-the-bench');
});

test('the page keeps search, filter and order in its address and its links', async () => {
  const page = await html('/queue?q=berg&who=nobody&stage=on-the-bench&sort=-customer');
  expect(shown(page)).toEqual(byPlace(2));
  expect(page).toContain('value="berg"');
  expect(page).toMatch(/<option value="nobody" selected/);
  expect(page).toMatch(/<option value="on-the-bench" selected/);
  expect(page).toMatch(/aria-sort="descending"/);
  expect(page).toContain(
    '/queue?q=berg&#38;who=nobody&#38;stage=on-the-bench&#38;sort=-customer&#38;format=csv',
  );
});

test('a mistyped address shows the usual queue; a page beyond the last is no error', async () => {
  expect(shown(await html('/queue?sort=upside&page=zero'))).toContain(NUMBERS[0]);
  expect((await shop.get(shop.cookies.counter, '/queue?page=99')).status).toBe(200);
  expect(await html('/queue?q=nobody-at-all')).toContain('No ticket fits this filter.');
});

test('the ticket page offers each role its own steps', async () => {
  const path = `/tickets/${NUMBERS[3]}`;
  expect(await html(path, 'technician')).toContain('Send estimate');
  expect(await html(path, 'counter')).not.toContain('Send estimate');
});
