/** The owner's changes to the staff: roles, disabling, versions, and the last owner. */
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, expect, test } from 'vitest';
import { audit, sessions, users } from '@/db/schema/people';
import { cookieOf, openStaffShop, PASSWORD, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let owner: { id: number; email: string; name: string; cookie: string };
beforeAll(async () => {
  shop = await openStaffShop();
});
beforeEach(async () => {
  // Every test has one owner of its own and no other.
  await shop.db.update(users).set({ role: 'counter' }).where(eq(users.role, 'owner'));
  const person = await shop.hire('owner');
  owner = { ...person, cookie: cookieOf(await shop.signIn(person.email)) };
});
afterAll(() => shop?.close());

const patch = (id: number, json: object, version: number | undefined, cookie = owner.cookie) =>
  shop.ask({ method: 'PATCH', path: `/api/people/${id}`, json, version, headers: { cookie } });
const post = (id: number, form: Record<string, string>, cookie = owner.cookie) =>
  shop.ask({ method: 'POST', path: `/people/${id}`, form, headers: { cookie } });
const ownersLeft = async () =>
  (await shop.db.select().from(users).where(eq(users.role, 'owner'))).filter(
    (row) => !row.disabledAt,
  ).length;

test('a new role counts from the next request on and leaves a line', async () => {
  const person = await shop.hire('technician');
  const cookie = cookieOf(await shop.signIn(person.email));
  const seesPeople = async () =>
    (await shop.ask({ method: 'GET', path: '/people', headers: { cookie } })).status;
  expect(await seesPeople()).toBe(404);
  const answer = await patch(person.id, { role: 'owner' }, 1);
  expect([answer.status, answer.headers.get('etag')]).toEqual([200, '"2"']);
  expect(await seesPeople()).toBe(200);
  const lines = await shop.db
    .select()
    .from(audit)
    .where(eq(audit.object, `person:${person.id}`));
  expect(lines.at(-1)).toMatchObject({
    action: 'person.role-changed',
    actorId: owner.id,
    actorName: owner.name,
    detail: { from: 'technician', to: 'owner' },
    requestId: answer.headers.get('x-request-id'),
  });
});

test('a stale edit is refused with both versions, and nothing is overwritten', async () => {
  const { id } = await shop.hire('counter', { name: 'Before' });
  expect((await patch(id, { name: 'Meanwhile' }, 1)).status).toBe(200);
  const stale = await patch(id, { name: 'Too late' }, 1);
  expect(stale.status).toBe(412);
  expect(await stale.json()).toMatchObject({
    yours: 1,
    current: { version: 2, name: 'Meanwhile' },
  });
  expect((await shop.row(id))?.name).toBe('Meanwhile');
});

test('of ten edits made from the same version one is done', async () => {
  const { id } = await shop.hire('counter');
  const edits = Array.from({ length: 10 }, (_, i) => patch(id, { name: `Name ${i}` }, 1));
  const statuses = (await Promise.all(edits)).map(({ status }) => status).toSorted();
  expect(statuses).toEqual([200, ...Array<number>(9).fill(412)]);
  expect((await shop.row(id))?.version).toBe(2);
});

test('without If-Match an edit is not taken', async () => {
  const { id } = await shop.hire('counter');
  expect((await patch(id, { name: 'x' }, undefined)).status).toBe(428);
});

test('disabling ends sessions at once; enabling lets the person in again', async () => {
  const { id, email } = await shop.hire('technician');
  const cookie = cookieOf(await shop.signIn(email));
  expect((await patch(id, { disabled: true }, 1)).status).toBe(200);
  expect(await shop.db.select().from(sessions).where(eq(sessions.userId, id))).toEqual([]);
  const asks = { method: 'GET', path: '/api/tokens', headers: { cookie } };
  expect((await shop.ask(asks)).status).toBe(401);
  expect((await shop.signIn(email)).status).toBe(401);
  expect((await patch(id, { disabled: false }, 2)).status).toBe(200);
  expect((await shop.ask(asks)).status).toBe(401);
  expect((await shop.signIn(email)).status).toBe(204);
  const lines = await shop.db
    .select()
    .from(audit)
    .where(eq(audit.object, `person:${id}`));
  expect(lines.map(({ action }) => action)).toEqual([
    'session.opened',
    'person.disabled',
    'person.enabled',
    'session.opened',
  ]);
});

test.each([{ disabled: true }, { role: 'senior' }])(
  'the last owner stays: %j is refused and changes nothing',
  async (change) => {
    const answer = await patch(owner.id, change, 1);
    expect(answer.status).toBe(409);
    expect(await answer.json()).toMatchObject({ detail: expect.stringContaining('last owner') });
    expect(await shop.row(owner.id)).toMatchObject({ role: 'owner', disabledAt: null, version: 1 });
  },
);

test('an owner who is disabled, or has not taken up the invitation, does not count as one left', async () => {
  await shop.hire('owner', { disabledAt: new Date() });
  await shop.hire('owner', { passwordHash: null });
  expect((await patch(owner.id, { role: 'senior' }, 1)).status).toBe(409);
  await shop.hire('owner');
  expect((await patch(owner.id, { role: 'senior' }, 1)).status).toBe(200);
});

test('the last owner may be renamed, and be made owner once more', async () => {
  expect((await patch(owner.id, { name: 'Renamed', role: 'owner' }, 1)).status).toBe(200);
});

test.each([
  [{ role: 'senior' }, { role: 'senior' }],
  [{ disabled: true }, { disabled: true }],
  [{ role: 'counter' }, { disabled: true }],
])('of two owners who take each other out at once (%j, %j) one stays', async (first, second) => {
  for (let round = 0; round < 5; round++) {
    await shop.db.update(users).set({ role: 'counter' }).where(eq(users.role, 'owner'));
    const two = [await shop.hire('owner'), await shop.hire('owner')] as const;
    const [one, other] = await Promise.all(
      two.map(async ({ email }) => cookieOf(await shop.signIn(email))),
    );
    const answers = await Promise.all([
      patch(two[1].id, first, 1, one),
      patch(two[0].id, second, 1, other),
    ]);
    const statuses = answers.map(({ status }) => status);
    expect(statuses.filter((status) => status === 200).length).toBe(1);
    // The second is refused as the last owner, or because by then they are no owner any more.
    expect(statuses.some((status) => [401, 403, 409].includes(status))).toBe(true);
    expect(await ownersLeft()).toBe(1);
  }
});

test.each([
  [{}, ''],
  [{ role: 'customer' }, 'role'],
  [{ name: '' }, 'name'],
  [{ name: 'two\nlines' }, 'name'],
  [{ disabled: 'yes' }, 'disabled'],
  [{ secondFactor: true }, 'secondFactor'],
])('the change %j is refused by its field', async (change, path) => {
  const { id } = await shop.hire('counter');
  const answer = await patch(id, change, 1);
  expect(answer.status).toBe(422);
  expect(await answer.json()).toMatchObject({ errors: [{ path }] });
});

test('on the page, a form made from an older version says so and keeps what was typed', async () => {
  const { id } = await shop.hire('counter');
  const form = { do: 'save', version: '1', name: 'First', role: 'technician' };
  expect((await post(id, form)).status).toBe(303);
  const stale = await post(id, { ...form, name: 'Second typed' });
  const html = await stale.text();
  expect(stale.status).toBe(412);
  expect(html).toContain('was changed meanwhile');
  expect(html).toContain('value="Second typed"');
  expect((await shop.row(id))?.name).toBe('First');
});

test('on the page, the last owner cannot disable themselves', async () => {
  const answer = await post(owner.id, { do: 'disable', version: '1' });
  expect(answer.status).toBe(409);
  expect(await answer.text()).toContain('last owner');
});

test('on the page, an owner who disables themselves while another stays is signed out', async () => {
  await shop.hire('owner');
  expect((await post(owner.id, { do: 'disable', version: '1' })).status).toBe(303);
  const path = '/people';
  const next = await shop.ask({ method: 'GET', path, headers: { cookie: owner.cookie } });
  expect([next.status, next.headers.get('location')]).toEqual([303, '/sign-in?then=%2Fpeople']);
});

test('the invitation form keeps what was typed and names the field', async () => {
  const { email } = await shop.hire('counter');
  const answer = await shop.ask({
    method: 'POST',
    path: '/people/invite',
    form: { name: 'Ida Moor', email, role: 'senior' },
    headers: { cookie: owner.cookie },
  });
  const html = await answer.text();
  expect(answer.status).toBe(422);
  expect(html).toContain('A colleague has this address already');
  expect(html).toContain('value="Ida Moor"');
  expect(html).toMatch(/value="senior" checked/);
});

test('a change made by a form of another site is not done', async () => {
  const { id } = await shop.hire('counter');
  const answer = await shop.ask({
    method: 'POST',
    path: `/people/${id}`,
    form: { do: 'disable', version: '1' },
    headers: { cookie: owner.cookie, 'sec-fetch-site': 'cross-site' },
  });
  expect(answer.status).toBe(403);
  expect(
    (await shop.signIn((await shop.row(id))?.email ?? '', { password: PASSWORD })).status,
  ).toBe(204);
});
