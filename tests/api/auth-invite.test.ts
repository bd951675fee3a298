/** Inviting a colleague, by the letter that the mail catcher caught. */
import { randomBytes } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { idempotency } from '@/db/schema/outbox';
import { audit, oneTimeTokens, users } from '@/db/schema/people';
import { cookieOf, openStaffShop, type StaffShop } from '../fixtures/staff';

const CHOSEN = 'a password chosen by the invited';
let shop: StaffShop;
let owner: { cookie: string; name: string };
beforeAll(async () => {
  shop = await openStaffShop();
  const { email, name } = await shop.hire('owner');
  owner = { name, cookie: cookieOf(await shop.signIn(email)) };
});
afterAll(() => shop?.close());

const asOwner = (method: string, path: string, json?: unknown) =>
  shop.ask({ method, path, json, headers: { cookie: owner.cookie } });
const address = () => `${randomBytes(6).toString('hex')}@staff.example`;
async function invite(role = 'senior') {
  const email = address();
  const answer = await asOwner('POST', '/api/people', { name: 'Ida Moor', email, role });
  expect(answer.status).toBe(201);
  return (await answer.json()) as { id: number; email: string; state: string; version: number };
}
async function linkTo(email: string, after = 0): Promise<string> {
  const { text } = await shop.letter(email, after);
  return new URL(/https?:\/\/\S+\/invite\/[\w-]+/.exec(text)?.[0] ?? '').pathname;
}
const take = (path: string, more: Record<string, string> = {}) =>
  shop.ask({
    method: 'POST',
    path,
    form: { name: 'Ida Moor', password: CHOSEN, again: CHOSEN, ...more },
  });

test('the invited person chooses name and password, is signed in, and stands in the list', async () => {
  const { id, email, state } = await invite();
  expect(state).toBe('invited');
  const path = await linkTo(email);
  const page = await shop.ask({ method: 'GET', path });
  expect(page.status).toBe(200);
  expect(await page.text()).toContain(email);
  const joined = await take(path, { name: 'Ida van der Moor' });
  expect([joined.status, joined.headers.get('location')]).toEqual([303, '/account?done=joined']);
  const cookie = cookieOf(joined);
  const queue = await shop.ask({ method: 'GET', path: '/queue', headers: { cookie } });
  expect(queue.status).toBe(200);
  expect(await queue.text()).toContain('Ida van der Moor');
  expect((await shop.signIn(email, { password: CHOSEN })).status).toBe(204);
  const list = await asOwner('GET', `/api/people?q=${email}`);
  expect(await list.json()).toMatchObject({
    items: [{ id, name: 'Ida van der Moor', role: 'senior', state: 'active' }],
  });
  const lines = await shop.db
    .select()
    .from(audit)
    .where(eq(audit.object, `person:${id}`));
  expect(lines.map(({ action, actorName }) => [action, actorName])).toEqual([
    ['person.invited', owner.name],
    ['person.joined', 'Ida van der Moor'],
    ['session.opened', 'Ida van der Moor'],
    ['session.opened', 'Ida van der Moor'],
  ]);
});

test('the link works once, whoever is first', async () => {
  const path = await linkTo((await invite()).email);
  const answers = await Promise.all([take(path), take(path), take(path)]);
  expect(answers.map(({ status }) => status).toSorted()).toEqual([303, 410, 410]);
  expect((await shop.ask({ method: 'GET', path })).status).toBe(410);
});

test('the link lasts seven days', async () => {
  const { id, email } = await invite();
  const path = await linkTo(email);
  const mine = eq(oneTimeTokens.userId, id);
  const [row] = await shop.db.select().from(oneTimeTokens).where(mine);
  expect(row && row.expiresAt.getTime() - row.createdAt.getTime()).toBe(7 * 86_400_000);
  await shop.db
    .update(oneTimeTokens)
    .set({ expiresAt: new Date(Date.now() - 1) })
    .where(mine);
  expect((await take(path)).status).toBe(410);
});

test('sent again, the earlier link stops working', async () => {
  const { id, email } = await invite();
  const first = await linkTo(email);
  expect((await asOwner('POST', `/api/people/${id}/invitation`)).status).toBe(202);
  const second = await linkTo(email, 1);
  expect((await take(first)).status).toBe(410);
  expect((await take(second)).status).toBe(303);
  expect((await asOwner('POST', `/api/people/${id}/invitation`)).status).toBe(409);
});

test('an invitation to somebody disabled before they came is over', async () => {
  const { id, email, version } = await invite();
  const path = await linkTo(email);
  const headers = { cookie: owner.cookie };
  const json = { disabled: true };
  await shop.ask({ method: 'PATCH', path: `/api/people/${id}`, json, version, headers });
  expect((await take(path)).status).toBe(410);
});

test('of two who invite the same address at once one does, whatever the roles', async () => {
  const email = address();
  const roles = ['counter', 'technician', 'senior', 'owner'];
  const answers = await Promise.all(
    roles.map((role) => asOwner('POST', '/api/people', { name: 'Two', email, role })),
  );
  expect(answers.map(({ status }) => status).toSorted()).toEqual([201, 422, 422, 422]);
  const rows = await shop.db.select().from(users).where(eq(users.email, email));
  expect(rows.length).toBe(1);
});

test('a customer’s address may be invited too', async () => {
  const { email } = await shop.hire('customer');
  const json = { name: 'Both', email, role: 'counter' };
  expect((await asOwner('POST', '/api/people', json)).status).toBe(201);
});

test('a refused form keeps the name that was typed and the link good', async () => {
  const path = await linkTo((await invite()).email);
  const refused = await take(path, { name: 'Typed "Name"', again: 'something else' });
  expect(refused.status).toBe(422);
  const html = await refused.text();
  expect(html).toContain('value="Typed &#34;Name&#34;"');
  expect(html).toContain('id="again-error"');
  expect((await take(path)).status).toBe(303);
});

test('the same Idempotency-Key invites once, and its answer stands nowhere in clear', async () => {
  const json = { name: 'Once', email: address(), role: 'counter' };
  const headers = { cookie: owner.cookie, 'idempotency-key': randomBytes(8).toString('hex') };
  const send = () => shop.ask({ method: 'POST', path: '/api/people', json, headers });
  const [first, again] = [await send(), await send()];
  expect([first.status, again.status]).toEqual([201, 201]);
  expect(await again.json()).toEqual(await first.json());
  const rows = await shop.db.select().from(idempotency);
  expect(rows.some(({ answer }) => answer?.includes(json.email))).toBe(false);
});
