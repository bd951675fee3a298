/** What is answered where nothing is, where the method is wrong, and when something breaks inside. */
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { REFUSALS } from '@/server/refusal';
import { cookieOf, openStaffShop, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let cookie: string;
beforeAll(async () => {
  shop = await openStaffShop({ env: { WORKER: '0' } });
  const owner = await shop.hire('owner', { name: 'Zita Owner' });
  cookie = cookieOf(await shop.signIn(owner.email));
});
afterAll(() => shop?.close());

const send = (method: string, path: string, form?: Record<string, string>) =>
  shop.ask({ method, path, headers: { cookie }, ...(form ? { form } : {}) });

test.each(['/api/nothing', '/api/people/1/nothing', '/api/', '/api/docs/nothing', '/api/%2e%2e/x'])(
  '%s is not there, and says so as a problem or as a page',
  async (path) => {
    for (const method of ['GET', 'POST', 'DELETE']) {
      const answer = await send(method, path);
      const api = new URL(path, shop.app.origin).pathname.startsWith('/api/');
      expect([method, answer.status]).toEqual([method, 404]);
      expect(answer.headers.get('content-type')).toMatch(
        api ? /^application\/problem/ : /^text\/html/,
      );
    }
  },
);

test.each([
  ['PUT', '/api/people', 'GET, HEAD, POST'],
  ['DELETE', '/api/people/1', 'PATCH'],
  ['POST', '/api/audit', 'GET, HEAD'],
  ['OPTIONS', '/api/session', 'DELETE, POST'],
])('%s %s is told which methods are taken: %s', async (method, path, allow) => {
  const answer = await send(method, path);
  expect([answer.status, answer.headers.get('allow')]).toEqual([405, allow]);
  expect(await answer.json()).toMatchObject({ type: '/api/docs#wrong-method', status: 405 });
});

test('a list is read by HEAD too, without a body', async () => {
  const answer = await send('HEAD', '/api/people');
  expect([answer.status, await answer.text()]).toEqual([200, '']);
});

test.each(['GET', 'POST'])(
  '%s of a page that is not there shows ours, once secured',
  async (method) => {
    const answer = await send(method, '/no/such/page', method === 'POST' ? { a: 'b' } : undefined);
    const html = await answer.text();
    expect(answer.status).toBe(404);
    expect(html).toContain('Nothing at this address');
    expect(html).toContain('href="/queue"');
    const policy = answer.headers.get('content-security-policy') ?? '';
    expect(policy.match(/connect-src/g)).toHaveLength(1);
    expect(policy).toContain("frame-ancestors 'none'");
  },
);

test('a page that is not open to you looks like one that is not there, to a form as well', async () => {
  const { email } = await shop.hire('technician');
  const as = { cookie: cookieOf(await shop.signIn(email)) };
  const ask = (method: string, path: string) =>
    shop.ask({ method, path, headers: as, ...(method === 'POST' ? { form: { do: 'save' } } : {}) });
  const plain = async (answer: Response) => `${answer.status} ${await answer.text()}`;
  const gone = await plain(await ask('GET', '/no/such/page'));
  for (const [method, path] of [
    ['GET', '/people'],
    ['GET', '/audit'],
    ['POST', '/people/1'],
    ['POST', '/outbox'],
  ] as const)
    expect(await plain(await ask(method, path))).toBe(gone);
});

test('the page about the API has a place for every kind of problem, and is open to everybody', async () => {
  const html = await (await shop.ask({ method: 'GET', path: '/api/docs' })).text();
  for (const kind of [...Object.keys(REFUSALS), 'crash'])
    expect(html, kind).toContain(`id="${kind}"`);
  expect(html).toContain('/api/people/{id}');
});

test('what breaks inside stays inside: a page or a problem with the number under which it was logged', async () => {
  await shop.db.execute(sql`RENAME TABLE audit TO audit_away, outbox TO outbox_away`);
  try {
    const problem = await send('GET', '/api/audit');
    const { detail, type } = (await problem.json()) as { detail: string; type: string };
    expect([problem.status, type]).toEqual([500, '/api/docs#crash']);
    expect(detail).toContain(problem.headers.get('x-request-id'));
    expect(detail).not.toMatch(/audit|select|table/i);

    const page = await send('GET', '/audit');
    const form = await send('POST', '/forgot', { email: 'ida@staff.example' });
    for (const answer of [page, form]) {
      const html = await answer.text();
      const id = answer.headers.get('x-request-id') ?? '';
      expect(answer.status).toBe(500);
      expect(html).toContain('Something went wrong on our side');
      expect(html).toContain(id);
      expect(html).not.toMatch(/audit_away|doesn.t exist|select `|insert into/i);
      expect(shop.app.log()).toContain(id);
      const policy = answer.headers.get('content-security-policy') ?? '';
      expect(policy.match(/connect-src/g)).toHaveLength(1);
    }
  } finally {
    await shop.db.execute(sql`RENAME TABLE audit_away TO audit, outbox_away TO outbox`);
  }
  expect((await send('GET', '/audit')).status).toBe(200);
});

test('one request leaves one line in the log, whatever page was shown instead', async () => {
  const answer = await send('GET', '/no/such/page/at/all');
  const id = answer.headers.get('x-request-id') ?? 'none';
  await expect
    .poll(
      () =>
        shop.app
          .log()
          .split('\n')
          .filter((line) => line.includes(id)).length,
    )
    .toBe(1);
});
