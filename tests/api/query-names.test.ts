/** Names in the query that an endpoint does not know, and the reason phrases of refused pages. */
import { request } from 'node:http';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { ROUTES } from '@/contracts/routes';
import { cookieOf, openStaffShop, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let cookie: string;
beforeAll(async () => {
  shop = await openStaffShop();
  cookie = cookieOf(await shop.signIn((await shop.hire('owner')).email));
});
afterAll(() => shop?.close());

const get = (path: string) => shop.ask({ method: 'GET', path, headers: { cookie } });

test('a list refuses a filter it does not know, by its name', async () => {
  const answer = await get('/api/instruments?serial=BK-1');
  expect(answer.status).toBe(422);
  expect(await answer.json()).toMatchObject({
    detail: 'serial: Not a query name: known are limit, cursor, sort, q.',
    errors: [{ path: 'serial' }],
  });
  expect((await get('/api/instruments?q=BK-1')).status).toBe(200);
});

test('every endpoint that is read without names in its path refuses a name it does not know', async () => {
  const plain = ROUTES.filter(
    ({ method, path, who }) => method === 'GET' && !path.includes('{') && who !== 'customer',
  );
  expect(plain.length).toBeGreaterThan(8);
  for (const { path } of plain) {
    const answer = await get(`${path}?zq=1`);
    expect(answer.status, path).toBe(422);
    expect(await answer.json(), path).toMatchObject({ errors: [{ path: 'zq' }] });
  }
});

test('pages stay forgiving', async () => {
  expect((await get('/audit?zq=1')).status).toBe(200);
  expect((await get('/faults?zq=1')).status).toBe(200);
});

/** Status line of an answer: fetch does not always tell the phrase as it was sent. */
function statusLine(method: string, path: string, form = ''): Promise<string> {
  const headers = { cookie, 'content-type': 'application/x-www-form-urlencoded' };
  return new Promise((resolve, reject) => {
    const asked = request(`${shop.app.origin}${path}`, { method, headers }, (answer) => {
      answer.resume();
      resolve(`${answer.statusCode} ${answer.statusMessage}`);
    });
    asked.once('error', reject);
    asked.end(form);
  });
}

// The phrases of RFC 9110, 15.
test.each([
  ['POST', '/account', 'do=name&name=', '422 Unprocessable Entity'],
  ['GET', '/reset/none', '', '410 Gone'],
  ['GET', '/tickets/2612-9999', '', '404 Not Found'],
  ['GET', '/account', '', '200 OK'],
])('%s %s %s is answered %4$s', async (method, path, form, line) => {
  expect(await statusLine(method, path, form)).toBe(line);
});
