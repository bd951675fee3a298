/** The headers that guard an answer, on every route and page, and the attributes of every cookie, behind https. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { ROUTES } from '@/contracts/routes';
import { PAGES } from '@/server/auth/page-access';
import { startApp, type TestApp } from '../fixtures/app';
import { ask } from '../fixtures/ask';
import { insertLink } from '../fixtures/rows';
import {
  MARKED_SETTINGS,
  openMarkedShop,
  PASSWORD,
  type MarkedShop,
} from '../fixtures/marked-shop';

let app: TestApp;
let shop: MarkedShop;
beforeAll(async () => {
  const env = { ...MARKED_SETTINGS, PUBLIC_ORIGIN: 'https://shop.example', DEMO: '0' };
  app = await startApp({ env });
  shop = await openMarkedShop(app);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const headersOf = (name: string) => shop.askers.find((one) => one.name === name)?.headers ?? {};
const askers = ['signed out', 'customer', 'owner'];

/** The address of an own object; every name in it stands in the marked shop. */
function addressOf(pattern: string): string {
  const { anna } = shop.tickets;
  const values: Record<string, string | number> = {
    number: anna.number,
    variant: 'page',
    pin: anna.shared.pinId,
    revision: 1,
    token: 'A'.repeat(43),
    id: pattern.includes('photos') ? anna.shared.publicId : 1,
  };
  return pattern.replaceAll(/[{[](\w+)[}\]]/g, (_, name: string) => String(values[name]));
}

function expectGuarded(answer: Response): void {
  const { headers } = answer;
  const of = (name: string) => headers.get(name);
  expect(of('x-content-type-options')).toBe('nosniff');
  expect(of('x-frame-options')).toBe('DENY');
  expect(of('referrer-policy')).toBe('same-origin');
  expect(of('cross-origin-opener-policy')).toBe('same-origin');
  expect(of('cross-origin-resource-policy')).toBe('same-origin');
  expect(of('permissions-policy')).toContain('geolocation=()');
  expect(of('strict-transport-security')).toMatch(/max-age=\d{8}/);
  expect(of('x-request-id')).toMatch(/^[0-9a-f-]{36}$/);
  expect(of('x-powered-by')).toBeNull();
  expect(of('access-control-allow-origin')).toBeNull();
  const picture = of('content-type')?.startsWith('image/');
  if (picture) expect(of('cache-control')).toMatch(/^private\b/);
  else expect(of('cache-control')).toMatch(/no-store/);
}

const directives = (policy: string): Map<string, string> =>
  new Map(
    policy.split(';').flatMap((directive) => {
      const [name, ...values] = directive.trim().split(/\s+/);
      return name ? [[name, values.join(' ')] as const] : [];
    }),
  );

function expectPagePolicy(answer: Response): void {
  const policy = directives(answer.headers.get('content-security-policy') ?? '');
  expect(policy.get('default-src')).toBe("'self'");
  for (const name of ['object-src', 'base-uri', 'frame-ancestors'])
    expect(policy.get(name)).toBe("'none'");
  expect(policy.get('form-action')).toBe("'self'");
  expect(policy.get('script-src')).toMatch(/^'self'( 'sha256-[\w+/]+=*')*$/);
  expect(policy.get('style-src')).toMatch(/^'self'( 'sha256-[\w+/]+=*')*$/);
  expect(policy.get('connect-src')).toMatch(/^'self' http:\/\/127\.0\.0\.1:\d+$/);
}

test.each(ROUTES.map(({ method, path }) => [method, path] as const))(
  '%s %s is guarded, whoever asks',
  async (method, path) => {
    for (const who of askers) {
      const answer = await ask(app, { method, path: addressOf(path), headers: headersOf(who) });
      await answer.body?.cancel();
      expectGuarded(answer);
      const policy = answer.headers.get('content-security-policy');
      expect(policy).toBe("default-src 'none'; frame-ancestors 'none'");
    }
  },
);

test.each(Object.keys(PAGES))('%s is guarded, whoever opens it', async (page) => {
  for (const method of ['GET', 'POST'])
    for (const who of askers) {
      const form = method === 'POST' ? {} : undefined;
      const question = { method, path: addressOf(page), headers: headersOf(who), form };
      const answer = await ask(app, question);
      await answer.body?.cancel();
      expectGuarded(answer);
      if (answer.headers.get('content-type')?.startsWith('text/html')) expectPagePolicy(answer);
    }
});

function expectGuardedCookies(answer: Response, names: string[]): string[] {
  const cookies = answer.headers.getSetCookie();
  expect(cookies.map((cookie) => cookie.split('=')[0])).toEqual(names);
  for (const cookie of cookies) {
    const attributes = cookie.split(';').map((part) => part.trim().toLowerCase());
    expect(attributes).toContain('httponly');
    expect(attributes).toContain('secure');
    expect(attributes.some((a) => a === 'samesite=lax' || a === 'samesite=strict')).toBe(true);
    expect(attributes.some((a) => a.startsWith('domain='))).toBe(false);
    expect(attributes.some((a) => a.startsWith('path=/'))).toBe(true);
  }
  return cookies;
}

test('every cookie is HttpOnly, Secure and bound to the site', async () => {
  const { email } = shop.staff.colleague;
  const json = { email, password: PASSWORD };
  const byApi = await ask(app, { method: 'POST', path: '/api/session', json });
  const [session = ''] = expectGuardedCookies(byApi, ['mw_session', 'mw_known']);
  const cookie = session.split(';')[0] ?? '';
  const form = { step: 'password', ...json };
  const byPage = await ask(app, { method: 'POST', path: '/sign-in', form });
  expectGuardedCookies(byPage, ['mw_session', 'mw_known']);
  const token = await insertLink(shop.db, 'link', shop.customers.anna.account);
  const byLink = await ask(app, { method: 'POST', path: `/link/${token}`, form: {} });
  expectGuardedCookies(byLink, ['mw_session']);
  const receipt = `/tickets/${shop.tickets.anna.number}/receipt`;
  const renewed = await ask(app, { method: 'POST', path: receipt, form: {}, headers: { cookie } });
  const [sealed = ''] = expectGuardedCookies(renewed, ['mw_receipt']);
  expect(sealed.toLowerCase()).toContain(`path=${receipt}`);
  for (const [method, path] of [
    ['DELETE', '/api/session'],
    ['POST', '/sign-out'],
  ] as const)
    expectGuardedCookies(await ask(app, { method, path, headers: { cookie } }), ['mw_session']);
  // The cookie that was signed out of is worth nothing any more.
  const after = await ask(app, { method: 'GET', path: '/api/tickets', headers: { cookie } });
  expect(after.status).toBe(401);
});
