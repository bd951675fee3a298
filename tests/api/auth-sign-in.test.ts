/** Signing in and out by password: what the answers say, what they do not, and what stays in the tables. */
import { createHash } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { audit, sessions, users } from '@/db/schema/people';
import { cookieOf, openStaffShop, PASSWORD, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
beforeAll(async () => {
  shop = await openStaffShop();
});
afterAll(() => shop?.close());

const asks = (cookie: string, path = '/api/tokens') =>
  shop.ask({ method: 'GET', path, headers: { cookie } });

test('the right password opens a session that the next request is known by', async () => {
  const { email } = await shop.hire('counter');
  const answer = await shop.signIn(email);
  expect(answer.status).toBe(204);
  expect((await asks(cookieOf(answer))).status).toBe(200);
});

test('the address is taken in any case and with spaces round it', async () => {
  const { email } = await shop.hire('counter');
  expect((await shop.signIn(` ${email.toUpperCase()} `)).status).toBe(204);
});

test('the cookie is out of reach of scripts and of other sites, and lasts two weeks', async () => {
  const { email } = await shop.hire('counter');
  const cookie = (await shop.signIn(email)).headers.getSetCookie()[0] ?? '';
  expect(cookie).toMatch(/^mw_session=[\w-]{43};/);
  const attributes = cookie.split('; ').slice(1).toSorted();
  expect(attributes).toEqual(['HttpOnly', 'Max-Age=1209600', 'Path=/', 'SameSite=Lax']);
});

test('the table holds the hash of the cookie’s value and never the value', async () => {
  const { email, id } = await shop.hire('counter');
  const [, value = ''] = cookieOf(await shop.signIn(email)).split('=');
  const rows = await shop.db.select().from(sessions).where(eq(sessions.userId, id));
  expect(rows.map((row) => row.id)).toEqual([createHash('sha256').update(value).digest('hex')]);
  expect((await asks(`mw_session=${rows[0]?.id}`)).status).toBe(401);
});

test('a sign-in leaves a line in the audit log', async () => {
  const { email, id } = await shop.hire('senior');
  const answer = await shop.signIn(email);
  const [line] = await shop.db.select().from(audit).where(eq(audit.actorId, id));
  expect(line).toMatchObject({ action: 'session.opened', object: `person:${id}` });
  expect(line?.requestId).toBe(answer.headers.get('x-request-id'));
});

test('wrong password, unknown, disabled, invited and a customer’s address are told apart by nothing', async () => {
  const known = await shop.hire('counter');
  const disabled = await shop.hire('counter', { disabledAt: new Date() });
  const invited = await shop.hire('counter', { passwordHash: null });
  const customer = await shop.hire('customer');
  const answers = await Promise.all([
    shop.signIn(known.email, { password: 'not the password' }),
    shop.signIn('nobody@staff.example'),
    shop.signIn(disabled.email),
    shop.signIn(invited.email),
    shop.signIn(customer.email),
  ]);
  const seen = await Promise.all(
    answers.map(async (answer) => {
      const names = [...answer.headers.keys()].filter((name) => name !== 'date').toSorted();
      return `${answer.status} ${names.join()} ${await answer.text()}`;
    }),
  );
  expect(new Set(seen).size).toBe(1);
  expect(seen[0]).toMatch(/^401 .*E-mail or password is wrong\./);
});

test('right passwords use up no tries', async () => {
  const { email } = await shop.hire('counter');
  for (let i = 0; i < 7; i++) await shop.signIn(email, { password: 'wrong' });
  expect((await shop.signIn(email)).status).toBe(204);
  for (let i = 0; i < 7; i++) await shop.signIn(email, { password: 'wrong' });
  expect((await shop.signIn(email)).status).toBe(204);
});

test('signing out ends the session for every copy of its cookie, and clears it', async () => {
  const { email } = await shop.hire('counter');
  const cookie = cookieOf(await shop.signIn(email));
  const out = await shop.ask({ method: 'DELETE', path: '/api/session', headers: { cookie } });
  expect(out.status).toBe(204);
  expect(out.headers.get('set-cookie')).toMatch(/^mw_session=;.*Max-Age=0/);
  expect(out.headers.get('clear-site-data')).toBe('"cache"');
  expect((await asks(cookie)).status).toBe(401);
});

test('signing in again ends the session that the browser had before', async () => {
  const { email } = await shop.hire('counter');
  const cookie = cookieOf(await shop.signIn(email));
  const json = { email, password: PASSWORD };
  const again = { method: 'POST', path: '/api/session', json, headers: { cookie } };
  expect((await shop.ask(again)).status).toBe(204);
  expect((await asks(cookie)).status).toBe(401);
});

test('a disabled person is signed out at once', async () => {
  const { email, id } = await shop.hire('counter');
  const cookie = cookieOf(await shop.signIn(email));
  await shop.db.update(users).set({ disabledAt: new Date() }).where(eq(users.id, id));
  expect((await asks(cookie)).status).toBe(401);
});

test('a session whose time is over is no session', async () => {
  const { email, id } = await shop.hire('counter');
  const cookie = cookieOf(await shop.signIn(email));
  const past = new Date(Date.now() - 1000);
  await shop.db.update(sessions).set({ expiresAt: past }).where(eq(sessions.userId, id));
  expect((await asks(cookie)).status).toBe(401);
});

test.each([
  [{ 'sec-fetch-site': 'cross-site' }, 403],
  [{ 'sec-fetch-site': 'same-site' }, 403],
  [{ origin: 'https://elsewhere.example' }, 403],
  [{ origin: 'null' }, 403],
  [{ 'sec-fetch-site': 'same-origin' }, 204],
  [{ 'sec-fetch-site': 'none' }, 204],
] as const)('a sign-in sent with %j is answered %i', async (headers, status) => {
  const { email } = await shop.hire('counter');
  const json = { email, password: PASSWORD };
  const answer = await shop.ask({ method: 'POST', path: '/api/session', json, headers });
  expect(answer.status).toBe(status);
  expect(answer.headers.has('set-cookie')).toBe(status === 204);
});

test.each([
  [{ email: 'no address', password: 'x' }, 'email'],
  [{ email: 'a@b.example' }, 'password'],
  [{ email: 'a@b.example', password: 'x'.repeat(201) }, 'password'],
  [{ email: 'a@b.example', password: 'x', totp: '12' }, 'totp'],
])('the body %j is refused by its field', async (json, path) => {
  const answer = await shop.ask({ method: 'POST', path: '/api/session', json });
  expect(answer.status).toBe(422);
  const { errors } = (await answer.json()) as { errors: { path: string }[] };
  expect(errors.map((error) => error.path)).toEqual([path]);
});
