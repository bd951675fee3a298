/**
 * Every route and page × everybody who may ask × whose object: the expected answer follows from the contracts and
 * the permission table, and a refusal tells nothing and changes nothing.
 */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { ROUTES } from '@/contracts/routes';
import { PAGES } from '@/server/auth/page-access';
import { note, writeTable } from '../fixtures/access-table';
import { startApp, type TestApp } from '../fixtures/app';
import { ask, together, wholeAnswer } from '../fixtures/ask';
import { refusedByPage, refusedByRoute, type Asker } from '../fixtures/askers';
import { once, type Call, type Calls } from '../fixtures/calls';
import { askerNamed, filled, nameOf, NAMED_ROUTES, ROUTE_CALLS } from '../fixtures/every-call';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { marksIn } from '../fixtures/marks';
import { PAGE_CALLS } from '../fixtures/page-calls';
import { endpointsOnDisk, pagesOnDisk } from '../fixtures/pages-on-disk';

let app: TestApp;
let shop: MarkedShop;
beforeAll(async () => {
  app = await startApp({ env: MARKED_SETTINGS });
  shop = await openMarkedShop(app);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

test('every route of the contracts has its endpoint, and every endpoint its route', () => {
  expect(endpointsOnDisk.toSorted()).toEqual(ROUTES.map(nameOf).toSorted());
});

test('every page on disk stands in the table of pages, and every page of the table on disk', () => {
  expect(pagesOnDisk.toSorted()).toEqual(Object.keys(PAGES).toSorted());
});

test('every route and page is asked below', () => {
  expect(Object.keys(ROUTE_CALLS).toSorted()).toEqual(ROUTES.map(nameOf).toSorted());
  const taken = Object.entries(PAGES).map(([page, { get, post }]) => [page, !!get, !!post]);
  const asked = Object.entries(PAGE_CALLS).map(([page, { get, post }]) => [page, !!get, !!post]);
  expect(asked.toSorted()).toEqual(taken.toSorted());
});

type Asked = { asker: Asker; call: Call; expected: number; refused: boolean };
type Subject = { name: string; method: string; path: string; usual: number };

/** All calls of a route or page, by everybody, with what each is to get. */
async function everyCall(
  calls: Calls,
  usual: number,
  refusedTo: (asker: Asker) => number | null,
): Promise<Asked[]> {
  const asked: Asked[] = [];
  for (const asker of shop.askers) {
    const refusal = refusedTo(asker);
    for (const call of await calls(shop, asker, refusal === null)) {
      const expected = refusal ?? call.status ?? usual;
      const refused = refusal !== null || (expected >= 400 && !call.shows);
      asked.push({ asker, call, expected, refused });
    }
  }
  return asked;
}

async function answerOf({ method, path }: Subject, { asker, call }: Asked): Promise<Response> {
  const { params, query = '', headers, json, form } = call;
  const version = typeof call.version === 'function' ? await call.version() : call.version;
  return ask(app, {
    method,
    path: filled(path, params) + query,
    headers: { ...asker.headers, ...headers },
    json,
    // A form carries the version that its page showed.
    form: form && version !== undefined ? { ...form, version: String(version) } : form,
    version,
  });
}

/** Asks them all: the refused first, to see that they change nothing. */
async function checkAll(subject: Subject, asked: Asked[]): Promise<void> {
  const found: string[] = [];
  const look = async (one: Asked) => {
    const answer = await answerOf(subject, one);
    const who = `${one.asker.name}, ${one.call.what}`;
    note(subject.name, one.call.what, one.asker.name, answer.status);
    const text = await wholeAnswer(answer);
    if (answer.status !== one.expected)
      found.push(`${who}: ${answer.status} where ${one.expected} is due`);
    // What was sent may come back in the form it was sent in.
    const sent = marksIn(JSON.stringify(one.call));
    const told = marksIn(text).filter((word) => !sent.includes(word));
    if (one.refused && told.length > 0) found.push(`${who}: told ${told.join(', ')}`);
  };
  const before = await shop.states();
  await together(
    asked.filter(({ refused }) => refused),
    look,
  );
  expect(await shop.states(), 'a refused call changed something').toEqual(before);
  const allowed = asked.filter(({ refused }) => !refused);
  // One whose version is looked up changes what the next one changes too: they take turns.
  const inTurn = ({ call }: Asked) => typeof call.version === 'function';
  await together(
    allowed.filter((one) => !inTurn(one)),
    look,
  );
  for (const one of allowed.filter(inTurn)) await look(one);
  expect(found).toEqual([]);
}

test.each(NAMED_ROUTES)(
  '%s answers each as their role and scopes say',
  async (name, { method, path, status, who }) => {
    const calls = ROUTE_CALLS[name] ?? once();
    const asked = await everyCall(calls, status, (asker) => refusedByRoute(who, asker));
    await checkAll({ name, method, path, usual: status }, asked);
  },
);

/** Shown wherever a request ends without a page, whatever its method. */
const ENDS: Record<string, number> = { '/404': 404, '/500': 500 };
const pages = Object.entries(PAGES).flatMap(([path, rule]) =>
  (['get', 'post'] as const).map((verb) => [verb.toUpperCase(), path, rule, verb] as const),
);
test.each(pages)('%s %s opens for those it is for', async (method, path, rule, verb) => {
  const who = path in ENDS ? 'public' : (rule[verb] ?? null);
  const calls = PAGE_CALLS[path]?.[verb] ?? once(() => (verb === 'post' ? { form: {} } : {}));
  const usual = ENDS[path] ?? (verb === 'get' ? 200 : 303);
  const asked = await everyCall(calls, usual, (asker) => refusedByPage(who, asker));
  await checkAll({ name: `${method} ${path}`, method, path, usual }, asked);
});

const changing = [
  ...ROUTES.filter(({ method }) => method !== 'GET').map((r) => [nameOf(r), r.method, r.path]),
  ...Object.entries(PAGES).flatMap(([path, { post }]) =>
    post ? [[`POST ${path}`, 'POST', path]] : [],
  ),
] as [string, string, string][];
test.each(changing)('%s is not done for another site', async (name, method, path) => {
  const calls = ROUTE_CALLS[name] ?? PAGE_CALLS[path]?.post ?? once();
  const asker = askerNamed(shop, path.startsWith('/status') ? 'customer' : 'owner');
  const asked = (await calls(shop, asker, true)).map((call) => ({ asker, call }));
  const before = await shop.states();
  const signs: Record<string, string>[] = [
    { 'sec-fetch-site': 'cross-site' },
    { origin: 'http://evil.example' },
  ];
  for (const { call } of asked)
    for (const headers of signs) {
      const from = { ...call, headers: { ...call.headers, ...headers } };
      const one = { asker, call: from, expected: 403, refused: true };
      const answer = await answerOf({ name, method, path, usual: 403 }, one);
      expect(answer.status, call.what).toBe(403);
      expect(marksIn(await wholeAnswer(answer))).toEqual([]);
    }
  expect(await shop.states()).toEqual(before);
});

test('an address that is no page is closed to everybody', async () => {
  for (const asker of shop.askers)
    for (const path of ['/nothing', '/tickets', '/people/1/edit', '/api/nothing', '/.env']) {
      const answer = await ask(app, { method: 'GET', path, headers: asker.headers });
      expect(answer.status, `${asker.name} ${path}`).toBe(404);
      expect(marksIn(await answer.text())).toEqual([]);
    }
});

test('the table is written down', () => {
  expect(writeTable(shop.askers.map(({ name }) => name))).toBeGreaterThan(200);
});
