/** Strange posts to every form: no crash, no hang, and a form that comes back holds what was typed, escaped. */
import fc from 'fast-check';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { PAGES } from '@/server/auth/page-access';
import { startApp, type TestApp } from '../fixtures/app';
import { ask, freshAddress, together } from '../fixtures/ask';
import { askerNamed, filled } from '../fixtures/every-call';
import { FORMS, type Form } from '../fixtures/forms';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { NASTY_VALUES } from '../fixtures/nasty';
import { fieldsIn } from '../fixtures/page-text';
import { insertFault, insertLink, insertPerson } from '../fixtures/rows';
import { telltalesIn } from '../fixtures/telltales';

const SEED = Number(process.env['FUZZ_SEED'] ?? 2612);
const TIMES = Number(process.env['FUZZ_TIMES'] ?? 1);
const SLOWEST_MS = 5_000;

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

/** The address of a page with things made for it. */
async function addressOf(page: string): Promise<string> {
  const { db, boards, staff, make, tickets } = shop;
  if (page.includes('[number]')) {
    const ticket = page.startsWith('/status') ? tickets.anna : await make.ticket('anna');
    return filled(page, { number: ticket.number });
  }
  const of = { boardId: boards.anna.id, author: staff.colleague.id, state: 'published' } as const;
  if (page.startsWith('/faults/[id]')) return filled(page, { id: (await insertFault(db, of)).id });
  if (!page.includes('[')) return page;
  const person = await insertPerson(db, { role: 'counter' });
  const kind = page.startsWith('/reset') ? 'reset' : page.startsWith('/link') ? 'link' : 'invite';
  const token = await insertLink(
    db,
    kind,
    kind === 'link' ? shop.customers.anna.account : person.id,
  );
  return filled(page, { id: person.id, token });
}

const headersOf = (who: Form['who']) => askerNamed(shop, who).headers;

test('every page that takes a form is among those tried here', () => {
  const posting = Object.entries(PAGES).flatMap(([page, { post }]) => (post ? [page] : []));
  const pressed = [
    '/link/[token]',
    '/reset/[token]',
    '/invite/[token]',
    '/sign-out',
    '/tickets/[number]/receipt',
  ];
  const tried = new Set([...FORMS.map(({ page }) => page), ...pressed]);
  expect([...tried].toSorted()).toEqual(posting.toSorted());
});

const QUOTED = `"><b>&amp;'ΩΩ é ☃`;
const named = FORMS.map(
  (form) => [form.page, form.fields['do'] ?? form.fields['step'] ?? '', form] as const,
);

test.each(named)('%s %s keeps what was typed when it is refused', async (page, _what, form) => {
  // Free text comes back with all its signs; what must keep a shape comes back as it is.
  const fields: Record<string, string | string[]> = { ...form.fields, ...form.wrong };
  for (const name of [
    'name',
    'phone',
    'address',
    'symptomText',
    'accessoryText',
    'condition',
    'note',
    'work',
  ])
    if (form.kept.includes(name) && !(name in form.wrong)) fields[name] = `typed ${QUOTED}`;
  const path = await addressOf(page);
  const question = { method: 'POST', path, form: fields, headers: headersOf(form.who) };
  const answer = await ask(app, question);
  const html = await answer.text();
  expect(answer.status).toBeGreaterThanOrEqual(400);
  expect(answer.status).toBeLessThan(500);
  expect(html).not.toContain('<b>&amp;');
  const held = fieldsIn(html);
  for (const name of form.kept) {
    const typed = [fields[name] ?? ''].flat();
    const there = held.get(name) ?? held.get(`${name}[]`) ?? [];
    for (const value of typed)
      expect(
        there.map((v) => v.replaceAll('\r\n', '\n')),
        name,
      ).toContain(value);
  }
});

/** Values as a form can carry them. */
const texts = NASTY_VALUES.map((value) =>
  typeof value === 'string' ? value : JSON.stringify(value),
);

async function expectCivil(path: string, init: RequestInit & { headers: Record<string, string> }) {
  const started = performance.now();
  const headers = { 'x-forwarded-for': freshAddress(), ...init.headers };
  const answer = await fetch(`${app.origin}${path}`, {
    ...init,
    method: 'POST',
    headers,
    redirect: 'manual',
  });
  const text = await answer.text();
  const what = `${path} ${String(init.body).slice(0, 400)}`;
  expect(answer.status, what).toBeLessThan(500);
  expect(performance.now() - started, what).toBeLessThan(SLOWEST_MS);
  expect(telltalesIn(text), what).toEqual([]);
}

test.each(named)('%s %s bears any field', async (page, _what, form) => {
  const headers = headersOf(form.who);
  const path = await addressOf(page);
  const each = Object.keys(form.fields).flatMap((name, i) =>
    Array.from({ length: Math.min(texts.length, 6 * TIMES) }, (_, k) => {
      const fields = { ...form.fields, [name]: texts[(i * 5 + k * 7) % texts.length] ?? '' };
      return new URLSearchParams(Object.entries(fields).map(([k2, v]) => [k2, String(v)]));
    }),
  );
  await together(each, (body) => expectCivil(path, { body, headers }));
  const names = fc.constantFrom(
    ...Object.keys(form.fields),
    'x',
    '__proto__',
    'do',
    'symptoms[]',
    '',
  );
  const pairs = fc.array(fc.tuple(names, fc.constantFrom(...texts)), { maxLength: 6 });
  const hold = (all: [string, string][]) =>
    expectCivil(path, { body: new URLSearchParams(all), headers });
  await fc.assert(fc.asyncProperty(pairs, hold), { seed: SEED, numRuns: 8 * TIMES });
});

const posting = Object.entries(PAGES).flatMap(([page, { post }]) => (post ? [page] : []));
test.each(posting)('%s bears a body that is no form, or half of one', async (page) => {
  const who = page.startsWith('/status') ? 'customer' : page === '/check' ? 'signed out' : 'owner';
  // Signing out, pressed for nothing, ends no session that the other tries need.
  const headers = page === '/sign-out' ? {} : headersOf(who);
  const path = await addressOf(page);
  const urlencoded = 'application/x-www-form-urlencoded';
  const multipart = 'multipart/form-data; boundary=xx';
  const part = '--xx\r\ncontent-disposition: form-data; name="do"\r\n\r\nnote\r\n';
  const file =
    '--xx\r\ncontent-disposition: form-data; name="name"; filename="a"\r\n\r\n1\r\n--xx--\r\n';
  const bodies: [type: string, body: string | Uint8Array][] = [
    [urlencoded, ''],
    [urlencoded, '%'],
    [urlencoded, '%ff%fe=%00&=&&&==&do'],
    [urlencoded, new Uint8Array([0xff, 0xfe, 0, 1, 2])],
    [urlencoded, `do=note&note=${'x'.repeat(300_000)}`],
    [urlencoded, Array.from({ length: 5_000 }, (_, i) => `f${i}=1`).join('&')],
    [multipart, ''],
    [multipart, part],
    [multipart, file],
    [multipart, `${part}--xx--`],
    ['multipart/form-data', part],
    ['application/json', '{"do":"note"}'],
    ['text/plain', 'do=note'],
    ['', 'do=note'],
  ];
  await together(bodies, ([type, body]) =>
    expectCivil(path, { body: body as BodyInit, headers: { ...headers, 'content-type': type } }),
  );
});
