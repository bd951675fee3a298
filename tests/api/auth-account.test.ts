/** One's own account: name, password, and signing out everywhere. */
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { audit } from '@/db/schema/people';
import { insertLink, insertToken } from '../fixtures/rows';
import { cookieOf, openStaffShop, PASSWORD, type StaffShop } from '../fixtures/staff';

const NEW = 'a new password for tests';
let shop: StaffShop;
beforeAll(async () => {
  shop = await openStaffShop();
});
afterAll(() => shop?.close());

const post = (cookie: string, form: Record<string, string>) =>
  shop.ask({ method: 'POST', path: '/account', form, headers: { cookie } });
const page = async (cookie: string, path = '/account') =>
  (await shop.ask({ method: 'GET', path, headers: { cookie } })).text();
const isSignedIn = async (cookie: string) =>
  (await shop.ask({ method: 'GET', path: '/api/tokens', headers: { cookie } })).status === 200;
async function signedIn(role: 'technician' | 'senior' | 'owner' = 'technician') {
  const person = await shop.hire(role);
  return { ...person, cookie: cookieOf(await shop.signIn(person.email)) };
}
const change = { do: 'password', current: PASSWORD, password: NEW, again: NEW };

test('a new password takes the current one, keeps this session and ends the others', async () => {
  const { cookie, email, id } = await signedIn();
  const other = cookieOf(await shop.signIn(email));
  const link = await insertLink(shop.db, 'reset', id);
  const answer = await post(cookie, change);
  expect([answer.status, answer.headers.get('location')]).toEqual([303, '/account?done=password']);
  expect([await isSignedIn(cookie), await isSignedIn(other)]).toEqual([true, false]);
  expect((await shop.signIn(email)).status).toBe(401);
  expect((await shop.signIn(email, { password: NEW })).status).toBe(204);
  expect((await shop.ask({ method: 'GET', path: `/reset/${link}` })).status).toBe(410);
  expect((await shop.letter(email)).subject).toMatch(/was changed/);
});

test('a new password keeps API tokens and names them, or revokes them when told so', async () => {
  const { cookie, id } = await signedIn();
  expect(await page(cookie)).not.toContain('name="tokens"');
  const tokens = [
    await insertToken(shop.db, id, ['read']),
    await insertToken(shop.db, id, ['read']),
  ];
  const works = () =>
    Promise.all(
      tokens.map(async ({ token }) => {
        const headers = { authorization: `Bearer ${token}` };
        return (await shop.ask({ method: 'GET', path: '/api/tickets', headers })).status;
      }),
    );
  expect(await page(cookie)).toContain('2 API tokens stay valid.');
  expect((await post(cookie, change)).status).toBe(303);
  expect(await works()).toEqual([200, 200]);
  expect(await page(cookie, '/account?done=password')).toContain(
    'Your other sessions were ended. 2 API tokens stay valid.',
  );
  const again = { do: 'password', current: NEW, password: PASSWORD, again: PASSWORD };
  const answer = await post(cookie, { ...again, tokens: 'revoke' });
  expect(answer.headers.get('location')).toBe('/account?done=password-tokens');
  expect(await works()).toEqual([401, 401]);
  expect(await page(cookie)).not.toContain('stay valid');
});

test.each([
  ['the current one wrong', { current: 'not mine' }, 'current-error'],
  ['too short', { password: 'short', again: 'short' }, 'password-error'],
  ['not the same twice', { again: 'something else' }, 'again-error'],
  ['nothing', { current: '', password: '', again: '' }, 'password-error'],
])('a password is refused beside its field: %s', async (_, wrong, shown) => {
  const { cookie, email } = await signedIn();
  const answer = await post(cookie, { ...change, ...wrong });
  const html = await answer.text();
  expect([answer.status, html.includes(`id="${shown}"`)]).toEqual([422, true]);
  expect(html).not.toContain(PASSWORD);
  expect((await shop.signIn(email)).status).toBe(204);
});

test('guessing the current password stops after eight tries', async () => {
  const { cookie } = await signedIn();
  const answers: number[] = [];
  for (let i = 0; i < 9; i++)
    answers.push((await post(cookie, { ...change, current: 'guess' })).status);
  expect(answers).toEqual([...Array<number>(8).fill(422), 429]);
});

test('of two changes at once one is done, and the other says so', async () => {
  const { cookie, email } = await signedIn();
  const both = ['the first of two new ones', 'the second of two new ones'];
  const answers = await Promise.all(
    both.map((password) => post(cookie, { ...change, password, again: password })),
  );
  expect(answers.map(({ status }) => status).toSorted()).toEqual([303, 422]);
  const tries = await Promise.all(both.map((password) => shop.signIn(email, { password })));
  expect(tries.map(({ status }) => status).toSorted()).toEqual([204, 401]);
});

test('a new name shows at once and leaves a line', async () => {
  const { cookie, id, name } = await signedIn();
  expect((await post(cookie, { do: 'name', name: '  Ida <b>Moor</b> ' })).status).toBe(303);
  const html = await page(cookie);
  expect(html).toContain('Ida &lt;b&gt;Moor&lt;/b&gt;');
  // Inside an attribute only the quote has to be written otherwise.
  expect(html.replace(/value="[^"]*"/g, '')).not.toContain('<b>Moor');
  const lines = await shop.db
    .select()
    .from(audit)
    .where(eq(audit.object, `person:${id}`));
  expect(lines.at(-1)).toMatchObject({
    action: 'person.renamed',
    detail: { from: name, to: 'Ida <b>Moor</b>' },
  });
});

test.each(['', ' ', 'x'.repeat(121), 'two\nlines'])('the name %j is refused', async (name) => {
  const { cookie } = await signedIn();
  const answer = await post(cookie, { do: 'name', name });
  expect([answer.status, (await answer.text()).includes('id="name-error"')]).toEqual([422, true]);
});

test('signing out everywhere ends every session, this one too', async () => {
  const { cookie, email } = await signedIn();
  const other = cookieOf(await shop.signIn(email));
  const answer = await post(cookie, { do: 'everywhere' });
  expect([answer.status, answer.headers.get('location')]).toEqual([303, '/sign-in']);
  expect(answer.headers.get('clear-site-data')).toBe('"cache"');
  expect([await isSignedIn(cookie), await isSignedIn(other)]).toEqual([false, false]);
});

test('the second factor is advised to seniors and owners', async () => {
  expect(await page((await signedIn('senior')).cookie)).toContain('Advised for you as senior');
  expect(await page((await signedIn('owner')).cookie)).toContain('Advised for you as owner');
  expect(await page((await signedIn('technician')).cookie)).not.toContain('Advised for you');
});

test('a form that asks for nothing known is refused', async () => {
  const { cookie } = await signedIn();
  expect((await post(cookie, { do: 'something' })).status).toBe(422);
  expect((await post(cookie, {})).status).toBe(422);
});
