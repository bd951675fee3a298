/** A forgotten password, by the letter that the mail catcher caught. */
import { createHash } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { outbox } from '@/db/schema/outbox';
import { audit, oneTimeTokens, users } from '@/db/schema/people';
import { insertLink, insertToken } from '../fixtures/rows';
import { cookieOf, openStaffShop, type StaffShop } from '../fixtures/staff';

const NEW = 'another password for tests';
let shop: StaffShop;
beforeAll(async () => {
  shop = await openStaffShop();
});
afterAll(() => shop?.close());

const forgot = (email: string, from?: string) =>
  shop.ask({
    method: 'POST',
    path: '/forgot',
    form: { email },
    headers: from ? { 'x-forwarded-for': from } : {},
  });
const open = (path: string) => shop.ask({ method: 'GET', path });
const set = (path: string, password = NEW, again = password) =>
  shop.ask({ method: 'POST', path, form: { password, again } });

async function linkTo(email: string, after = 0): Promise<string> {
  const { text } = await shop.letter(email, after);
  const link = /https?:\/\/\S+\/reset\/[\w-]+/.exec(text)?.[0];
  if (!link) throw new Error(`No link in: ${text}`);
  expect(new URL(link).origin).toBe(shop.app.origin);
  return new URL(link).pathname;
}
const isSignedIn = async (cookie: string) =>
  (await shop.ask({ method: 'GET', path: '/api/tokens', headers: { cookie } })).status === 200;

test('the letter’s link sets a new password once and ends every session', async () => {
  const person = await shop.hire('technician');
  const cookies = [
    cookieOf(await shop.signIn(person.email)),
    cookieOf(await shop.signIn(person.email)),
  ];
  expect((await forgot(person.email)).status).toBe(200);
  const path = await linkTo(person.email);
  const done = await set(path);
  expect([done.status, done.headers.get('location')]).toEqual([303, '/sign-in?news=password']);
  expect(await Promise.all(cookies.map(isSignedIn))).toEqual([false, false]);
  expect((await shop.signIn(person.email)).status).toBe(401);
  expect((await shop.signIn(person.email, { password: NEW })).status).toBe(204);
  expect((await open(path)).status).toBe(410);
  expect((await set(path, 'a third password of mine')).status).toBe(410);
  const lines = await shop.db.select().from(audit).where(eq(audit.actorId, person.id));
  expect(lines.map(({ action }) => action)).toContain('password.reset');
  expect((await shop.letter(person.email, 1)).subject).toMatch(/was changed/);
});

test('a new password by link revokes the API tokens, and says so', async () => {
  const { email, id } = await shop.hire('technician');
  const { token } = await insertToken(shop.db, id, ['read']);
  const byToken = async () => {
    const headers = { authorization: `Bearer ${token}` };
    return (await shop.ask({ method: 'GET', path: '/api/tickets', headers })).status;
  };
  expect(await byToken()).toBe(200);
  await forgot(email);
  expect((await set(await linkTo(email))).status).toBe(303);
  expect(await byToken()).toBe(401);
  expect((await shop.letter(email, 1)).text).toContain('Your API tokens were revoked.');
  const lines = await shop.db.select().from(audit).where(eq(audit.actorId, id));
  expect(lines.at(-1)).toMatchObject({ action: 'password.reset', detail: { tokensRevoked: 1 } });
});

test('opening the link uses nothing: mail programs do that', async () => {
  const { email } = await shop.hire('technician');
  await forgot(email);
  const path = await linkTo(email);
  for (let i = 0; i < 3; i++) expect((await open(path)).status).toBe(200);
  expect((await set(path)).status).toBe(303);
});

test('of two who use the link at once one sets the password', async () => {
  const { email } = await shop.hire('technician');
  await forgot(email);
  const path = await linkTo(email);
  const answers = await Promise.all(
    [1, 2, 3, 4].map((n) => set(path, `password number ${n} of four`)),
  );
  expect(answers.map(({ status }) => status).toSorted()).toEqual([303, 410, 410, 410]);
});

test('a newer link puts the older out of use', async () => {
  const { email } = await shop.hire('technician');
  await forgot(email);
  const first = await linkTo(email);
  await forgot(email);
  const second = await linkTo(email, 1);
  expect(second).not.toBe(first);
  expect((await set(first)).status).toBe(410);
  expect((await set(second)).status).toBe(303);
});

