/** The list of the staff: finding, ordering, paging, and taking it along as a file. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { cookieOf, openStaffShop, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let cookie: string;
const NAMES = ['Åsa Berg', 'Bram Oost', 'Cleo 100%_sure', '=1+1 Dov', 'Elin Vik', 'Bram Oost'];
beforeAll(async () => {
  shop = await openStaffShop();
  const owner = await shop.hire('owner', { name: 'Zita Owner' });
  cookie = cookieOf(await shop.signIn(owner.email));
  for (const [i, name] of NAMES.entries())
    await shop.hire(i % 2 ? 'technician' : 'counter', {
      name,
      email: `list-${i}@staff.example`,
      createdAt: new Date(Date.UTC(2026, 0, 1 + i)),
    });
  await shop.hire('senior', { name: 'Gone', disabledAt: new Date() });
  await shop.hire('senior', { name: 'Not yet', passwordHash: null });
  await shop.hire('customer', { name: 'A customer' });
});
afterAll(() => shop?.close());

const get = (path: string, headers: Record<string, string> = {}) =>
  shop.ask({ method: 'GET', path, headers: { cookie, ...headers } });
type Page = { items: { name: string; email: string; state: string }[]; next: string | null };
const list = async (query = '') => (await (await get(`/api/people${query}`)).json()) as Page;
const names = async (query: string) => (await list(query)).items.map(({ name }) => name);

test('the staff stand in order of name, and customers do not stand there', async () => {
  expect(await names('')).toEqual([
    '=1+1 Dov',
    'Åsa Berg',
    'Bram Oost',
    'Bram Oost',
    'Cleo 100%_sure',
    'Elin Vik',
    'Gone',
    'Not yet',
    'Zita Owner',
  ]);
});

test.each([
  ['?q=bram', ['Bram Oost', 'Bram Oost']],
  ['?q=list-4%40', ['Elin Vik']],
  ['?q=%25_', ['Cleo 100%_sure']],
  ['?q=%5C', []],
  ['?q=zq&role=owner', []],
  ['?role=owner', ['Zita Owner']],
  ['?state=disabled', ['Gone']],
  ['?state=invited', ['Not yet']],
  ['?role=senior&state=active', []],
  ['?role=&state=&q=', NAMES.concat('Gone', 'Not yet', 'Zita Owner')],
])('%s finds %j', async (query, found) => {
  expect((await names(query)).toSorted()).toEqual(found.toSorted());
});

test.each(['name', '-name', 'email', '-email', 'since', '-since'])(
  'paged by cursor in the order %s, everybody comes once and in order',
  async (sort) => {
    const whole = (await list(`?sort=${sort}`)).items.map(({ email }) => email);
    const paged: string[] = [];
    for (let cursor = ''; ;) {
      const page = await list(`?sort=${sort}&limit=2${cursor && `&cursor=${cursor}`}`);
      paged.push(...page.items.map(({ email }) => email));
      if (page.next === null) break;
      cursor = page.next;
    }
    expect(paged).toEqual(whole);
    expect(new Set(paged).size).toBe(9);
  },
);

test.each(['limit=0', 'limit=201', 'sort=role', 'cursor=x', 'role=customer', 'state=gone'])(
  'the list refuses %s by its name',
  async (query) => {
    const answer = await get(`/api/people?${query}`);
    const { errors } = (await answer.json()) as { errors: { path: string }[] };
    expect([answer.status, errors[0]?.path]).toEqual([422, query.split('=')[0]]);
  },
);

test.each<[string, Record<string, string>]>([
  ['/api/people?role=technician&format=csv', {}],
  ['/api/people?role=technician', { accept: 'text/csv' }],
  ['/people?role=technician&format=csv', {}],
])('%s with %j is a file of those that match, safe in a spreadsheet', async (path, headers) => {
  const answer = await get(path, headers);
  expect(answer.headers.get('content-type')).toMatch(/^text\/csv/);
  const lines = (await answer.text()).replace('\ufeff', '').trimEnd().split('\r\n');
  expect(lines[0]).toBe('name,email,role,state,second factor,since');
  expect(lines.slice(1).map((line) => line.split(',')[0])).toEqual([
    "'=1+1 Dov",
    'Bram Oost',
    'Bram Oost',
  ]);
});

test('the page keeps search, filter and order in its address and its links', async () => {
  const html = await (await get('/people?q=o&role=counter&sort=-name&page=1')).text();
  expect(html).toContain('value="o"');
  expect(html).toMatch(/<option value="counter" selected/);
  expect(html).toMatch(/aria-sort="descending"/);
  expect(html).toContain('/people?q=o&#38;role=counter&#38;sort=-name&#38;page=1&#38;format=csv');
  expect(html.indexOf('Cleo')).toBeGreaterThan(0);
});

test('a mistyped address of the page shows the whole list', async () => {
  const answer = await get('/people?sort=upside&page=zero');
  expect(answer.status).toBe(200);
  expect(await answer.text()).toContain('Åsa Berg');
});

test('an empty result says so and leads back', async () => {
  expect(await (await get('/people?q=nobody-at-all')).text()).toContain('Nobody fits this filter');
});

test('the page shows no page beyond the last as an error', async () => {
  expect((await get('/people?page=99')).status).toBe(200);
});
