/** Raw bytes on the connection and addresses that are none: the process stays up, says no, and tells nothing. */
import { randomBytes } from 'node:crypto';
import fc from 'fast-check';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { startApp, type TestApp } from '../fixtures/app';
import { ask } from '../fixtures/ask';
import { askerNamed } from '../fixtures/every-call';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { sendBytes, statusesIn } from '../fixtures/raw-http';
import { telltalesIn } from '../fixtures/telltales';

let app: TestApp;
let shop: MarkedShop;
let port: number;
beforeAll(async () => {
  app = await startApp({ env: MARKED_SETTINGS });
  shop = await openMarkedShop(app);
  port = Number(new URL(app.origin).port);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const head = (line: string, ...headers: string[]) =>
  [line, 'host: 127.0.0.1', ...headers, '', ''].join('\r\n');
const cookieLine = () => `cookie: ${askerNamed(shop, 'owner').headers['cookie'] ?? ''}`;

async function expectCivil(bytes: string | Uint8Array): Promise<void> {
  const came = await sendBytes(port, bytes);
  const what = Buffer.from(bytes).toString('latin1').slice(0, 200);
  for (const status of statusesIn(came)) expect(status, what).toBeLessThan(500);
  expect(telltalesIn(came ?? ''), what).toEqual([]);
}

const ADDRESSES = [
  '/%',
  '/%ff',
  '/%00',
  '/%2e%2e/%2e%2e/etc/passwd',
  '/..%2f..%2fetc%2fpasswd',
  '/../../etc/passwd',
  '//evil.example/',
  '/\\evil.example',
  '/tickets/%E0%A4%A',
  '/tickets/%00',
  '/tickets/..%2f..',
  '/api/tickets/%ff/notes',
  '/api/photos/%2e%2e/full',
  '/_astro/../server/entry.mjs',
  '/_astro/%2e%2e/%2e%2e/server/entry.mjs',
  '/_image?href=http://127.0.0.1/',
  '/_image?href=/etc/passwd&f=svg',
  '/_server-islands/x',
  '/_actions/x',
  '/.env',
  '/.git/config',
  `/${'a/'.repeat(2_000)}`,
  `/queue?${'a=1&'.repeat(2_000)}`,
  '/queue?q=%E0%A4%A',
  '/sign-in?then=//evil.example',
  '*',
  'http://evil.example/',
  'gopher://x',
  '',
];

test.each(ADDRESSES.map((address) => [address.slice(0, 60), address]))(
  'the address %s brings nothing down and nothing out',
  async (_name, address) => {
    for (const method of ['GET', 'POST', 'HEAD', 'OPTIONS', 'PROPFIND']) {
      const request = head(`${method} ${address} HTTP/1.1`, cookieLine(), 'connection: close');
      const came = (await sendBytes(port, request)) ?? '';
      for (const status of statusesIn(came)) expect(status, method).toBeLessThan(500);
      expect(telltalesIn(came), method).toEqual([]);
      expect(came).not.toMatch(/root:x:0|createExports|^location: (https?:)?\/\/evil/im);
    }
  },
);

test('a request is never sent back to who sent it', async () => {
  for (const method of ['TRACE', 'CONNECT', 'TRACK']) {
    const secret = randomBytes(8).toString('hex');
    const came = (await sendBytes(port, head(`${method} / HTTP/1.1`, `x-secret: ${secret}`))) ?? '';
    expect(came).not.toContain(secret);
    expect(telltalesIn(came)).toEqual([]);
    for (const status of statusesIn(came)) expect(status).toBeGreaterThanOrEqual(400);
  }
});

const json = 'content-type: application/json';
const bodies = (): string[] => [
  head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'content-length: -1'),
  head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'content-length: 999999999999'),
  `${head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'content-length: 2', 'content-length: 5')}{}`,
  `${head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'content-length: 2', 'transfer-encoding: chunked')}{}`,
  `${head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'transfer-encoding: chunked')}zz\r\n{}\r\n`,
  `${head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'content-length: 2', 'expect: 100-continue')}{}`,
  `${head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'content-encoding: gzip', 'content-length: 2')}{}`,
  head('GET /queue HTTP/1.1', cookieLine(), cookieLine(), 'cookie: mw_session=x; mw_session=y'),
  head('GET /queue HTTP/1.1', 'authorization: Bearer a', 'authorization: Bearer b'),
  head('GET /queue HTTP/1.1', `x: ${'y'.repeat(60_000)}`),
  head('GET /queue HTTP/1.1', ...Array.from({ length: 3_000 }, (_, i) => `x${i}: y`)),
  head('GET /queue HTTP/1.1', 'x\u0000y: z'),
  head('GET /queue HTTP/1.1', 'upgrade: websocket', 'connection: upgrade'),
  head('GET /queue HTTP/9.9'),
  head('GET /queue'),
  'GET /queue HTTP/1.1\r\n\r\n',
  `${head('POST /api/tickets/9912-0001/steps HTTP/1.1', cookieLine(), json, 'if-match: "1"', 'if-match: "2"', 'idempotency-key: a', 'idempotency-key: b', 'content-length: 2')}{}`,
];

test('half, doubled and lying headers are borne', async () => {
  for (const request of bodies()) await expectCivil(request);
});

test('noise on the connection is borne', async () => {
  const noise = fc.uint8Array({ minLength: 1, maxLength: 400 });
  const asked = fc.tuple(
    fc.constantFrom('', 'GET / HTTP/1.1\r\n', 'POST /api/session HTTP/1.1\r\n'),
    noise,
  );
  const hold = ([start, bytes]: [string, Uint8Array]) =>
    expectCivil(Buffer.concat([Buffer.from(start), bytes, Buffer.from('\r\n\r\n')]));
  await fc.assert(fc.asyncProperty(asked, hold), { seed: 2612, numRuns: 60 });
});

test('a body that breaks off leaves nothing behind and holds nothing up', async () => {
  const before = await shop.states();
  const open = Array.from({ length: 40 }, () => {
    const start = head('POST /api/tickets HTTP/1.1', cookieLine(), json, 'content-length: 5000');
    return sendBytes(port, `${start}{"customer":`, 400);
  });
  const meanwhile = await ask(app, { method: 'GET', path: '/api/health/live' });
  expect(meanwhile.status).toBe(200);
  await Promise.all(open);
  expect(await shop.states()).toEqual(before);
});

test('after all that the same process serves as before', async () => {
  process.kill(app.pid, 0);
  const answer = await ask(app, {
    method: 'GET',
    path: `/api/markings?text=${randomBytes(4).toString('hex')}`,
    headers: askerNamed(shop, 'owner').headers,
  });
  expect(answer.status).toBe(200);
  expect(app.log()).not.toMatch(/"msg":"crashed"/);
});
