/** The second factor: setting it up, signing in by it, and that no code works twice. */
import { eq } from 'drizzle-orm';
import { Secret, TOTP } from 'otpauth';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { audit, sessions, users } from '@/db/schema/people';
import { insertLink } from '../fixtures/rows';
import { cookieOf, openStaffShop, PASSWORD, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
beforeAll(async () => {
  shop = await openStaffShop();
});
afterAll(() => shop?.close());

const PAGE = '/account/second-factor';
/** The code of a secret, so many steps of 30 s from now. */
const codeOf = (base32: string, steps = 0) =>
  new TOTP({ secret: Secret.fromBase32(base32) }).generate({
    timestamp: Date.now() + steps * 30_000,
  });
const post = (cookie: string, form: Record<string, string>) =>
  shop.ask({ method: 'POST', path: PAGE, form, headers: { cookie } });

/** What the page offers: the secret as typed, and the sealed note that goes back with the form. */
async function offered(cookie: string) {
  const html = await (await shop.ask({ method: 'GET', path: PAGE, headers: { cookie } })).text();
  const typed = /id="secret">\s*([A-Z2-7 ]+?)\s*</.exec(html)?.[1] ?? '';
  const sealed = /name="sealed" value="([^"]+)"/.exec(html)?.[1] ?? '';
  return { base32: typed.replaceAll(' ', ''), sealed, html };
}

/** Somebody whose second factor is on; the code of the step before now was used for that. */
async function withFactor() {
  const person = await shop.hire('senior');
  const cookie = cookieOf(await shop.signIn(person.email));
  const { base32, sealed } = await offered(cookie);
  const form = { do: 'on', current: PASSWORD, code: codeOf(base32, -1), sealed };
  expect((await post(cookie, form)).status).toBe(303);
  return { ...person, cookie, base32 };
}

test('the page shows a QR code and the secret to type, and keeps nothing until a code proves it', async () => {
  const { email, id } = await shop.hire('owner');
  const cookie = cookieOf(await shop.signIn(email));
  const { base32, html } = await offered(cookie);
  expect(base32).toMatch(/^[A-Z2-7]{32}$/);
  expect(html).toMatch(/<svg[^>]*role="img"[^>]*aria-label="The secret/);
  expect(html).toContain('Advised for you as owner');
  expect((await shop.row(id))?.totpSecret).toBeNull();
});

test('turned on, the secret is sealed in the table, other sessions end, and sign-in asks for a code', async () => {
  const person = await shop.hire('senior');
  const other = cookieOf(await shop.signIn(person.email));
  const cookie = cookieOf(await shop.signIn(person.email));
  const { base32, sealed } = await offered(cookie);
  const code = codeOf(base32);
  const typed = `${code.slice(0, 3)} ${code.slice(3)}`;
  const on = await post(cookie, { do: 'on', current: PASSWORD, code: typed, sealed });
  expect(on.status).toBe(303);
  expect((await shop.row(person.id))?.totpSecret).not.toContain(base32);
  const known = async (c: string) =>
    (await shop.ask({ method: 'GET', path: '/api/tokens', headers: { cookie: c } })).status;
  expect([await known(cookie), await known(other)]).toEqual([200, 401]);
  const plain = await shop.signIn(person.email);
  expect(plain.status).toBe(401);
  expect(plain.headers.has('set-cookie')).toBe(false);
  expect(await plain.json()).toMatchObject({ errors: [{ path: 'totp' }] });
  const lines = await shop.db.select().from(audit).where(eq(audit.actorId, person.id));
  expect(lines.map(({ action }) => action)).toContain('second-factor.turned-on');
});

test('a code opens one session; again, and older ones, it opens none; the next one does', async () => {
  const { email, base32 } = await withFactor();
  const code = codeOf(base32);
  expect((await shop.signIn(email, { totp: code })).status).toBe(204);
  expect((await shop.signIn(email, { totp: code })).status).toBe(401);
  expect((await shop.signIn(email, { totp: codeOf(base32, -1) })).status).toBe(401);
  expect((await shop.signIn(email, { totp: codeOf(base32, 1) })).status).toBe(204);
});

test('the code that turned it on signs nobody in', async () => {
  const { email, base32, id } = await withFactor();
  const last = (await shop.row(id))?.totpLastStep ?? 0;
  const used = new TOTP({ secret: Secret.fromBase32(base32) }).generate({
    timestamp: last * 30_000,
  });
  expect((await shop.signIn(email, { totp: used })).status).toBe(401);
});

test('of many who send one code at the same time one gets in', async () => {
  const { email, base32 } = await withFactor();
  const totp = codeOf(base32);
  const answers = await Promise.all([1, 2, 3, 4, 5].map(() => shop.signIn(email, { totp })));
  expect(answers.filter(({ status }) => status === 204).length).toBe(1);
});

test('a right code does not make up for a wrong password, and is not used up by it', async () => {
  const { email, base32 } = await withFactor();
  const totp = codeOf(base32);
  const wrong = await shop.signIn(email, { totp, password: 'wrong' });
  expect([wrong.status, await wrong.text()]).toEqual([401, expect.not.stringContaining('totp')]);
  expect((await shop.signIn(email, { totp })).status).toBe(204);
});

test('after six wrong codes the account waits, from wherever they come', async () => {
  const { email, base32 } = await withFactor();
  const right = codeOf(base32);
  const wrong = String((Number(right) + 500_000) % 1_000_000).padStart(6, '0');
  for (let i = 0; i < 6; i++) expect((await shop.signIn(email, { totp: wrong })).status).toBe(401);
  expect((await shop.signIn(email, { totp: right })).status).toBe(429);
});

test('the page asks for the code in a second step, without the password again', async () => {
  const { email, base32 } = await withFactor();
  const path = '/sign-in?then=/boards';
  const first = await shop.ask({
    method: 'POST',
    path,
    form: { step: 'password', email, password: PASSWORD },
  });
  const html = await first.text();
  expect(first.status).toBe(200);
  expect(first.headers.has('set-cookie')).toBe(false);
  expect(html).toContain('autocomplete="one-time-code"');
  expect(html).not.toContain(PASSWORD);
  const note = /name="note" value="([^"]+)"/.exec(html)?.[1] ?? '';
  const send = (totp: string, sealed = note) =>
    shop.ask({ method: 'POST', path, form: { step: 'code', note: sealed, totp } });
  const short = await send('12');
  expect([short.status, (await short.text()).includes('id="totp-error"')]).toEqual([422, true]);
  const forged = await send(codeOf(base32), `${note.slice(0, -2)}AA`);
  expect(forged.status).toBe(401);
  const second = await send(codeOf(base32));
  expect([second.status, second.headers.get('location')]).toEqual([303, '/boards']);
  expect((await send(codeOf(base32))).status).toBe(401);
});

