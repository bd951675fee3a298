/**
 * Strange bodies, addresses, queries and headers on every route, by somebody who may use it. Whatever comes: no answer
 * of 500, none slower than five seconds, every refusal a problem with the path of the field, every success the
 * contract's. FUZZ_SEED repeats a run.
 */
import fc from 'fast-check';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Route } from '@/contracts/route';
import { startApp, type TestApp } from '../fixtures/app';
import { inputOf } from '../fixtures/arbitrary';
import { freshAddress, together } from '../fixtures/ask';
import type { Call } from '../fixtures/calls';
import { faultsOf } from '../fixtures/civil';
import { filled, NAMED_ROUTES, rightCall, userOf } from '../fixtures/every-call';
import { fullBodies } from '../fixtures/full-bodies';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { BROKEN_TEXTS, NASTY_VALUES, nastyJson, placesIn, withAt } from '../fixtures/nasty';

const SEED = Number(process.env['FUZZ_SEED'] ?? 2612);
/** How many times the usual number of tries; the usual ones take half a minute. */
const TIMES = Number(process.env['FUZZ_TIMES'] ?? 1);

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

let turn = SEED;
/** Some of many, others each time: over a whole run all of them come to their turn. */
function some<T>(many: readonly T[], usual: number, from = (turn += usual)): T[] {
  const count = Math.min(many.length, usual * TIMES);
  return Array.from({ length: count }, (_, i) => many[(from * 11 + i * 7) % many.length] as T);
}

type Strange = {
  params?: Call['params'];
  query?: string;
  body?: string | Uint8Array;
  headers?: Record<string, string>;
};

/** Sends what is strange on top of a right call; answers what is wrong with the answer, and whether it was done. */
async function send(route: Route, call: Call, strange: Strange) {
  const version = typeof call.version === 'function' ? await call.version() : call.version;
  const headers: Record<string, string> = {
    'x-forwarded-for': freshAddress(),
    ...userOf(shop, route).headers,
    ...(version === undefined ? {} : { 'if-match': `"${version}"` }),
    ...(strange.body === undefined ? {} : { 'content-type': 'application/json' }),
    // Its own session is not ended by a call that ends sessions.
    ...call.headers,
    ...strange.headers,
  };
  const path = filled(route.path, { ...call.params, ...strange.params });
  const url = `${app.origin}${path}${strange.query ?? call.query ?? ''}`;
  const body = strange.body as BodyInit | undefined;
  const started = performance.now();
  const answer = await fetch(url, { method: route.method, headers, body: body ?? null });
  const ms = performance.now() - started;
  const { ok } = answer;
  return { ok, faults: await faultsOf(route, answer, ms) };
}

const sent = (strange: Strange) => JSON.stringify(strange).slice(0, 1_500);

const withBody = NAMED_ROUTES.filter(([, route]) => route.body);

test.each(withBody)('%s takes nothing wrong in any place of its body', async (name, route) => {
  const usual = await rightCall(shop, route);
  const found: string[] = [];
  for (const body of [usual.json, ...fullBodies(shop, name)]) {
    const places = placesIn(body);
    const bodies = places.flatMap((at, i) => {
      const values = some([undefined, ...NASTY_VALUES], Math.ceil(60 / places.length) + 4, i);
      return values.map((value) => withAt(body, at, value));
    });
    let call: Call | undefined;
    await together(bodies, async (one) => {
      // Made anew once it was changed, so that the next body meets a thing in its first state.
      const mine = call ?? (await rightCall(shop, route));
      call = undefined;
      const strange = { body: nastyJson(one) };
      const { ok, faults } = await send(route, mine, strange);
      if (!ok) call = mine;
      for (const fault of faults) found.push(`${fault}, after ${sent(strange)}`);
    });
  }
  expect(found.slice(0, 5)).toEqual([]);
});

test.each(withBody)('%s refuses what is no JSON, or no JSON by its label', async (_name, route) => {
  const call = await rightCall(shop, route);
  const found: string[] = [];
  const right = nastyJson(call.json);
  const types = [
    '',
    'text/plain',
    'application/xml',
    'multipart/form-data',
    'application/json; charset=utf-16',
  ];
  const strange: Strange[] = [
    ...BROKEN_TEXTS.map((body) => ({ body })),
    ...[1, 2, right.length - 1].map((n) => ({ body: right.slice(0, n) })),
    { body: right.padEnd((route.bodyLimit ?? 262_144) + 1) },
    ...types.map((type) => ({ body: '{', headers: { 'content-type': type } })),
  ];
  await together(strange, async (one) => {
    const { ok, faults } = await send(route, call, one);
    if (ok) found.push(`taken: ${sent(one)}`);
    for (const fault of faults) found.push(`${fault}, after ${sent(one)}`);
  });
  expect(found.slice(0, 5)).toEqual([]);
});

