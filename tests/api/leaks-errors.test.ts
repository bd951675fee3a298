/** An answer that says no says nothing of the inside: no trace, no statement, no path, no version. */
import { createConnection } from 'mysql2/promise';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { startApp, type TestApp } from '../fixtures/app';
import { ask, wholeAnswer, type Question } from '../fixtures/ask';
import { MARKED_SETTINGS, openMarkedShop, type MarkedShop } from '../fixtures/marked-shop';
import { marksIn } from '../fixtures/marks';
import { testServices } from '../fixtures/services';
import { telltalesIn } from '../fixtures/telltales';

let app: TestApp;
let shop: MarkedShop;
beforeAll(async () => {
  app = await startApp({ env: MARKED_SETTINGS });
  shop = await openMarkedShop(app);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const cookieOf = (name: string) =>
  shop.askers.find((asker) => asker.name === name)?.headers['cookie'] ?? '';

/** Asks, and holds the answer to its status and to silence about the inside. */
async function expectSilent(question: Question, ...statuses: number[]): Promise<string> {
  const answer = await ask(app, question);
  const text = await wholeAnswer(answer);
  const what = `${question.method} ${question.path}`;
  expect(statuses, `${what}: ${answer.status}`).toContain(answer.status);
  expect(telltalesIn(text), what).toEqual([]);
  expect(marksIn(text), what).toEqual([]);
  return text;
}

const asOwner = (method: string, path: string, more: Partial<Question> = {}): Question => ({
  method,
  path,
  ...more,
  headers: { cookie: cookieOf('owner'), ...more.headers },
});

test('refusals of every kind tell nothing', async () => {
  const json = { customer: { id: 'x' } };
  const text = { 'content-type': 'text/plain' };
  const odd = { 'idempotency-key': 'one two' };
  const note = { body: 'x' };
  const number = shop.tickets.anna.number;
  await expectSilent(asOwner('GET', '/nothing'), 404);
  await expectSilent(asOwner('GET', '/api/nothing'), 404);
  await expectSilent(asOwner('DELETE', '/queue'), 405);
  await expectSilent(asOwner('PUT', '/api/tickets'), 405, 404);
  await expectSilent({ method: 'GET', path: '/api/tickets' }, 401);
  await expectSilent(asOwner('GET', '/api/tickets?limit=x'), 422);
  await expectSilent(asOwner('GET', '/api/tickets?cursor=x'), 422);
  await expectSilent(asOwner('POST', '/api/tickets', { json }), 422);
  await expectSilent(asOwner('POST', '/api/tickets', { headers: text }), 415);
  await expectSilent(
    asOwner('POST', `/api/tickets/${number}/notes`, { json: note, headers: odd }),
    400,
  );
  await expectSilent(asOwner('POST', '/api/tickets', { json: 'x'.repeat(300_000) }), 413);
  await expectSilent(asOwner('DELETE', `/api/photos/${'A'.repeat(22)}`), 428, 400);
  await expectSilent(asOwner('DELETE', `/api/photos/${'A'.repeat(22)}`, { version: 1 }), 404);
  await expectSilent({ method: 'GET', path: '/queue', headers: { cookie: 'mw_session=%00' } }, 303);
  await expectSilent(
    { method: 'GET', path: '/api/tickets', headers: { authorization: 'Bearer mw_nobody' } },
    401,
  );
});

test('a store that fails is told as a store that does not answer', async () => {
  const { control } = await testServices();
  const match = { method: 'GET', key: 'photos/*' };
  const fault = { match, kind: 'status', status: 500, times: 20 };
  const headers = { 'content-type': 'application/json' };
  await fetch(`${control.store}/faults`, { method: 'POST', headers, body: JSON.stringify(fault) });
  try {
    const path = `/api/photos/${shop.tickets.anna.shared.publicId}/page`;
    await expectSilent(asOwner('GET', path), 503);
  } finally {
    await fetch(`${control.store}/faults`, { method: 'DELETE' });
  }
});

test('a crash in an endpoint and in a page gives its number and nothing else', async () => {
  const { number } = shop.tickets.anna;
  const path = `/api/tickets/${number}/notes`;
  const database = await createConnection({ uri: app.databaseUrl });
  await database.query('RENAME TABLE ticket_notes TO ticket_notes_away');
  try {
    const requestId = /[0-9a-f-]{36}/;
    expect(await expectSilent(asOwner('GET', path), 500)).toMatch(requestId);
    expect(await expectSilent(asOwner('POST', path, { json: { body: 'x' } }), 500)).toMatch(
      requestId,
    );
    expect(await expectSilent(asOwner('GET', `/tickets/${number}`), 500)).toMatch(requestId);
    const form = { do: 'note', note: 'x' };
    await expectSilent(asOwner('POST', `/tickets/${number}`, { form }), 500);
  } finally {
    await database.query('RENAME TABLE ticket_notes_away TO ticket_notes');
    await database.end();
  }
  // Logged once, with the number, for whoever looks after the shop.
  expect(app.log()).toMatch(/"msg":"crashed"/);
});

test('with its database gone the shop still answers, and tells nothing', async () => {
  const database = await createConnection({ uri: app.databaseUrl });
  await database.query(`DROP DATABASE ${app.databaseName}`);
  await database.end();
  const broken = [500, 503];
  for (const path of ['/queue', '/status', `/tickets/${shop.tickets.anna.number}`])
    await expectSilent(asOwner('GET', path), ...broken);
  await expectSilent(asOwner('POST', '/intake', { form: { maker: 'x' } }), ...broken);
  await expectSilent(asOwner('GET', '/api/tickets'), ...broken);
  await expectSilent(asOwner('POST', '/api/diagnosis', { json: {} }), ...broken);
  await expectSilent({ method: 'GET', path: '/api/health/live' }, 200);
  await expectSilent({ method: 'GET', path: '/' }, 200);
});
