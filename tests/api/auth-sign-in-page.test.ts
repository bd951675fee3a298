/** The sign-in page: where it leads, what it keeps, and what it shows in demo mode. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { cookieOf, openStaffShop, PASSWORD, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let real: StaffShop;
beforeAll(async () => {
  shop = await openStaffShop();
  real = await openStaffShop({ env: { DEMO: '0', PUBLIC_ORIGIN: 'https://shop.example' } });
});
afterAll(async () => {
  await shop?.close();
  await real?.close();
});

const post = (path: string, form: Record<string, string>, headers: Record<string, string> = {}) =>
  shop.ask({ method: 'POST', path, form: { step: 'password', ...form }, headers });

test.each([
  ['/sign-in', '/queue'],
  ['/sign-in?then=%2Ffaults%3Fq%3Dfuse', '/faults?q=fuse'],
  ['/sign-in?then=https%3A%2F%2Felsewhere.example', '/queue'],
  ['/sign-in?then=%2F%2Felsewhere.example', '/queue'],
  ['/sign-in?then=%2F%5Celsewhere.example', '/queue'],
])('%s leads to %s', async (path, to) => {
  const { email } = await shop.hire('counter');
  const answer = await post(path, { email, password: PASSWORD });
  expect([answer.status, answer.headers.get('location')]).toEqual([303, to]);
  expect(cookieOf(answer)).toMatch(/^mw_session=.{43}$/);
});

test('a page that asks who you are brings you back to itself', async () => {
  const away = await shop.ask({ method: 'GET', path: '/queue?stage=all&page=2' });
  expect(away.status).toBe(303);
  const { email } = await shop.hire('counter');
  const answer = await post(away.headers.get('location') ?? '', { email, password: PASSWORD });
  expect(answer.headers.get('location')).toBe('/queue?stage=all&page=2');
});

test('a form that meets an ended session brings you back to its page', async () => {
  const away = await shop.ask({ method: 'POST', path: '/tickets/2612-0047', form: { do: 'note' } });
  expect(away.headers.get('location')).toBe('/sign-in?then=%2Ftickets%2F2612-0047');
  const { email } = await shop.hire('counter');
  const answer = await post(away.headers.get('location') ?? '', { email, password: PASSWORD });
  expect(answer.headers.get('location')).toBe('/tickets/2612-0047');
});

test('a refusal keeps the address, not the password, and names what is wrong', async () => {
  const { email } = await shop.hire('counter');
  const answer = await post('/sign-in', { email, password: 'not <the> password' });
  const html = await answer.text();
  expect(answer.status).toBe(401);
  expect(html).toContain(`value="${email}"`);
  expect(html).toContain('E-mail or password is wrong.');
  expect(html).not.toContain('password&gt;');
  expect(html).not.toContain('not &lt;the');
});

test('fields left empty are named beside themselves', async () => {
  const html = await (await post('/sign-in', { email: 'x', password: '' })).text();
  expect(html).toContain('id="email-error"');
  expect(html).toContain('id="password-error"');
});

test('what was typed is never markup', async () => {
  const html = await (await post('/sign-in', { email: '"><b>x</b>', password: 'y' })).text();
  // Inside an attribute only the quote has to be written otherwise.
  expect(html).toContain('value="&#34;><b>x</b>"');
  expect(html).not.toContain('"><b>x');
});

test('who is signed in already goes straight on', async () => {
  const { email } = await shop.hire('counter');
  const cookie = cookieOf(await shop.signIn(email));
  const answer = await shop.ask({
    method: 'GET',
    path: '/sign-in?then=/boards',
    headers: { cookie },
  });
  expect([answer.status, answer.headers.get('location')]).toEqual([303, '/boards']);
});

test('a form from another site signs nobody in and nobody out', async () => {
  const { email } = await shop.hire('counter');
  const elsewhere = { 'sec-fetch-site': 'cross-site' };
  expect((await post('/sign-in', { email, password: PASSWORD }, elsewhere)).status).toBe(403);
  const cookie = cookieOf(await shop.signIn(email));
  const out = { method: 'POST', path: '/sign-out', form: {} };
  expect((await shop.ask({ ...out, headers: { ...elsewhere, cookie } })).status).toBe(403);
  const still = { method: 'GET', path: '/api/tokens', headers: { cookie } };
  expect((await shop.ask(still)).status).toBe(200);
  const left = await shop.ask({ ...out, headers: { cookie } });
  expect([left.status, left.headers.get('clear-site-data')]).toEqual([303, '"cache"']);
  expect((await shop.ask(still)).status).toBe(401);
});

test('signing out by a link alone is not taken', async () => {
  expect((await shop.ask({ method: 'GET', path: '/sign-out' })).status).toBe(405);
});

test('the demo shop shows its sign-ins, a real one does not', async () => {
  const demo = await (await shop.ask({ method: 'GET', path: '/sign-in' })).text();
  expect(demo).toContain('owner@meterwright.example');
  expect(demo).toContain('bench-demo-2612');
  const plain = await (await real.ask({ method: 'GET', path: '/sign-in' })).text();
  expect(plain).not.toContain('meterwright.example');
  expect(plain).not.toContain('bench-demo-2612');
});

test('behind https the cookie is secure and the browser is told to stay there', async () => {
  const { email } = await real.hire('counter');
  const answer = await real.signIn(email);
  expect(answer.headers.get('set-cookie')).toMatch(/; Secure(;|$)/);
  expect(answer.headers.get('strict-transport-security')).toMatch(/max-age=31536000/);
});

test('behind https a form is known by the shop’s own origin', async () => {
  const { email } = await real.hire('counter');
  const form = { step: 'password', email, password: PASSWORD };
  const send = (origin: string) =>
    real.ask({ method: 'POST', path: '/sign-in', form, headers: { origin } });
  expect((await send('https://shop.example')).status).toBe(303);
  expect((await send('https://shop.example.elsewhere.example')).status).toBe(403);
});