const STRANGE_KEYS = [
  '',
  ' ',
  '0',
  '-1',
  '1e3',
  '1.5',
  '9007199254740993',
  '99999999999999999999',
  'NaN',
  'Infinity',
  '0x10',
  '١',
  '2612-0001 ',
  '2612-00001',
  '9999-999999',
  '__proto__',
  "1' OR '1'='1",
  '%00',
  '\u0000',
  '..',
  'A'.repeat(22),
  '-'.repeat(22),
  'x'.repeat(5_000),
];
const STRANGE_HEADERS: Record<string, string>[] = [
  ...['', '*', '"', '"x"', '-1', '1e9', '"99999999999"', '"1", "2"', 'W/"1"', '9'.repeat(500)].map(
    (value) => ({ 'if-match': value }),
  ),
  ...['', ' ', 'a b', '\u00e9', 'x'.repeat(80), 'x'.repeat(81), "'; --", '%00'].map((value) => ({
    'idempotency-key': value,
  })),
  ...['', '*/*;q=zzz', 'text/csv', 'image/avif', ',,,,', 'x'.repeat(2_000)].map((value) => ({
    accept: value,
  })),
  ...['', 'Bearer', 'Bearer ', 'Basic eDp5', 'Bearer mw_', `Bearer ${'A'.repeat(5_000)}`].map(
    (value) => ({ authorization: value }),
  ),
  ...['', 'mw_session', 'mw_session=', 'mw_session=%', 'mw_session=%00; mw_session=x', '=;=;='].map(
    (value) => ({ cookie: value }),
  ),
  { 'x-forwarded-for': 'x'.repeat(3_000) },
  { 'x-forwarded-for': "1.1.1.1, '; --" },
  { 'x-forwarded-host': 'evil.example', 'x-forwarded-proto': 'gopher' },
  { 'if-none-match': '"x", W/"y", *, "' },
  { 'accept-language': 'x'.repeat(2_000), range: 'bytes=5-1' },
];

test.each(NAMED_ROUTES)('%s bears strange addresses and headers', async (_name, route) => {
  const call = await rightCall(shop, route);
  const names = [...route.path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name ?? '');
  const body = route.body ? nastyJson({}) : undefined;
  const strange: Strange[] = [
    ...names.flatMap((name) => STRANGE_KEYS.map((key) => ({ params: { [name]: key } }))),
    ...some(STRANGE_HEADERS, 11).map((headers) => ({ headers })),
  ].map((one) => ({ ...one, body }));
  const found: string[] = [];
  await together(strange, async (one) => {
    const { faults } = await send(route, call, one);
    for (const fault of faults) found.push(`${fault}, after ${sent(one)}`);
  });
  expect(found.slice(0, 5)).toEqual([]);
});

const withQuery = NAMED_ROUTES.filter(([, route]) => route.query);
const cursor = (parts: unknown) => Buffer.from(JSON.stringify(parts)).toString('base64url');

/** Cursors of the right shape for an order, with values that no row has. */
const cursorsOf = (sort: string) =>
  [
    null,
    '',
    'x',
    0,
    -1,
    1e300,
    { at: 0 },
    { at: 8.64e15 },
    { at: -8.64e15 },
    { at: 'x' },
    ['a'],
  ].map((value) => cursor([sort, value, 1]));
const oddTexts = fc.constantFrom(
  '',
  ' ',
  '0',
  '-1',
  '1e9',
  'NaN',
  '%',
  "'",
  '\u0000',
  'x'.repeat(3_000),
);

test.each(withQuery)('%s bears any query', async (_name, route) => {
  const call = await rightCall(shop, route);
  const shape = (route.query as { shape?: Record<string, unknown> }).shape ?? {};
  const right = route.query ? inputOf(route.query) : fc.constant({});
  const wrong = fc.dictionary(fc.constantFrom(...Object.keys(shape), '__proto__', 'x'), oddTexts);
  const question = fc.tuple(right, wrong).map(([a, b]) => {
    const all = { ...(a as Record<string, unknown>), ...b };
    return `?${new URLSearchParams(Object.entries(all).map(([k, v]) => [k, String(v)]))}`;
  });
  const hold = async (query: string) => {
    const { faults } = await send(route, call, { query });
    expect(faults, query).toEqual([]);
  };
  await fc.assert(fc.asyncProperty(question, hold), { seed: SEED, numRuns: 25 * TIMES });
  for (const query of ['?limit=1&limit=2', '?=', '?&&&', '?q=%25', '?q=%00', '?cursor=%00'])
    await hold(query);
  for (const format of ['csv', 'xml', 'CSV']) await hold(`?format=${format}`);
  const sorts = (shape['sort'] as { def?: { innerType?: { options?: string[] } } } | undefined)?.def
    ?.innerType?.options;
  for (const sort of sorts ?? [''])
    for (const text of some([...cursorsOf(sort), cursor(['-', 1, 1]), 'b85'], 4))
      await hold(`?sort=${encodeURIComponent(sort)}&cursor=${text}`);
});

test.each(withBody)('%s answers whatever its schema can describe', async (_name, route) => {
  if (!route.body) return;
  const right = inputOf(route.body);
  const change = fc.record({
    place: fc.nat(),
    value: fc.constantFrom(undefined, ...NASTY_VALUES),
  });
  const input = fc.tuple(right, fc.option(change, { freq: 2 })).map(([body, changed]) => {
    if (!changed) return nastyJson(body);
    const places = placesIn(body);
    return nastyJson(withAt(body, places[changed.place % places.length] ?? [], changed.value));
  });
  let call = await rightCall(shop, route);
  const hold = async (body: string) => {
    const { ok, faults } = await send(route, call, { body });
    if (ok) call = await rightCall(shop, route);
    expect(faults, body.slice(0, 500)).toEqual([]);
  };
  await fc.assert(fc.asyncProperty(input, hold), { seed: SEED, numRuns: 25 * TIMES });
});