test('after an hour the link is over', async () => {
  const { email, id } = await shop.hire('technician');
  await forgot(email);
  const path = await linkTo(email);
  const [row] = await shop.db.select().from(oneTimeTokens).where(eq(oneTimeTokens.userId, id));
  expect(row && row.expiresAt.getTime() - row.createdAt.getTime()).toBe(3_600_000);
  const past = new Date(Date.now() - 1);
  await shop.db.update(oneTimeTokens).set({ expiresAt: past }).where(eq(oneTimeTokens.userId, id));
  expect((await open(path)).status).toBe(410);
  expect((await set(path)).status).toBe(410);
});

test('the table holds the hash of the secret, and the outbox forgets the letter once it is sent', async () => {
  const { email, id } = await shop.hire('technician');
  await forgot(email);
  const secret = (await linkTo(email)).split('/').at(-1) ?? '';
  const [row] = await shop.db.select().from(oneTimeTokens).where(eq(oneTimeTokens.userId, id));
  expect(row?.tokenHash).toBe(createHash('sha256').update(secret).digest('hex'));
  const jobs = await shop.db.select().from(outbox).where(eq(outbox.kind, 'reset'));
  expect(jobs.length).toBeGreaterThan(0);
  for (const job of jobs) expect(job.payload).not.toContain(email);
  await expect
    .poll(async () => (await shop.db.select().from(outbox)).filter((job) => job.payload !== ''), {
      timeout: 10_000,
    })
    .toEqual([]);
});

test('the link of a person disabled meanwhile is over', async () => {
  const { email, id } = await shop.hire('technician');
  await forgot(email);
  const path = await linkTo(email);
  await shop.db.update(users).set({ disabledAt: new Date() }).where(eq(users.id, id));
  expect((await open(path)).status).toBe(410);
  expect((await set(path)).status).toBe(410);
});

test('an invitation’s secret resets no password', async () => {
  const { id } = await shop.hire('technician');
  const secret = await insertLink(shop.db, 'invite', id);
  expect((await set(`/reset/${secret}`)).status).toBe(410);
});

test('the answer is the same for known, unknown, disabled and invited, and only the known gets a letter', async () => {
  const known = await shop.hire('technician');
  const disabled = await shop.hire('technician', { disabledAt: new Date() });
  const invited = await shop.hire('technician', { passwordHash: null });
  const emails = [known.email, 'no-such-person@staff.example', disabled.email, invited.email];
  const seen = await Promise.all(
    emails.map(async (email) => {
      const answer = await forgot(email);
      return `${answer.status} ${(await answer.text()).replaceAll(email, '…')}`;
    }),
  );
  expect(new Set(seen).size).toBe(1);
  await shop.letter(known.email);
  const done = () => shop.db.select().from(outbox).where(eq(outbox.kind, 'reset'));
  await expect
    .poll(async () => (await done()).every((job) => job.doneAt), { timeout: 10_000 })
    .toBe(true);
  for (const email of emails.slice(1)) expect(await shop.letters(email)).toEqual([]);
});

test('one mailbox gets four letters an hour, asked for from wherever', async () => {
  const { email } = await shop.hire('technician');
  const answers: number[] = [];
  for (let i = 0; i < 5; i++) answers.push((await forgot(email)).status);
  expect(answers).toEqual([200, 200, 200, 200, 429]);
});

test('one address may ask for thirty letters an hour', async () => {
  const answers: number[] = [];
  for (let i = 0; i < 31; i++)
    answers.push((await forgot(`somebody-${i}@staff.example`, '10.99.99.99')).status);
  expect(answers.slice(0, 30).every((status) => status === 200)).toBe(true);
  expect(answers[30]).toBe(429);
});

test('a short or mistyped new password is named beside its field and the link stays good', async () => {
  const { email } = await shop.hire('technician');
  await forgot(email);
  const path = await linkTo(email);
  const short = await set(path, 'short');
  expect(short.status).toBe(422);
  expect(await short.text()).toContain('id="password-error"');
  const other = await set(path, NEW, `${NEW}!`);
  expect(other.status).toBe(422);
  expect(await other.text()).toContain('id="again-error"');
  expect((await set(path)).status).toBe(303);
});