test('the note of the first step is void once the password changes', async () => {
  const { email, base32, id } = await withFactor();
  const form = { step: 'password', email, password: PASSWORD };
  const html = await (await shop.ask({ method: 'POST', path: '/sign-in', form })).text();
  const note = /name="note" value="([^"]+)"/.exec(html)?.[1] ?? '';
  const other = (await shop.hire('counter', { passwordHash: 'another hash' })).id;
  const hash = (await shop.row(other))?.passwordHash ?? '';
  await shop.db.update(users).set({ passwordHash: hash }).where(eq(users.id, id));
  const code = { step: 'code', note, totp: codeOf(base32) };
  expect((await shop.ask({ method: 'POST', path: '/sign-in', form: code })).status).toBe(401);
});

test.each([
  ['a wrong password', { current: 'not mine' }, 422, 'current-error'],
  ['a wrong code', { code: '000000' }, 422, 'code-error'],
  ['a note that was not sealed here', { sealed: 'AAAA' }, 409, 'a new one to scan'],
])('%s does not turn it on', async (_, wrong, status, shown) => {
  const { email, id } = await shop.hire('technician');
  const cookie = cookieOf(await shop.signIn(email));
  const { base32, sealed } = await offered(cookie);
  const form = { do: 'on', current: PASSWORD, code: codeOf(base32), sealed, ...wrong };
  const answer = await post(cookie, form);
  expect([answer.status, (await answer.text()).includes(shown)]).toEqual([status, true]);
  expect((await shop.row(id))?.totpSecret).toBeNull();
});

test('a secret offered to one person cannot be turned on by another', async () => {
  const [one, two] = [await shop.hire('senior'), await shop.hire('senior')];
  const theirs = await offered(cookieOf(await shop.signIn(one.email)));
  const cookie = cookieOf(await shop.signIn(two.email));
  const { base32, sealed } = theirs;
  const answer = await post(cookie, { do: 'on', current: PASSWORD, code: codeOf(base32), sealed });
  expect(answer.status).toBe(409);
  expect((await shop.row(two.id))?.totpSecret).toBeNull();
});

test('after a refusal the page offers the same secret again', async () => {
  const { email } = await shop.hire('technician');
  const cookie = cookieOf(await shop.signIn(email));
  const { sealed, base32 } = await offered(cookie);
  const answer = await post(cookie, { do: 'on', current: PASSWORD, code: '000000', sealed });
  expect((await answer.text()).replace(/\s/g, '')).toContain(base32);
});

test('turned off by password, signing in takes the password alone', async () => {
  const { email, cookie } = await withFactor();
  expect((await post(cookie, { do: 'off', current: 'not mine' })).status).toBe(422);
  expect((await shop.signIn(email)).status).toBe(401);
  expect((await post(cookie, { do: 'off', current: PASSWORD })).status).toBe(303);
  expect((await shop.signIn(email)).status).toBe(204);
});

test('a reset password leaves the second factor on', async () => {
  const { email, id, base32 } = await withFactor();
  const secret = await insertLink(shop.db, 'reset', id);
  const form = { password: 'another password here', again: 'another password here' };
  expect((await shop.ask({ method: 'POST', path: `/reset/${secret}`, form })).status).toBe(303);
  const password = 'another password here';
  expect((await shop.signIn(email, { password })).status).toBe(401);
  expect((await shop.signIn(email, { password, totp: codeOf(base32) })).status).toBe(204);
});

test('the owner takes a lost one off, which ends the sessions', async () => {
  const { email, id } = await withFactor();
  const owner = await shop.hire('owner');
  const cookie = cookieOf(await shop.signIn(owner.email));
  const version = (await shop.row(id))?.version;
  const json = { secondFactor: false };
  const headers = { cookie };
  const path = `/api/people/${id}`;
  const off = await shop.ask({ method: 'PATCH', path, json, version, headers });
  expect([off.status, ((await off.json()) as { secondFactor: boolean }).secondFactor]).toEqual([
    200,
    false,
  ]);
  expect(await shop.db.select().from(sessions).where(eq(sessions.userId, id))).toEqual([]);
  expect((await shop.signIn(email)).status).toBe(204);
});
