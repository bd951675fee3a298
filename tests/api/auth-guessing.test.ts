/** Guessing at accounts and tickets: who is stopped, and who is not kept out by it. */
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { audit } from '@/db/schema/people';
import { hashClaimCode } from '@/server/auth/secrets';
import { freshAddress } from '../fixtures/ask';
import { settings } from '../fixtures/app';
import { insertBoard, insertCustomer, insertTicket } from '../fixtures/rows';
import { testServices } from '../fixtures/services';
import { openStaffShop, PASSWORD, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let secret: string;
beforeAll(async () => {
  shop = await openStaffShop();
  secret = settings(await testServices(), '', '').APP_SECRET;
});
afterAll(() => shop?.close());

const linesAbout = (object: string) => shop.db.select().from(audit).where(eq(audit.object, object));
/** Cookies of an answer as a browser sends them back, one of them alone. */
const known = (answer: Response) =>
  answer.headers
    .getSetCookie()
    .map((cookie) => cookie.split(';')[0] ?? '')
    .find((cookie) => cookie.startsWith('mw_known=')) ?? '';

describe('passwords', () => {
  const wrong = (email: string, from?: string) =>
    shop.signIn(email, { password: 'wrong', ...(from ? { from } : {}) });
  const signIn = (email: string, headers: Record<string, string>, password = PASSWORD) =>
    shop.ask({ method: 'POST', path: '/api/session', json: { email, password }, headers });
  /** Forty wrong tries by eight strangers. */
  async function besiege(email: string) {
    for (let n = 0; n < 5; n++) {
      const from = freshAddress();
      await Promise.all(Array.from({ length: 8 }, () => wrong(email, from)));
    }
  }

  test('after eight wrong tries an address waits, even with the right one, and others do not', async () => {
    const { email, id } = await shop.hire('counter');
    const from = freshAddress();
    const tries = Array.from({ length: 8 }, () => wrong(email, from));
    expect((await Promise.all(tries)).map(({ status }) => status)).toEqual(Array(8).fill(401));
    const stopped = await shop.signIn(email, { from });
    expect(stopped.status).toBe(429);
    const seconds = Number(stopped.headers.get('retry-after'));
    expect(seconds).toBeGreaterThan(800);
    expect(seconds).toBeLessThanOrEqual(900);
    expect((await shop.signIn(email)).status).toBe(204);
    expect((await shop.signIn(email, { from })).status).toBe(429);
    const lines = (await linesAbout(`person:${id}`)).filter((l) => l.action === 'session.locked');
    expect(lines.map((l) => [l.actorName, l.detail])).toEqual([
      ['the shop', { 'too many wrong tries by': 'one address', from }],
    ]);
  });

  test('an account that is not there waits alike, and leaves no line', async () => {
    const from = freshAddress();
    const before = await shop.db.$count(audit);
    const tries = Array.from({ length: 8 }, () => wrong('ghost@staff.example', from));
    expect((await Promise.all(tries)).every(({ status }) => status === 401)).toBe(true);
    expect((await shop.signIn('ghost@staff.example', { from })).status).toBe(429);
    expect(await shop.db.$count(audit)).toBe(before);
  });

  test('forty wrong tries from everywhere close the account to strangers, not to a browser known', async () => {
    const { email, id } = await shop.hire('counter');
    const mine = known(await shop.signIn(email));
    expect(mine).toMatch(/^mw_known=[\w-]+$/);
    await besiege(email);
    expect((await shop.signIn(email)).status).toBe(429);
    expect((await signIn(email, { cookie: mine })).status).toBe(204);
    // Known at another account, it is a stranger at this one.
    const other = await shop.hire('counter');
    const theirs = known(await shop.signIn(other.email));
    expect((await signIn(email, { cookie: theirs })).status).toBe(429);
    expect((await signIn(email, { cookie: `${mine}x` })).status).toBe(429);
    const lines = (await linesAbout(`person:${id}`)).filter((l) => l.action === 'session.locked');
    expect(lines.map((l) => l.detail['too many wrong tries by'])).toEqual(['all addresses']);
  });

  test('a known browser has eight tries of its own, wherever it is', async () => {
    const { email } = await shop.hire('counter');
    const cookie = known(await shop.signIn(email));
    for (let i = 0; i < 8; i++) expect((await signIn(email, { cookie }, 'wrong')).status).toBe(401);
    expect((await signIn(email, { cookie })).status).toBe(429);
    expect((await shop.signIn(email)).status).toBe(204);
  });

  test('a reset link makes its browser known, so that a besieged account opens on a new one', async () => {
    const { email } = await shop.hire('counter');
    await besiege(email);
    await shop.ask({ method: 'POST', path: '/forgot', form: { email } });
    const path = /\/reset\/[\w-]+/.exec((await shop.letter(email)).text)?.[0] ?? '';
    const password = 'a password by the letter';
    const set = await shop.ask({ method: 'POST', path, form: { password, again: password } });
    expect((await signIn(email, {}, password)).status).toBe(429);
    expect((await signIn(email, { cookie: known(set) }, password)).status).toBe(204);
  });

  test('strangers cannot hold up a password asked again', async () => {
    const { email } = await shop.hire('counter');
    const signedIn = await shop.signIn(email);
    const cookie = signedIn.headers.getSetCookie()[0]?.split(';')[0] ?? '';
    await besiege(email);
    const again = 'another password of mine';
    const form = { do: 'password', current: PASSWORD, password: again, again };
    const changed = await shop.ask({ method: 'POST', path: '/account', form, headers: { cookie } });
    expect(changed.status).toBe(303);
  });

  test('sixty wrong tries from one address stop it, whoever is tried; elsewhere goes on', async () => {
    const { email } = await shop.hire('counter');
    const from = freshAddress();
    for (let i = 0; i < 60; i += 10) {
      const tries = Array.from({ length: 10 }, (_, n) =>
        wrong(`many-${i + n}@staff.example`, from),
      );
      expect((await Promise.all(tries)).every(({ status }) => status === 401)).toBe(true);
    }
    expect((await shop.signIn(email, { from })).status).toBe(429);
    expect((await shop.signIn(email)).status).toBe(204);
  });

  test('the addresses of one IPv6 subscriber are one', async () => {
    const { email } = await shop.hire('counter');
    const from = (n: number) => `2001:db8:7:1::${n.toString(16)}`;
    for (let n = 1; n <= 8; n++) expect((await wrong(email, from(n))).status).toBe(401);
    expect((await shop.signIn(email, { from: from(99) })).status).toBe(429);
    expect((await shop.signIn(email, { from: '2001:db8:7:2::1' })).status).toBe(204);
  });
});

describe('claim codes', () => {
  const CODE = 'K7Q4-9WMT-2X';
  async function ticket() {
    const staff = await shop.hire('technician');
    const customer = await insertCustomer(shop.db);
    const board = await insertBoard(shop.db);
    const { modelId: model, id } = board;
    const of = { customer: customer.id, model, board: id, staff: staff.id };
    const number = `2612-${String(1000 + staff.id)}`;
    const claimHash = hashClaimCode(secret, number, CODE);
    return insertTicket(shop.db, of, { number, claimHash });
  }
  const enter = (number: string, code: string, headers: Record<string, string> = {}) =>
    shop.ask({ method: 'POST', path: '/check', form: { number, code }, headers });

  test('whatever strangers try, the right code opens the ticket, from any other address', async () => {
    const { number } = await ticket();
    const busy = freshAddress();
    for (const from of [busy, freshAddress()])
      for (let i = 0; i < 8; i++)
        expect((await enter(number, 'AAAA-AAAA-AA', { 'x-forwarded-for': from })).status).toBe(422);
    expect((await enter(number, CODE, { 'x-forwarded-for': busy })).status).toBe(429);
    const opened = await enter(number, CODE);
    expect(opened.status).toBe(303);
    const headers = { 'x-forwarded-for': busy, cookie: known(opened) };
    expect((await enter(number, CODE, headers)).status).toBe(303);
    const lines = await linesAbout(`ticket:${number}`);
    expect(lines.map((l) => [l.action, l.detail])).toEqual([
      ['claim.locked', { 'too many wrong tries by': 'one address', from: busy }],
    ]);
  });

  test('forty wrong codes from one address stop it, whichever ticket is tried', async () => {
    const { number } = await ticket();
    const from = { 'x-forwarded-for': freshAddress() };
    for (let i = 0; i < 40; i++) await enter(`9901-${1000 + i}`, 'AAAA-AAAA-AA', from);
    expect((await enter(number, CODE, from)).status).toBe(429);
    expect((await enter(number, CODE)).status).toBe(303);
  });
});
