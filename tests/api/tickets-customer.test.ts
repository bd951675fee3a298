/** The customer's way in, and what they see of their own ticket and of nothing else. */
import { and, eq, isNull } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Status } from '@/contracts/status';
import { oneTimeTokens } from '@/db/schema/people';
import { freshAddress } from '../fixtures/ask';
import {
  intakeOf,
  mailbox,
  openDeskShop,
  said,
  type DeskShop,
  type Taken,
} from '../fixtures/desk-shop';
import { awaitLetters, lettersTo } from '../fixtures/inbox';
import { marksIn, mark } from '../fixtures/marks';
import { cookieOf } from '../fixtures/staff';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

const WRONG = '2222-2222-22';

describe('the claim code', () => {
  test('opens its own ticket, however it is typed', async () => {
    const { number, claimCode } = await shop.taken();
    const bare = claimCode.replaceAll('-', '');
    const ways = [claimCode, bare, claimCode.toLowerCase(), ` ${bare.match(/../g)?.join(' ')} `];
    for (const typed of ways) {
      const answer = await shop.claim(number, typed);
      expect(answer.status, typed).toBe(303);
      expect(answer.headers.get('location')).toBe(`/status/${number}`);
      expect(answer.headers.get('set-cookie')).toMatch(/HttpOnly/i);
      const page = await shop.get(cookieOf(answer), `/status/${number}`);
      expect(page.status).toBe(200);
    }
  });

  test('of another ticket, a wrong one and an unknown number are refused in the same words', async () => {
    const [one, two] = [await shop.taken(), await shop.taken()];
    const answers = await Promise.all([
      shop.claim(one.number, two.claimCode),
      shop.claim(one.number, WRONG),
      shop.claim('9901-0001', one.claimCode),
    ]);
    for (const answer of answers) {
      expect(answer.status).toBe(422);
      expect(answer.headers.get('set-cookie')).toBeNull();
      expect(await answer.text()).toContain('don’t belong together');
    }
  });

  test('guessed at from one place is refused after eight tries, and opens from elsewhere', async () => {
    const { number, claimCode } = await shop.taken();
    const from = freshAddress();
    const tries = [];
    for (let i = 0; i < 9; i++) tries.push(await shop.claim(number, WRONG, from));
    expect(tries.map((a) => a.status)).toEqual([...Array<number>(8).fill(422), 429]);
    const wait = Number(tries[8]?.headers.get('retry-after'));
    expect(wait).toBeGreaterThan(0);
    expect(wait).toBeLessThanOrEqual(900);
    expect((await shop.claim(number, claimCode, from)).status).toBe(429);
    expect((await shop.claim(number, claimCode)).status).toBe(303);
    expect((await shop.claim(number, claimCode, from)).status).toBe(429);
  });

  test('one place that tries many tickets is refused too, whatever it tries; others are not', async () => {
    const from = freshAddress();
    const { number, claimCode } = await shop.taken();
    for (let i = 0; i < 45; i++)
      expect((await shop.claim(number, claimCode, from)).status).toBe(303);
    const tries = [];
    for (let i = 0; i < 41; i++)
      tries.push((await shop.claim(`9902-${1_000 + i}`, WRONG, from)).status);
    expect(tries).toEqual([...Array<number>(40).fill(422), 429]);
    expect((await shop.claim(number, claimCode, from)).status).toBe(429);
    expect((await shop.claim(number, claimCode)).status).toBe(303);
  });
});

describe('the one-time link', () => {
  const linkFor = async (email: string, letters: number) => {
    const asked = await shop.ask({ method: 'POST', path: '/check/link', form: { email } });
    expect(asked.status).toBe(200);
    const all = await awaitLetters(email, letters);
    const path = /\/link\/[\w-]+/.exec(all.at(-1)?.text ?? '')?.[0];
    if (!path) throw new Error('No link came.');
    return path;
  };
  const press = (path: string) => shop.ask({ method: 'POST', path, form: {} });
  const owner = async () => {
    const email = mailbox();
    const customer = { name: 'Ida Brandsma', email };
    const mine = [await shop.taken({ customer }), await shop.taken({ customer })];
    await awaitLetters(email, 2);
    return { email, mine };
  };

  test('opens all of the customer’s tickets, once', async () => {
    const { email, mine } = await owner();
    const other = await shop.taken();
    const path = await linkFor(email, 3);
    expect((await shop.get('', path)).status).toBe(200);
    expect((await shop.get('', path)).status).toBe(200);
    const answers = await Promise.all([press(path), press(path), press(path)]);
    expect(answers.map((a) => a.status).sort()).toEqual([303, 410, 410]);
    const opened = answers.find((a) => a.status === 303);
    if (!opened) throw new Error('The link did not open.');
    const cookie = cookieOf(opened);
    const list = await (await shop.get(cookie, '/status')).text();
    for (const { number } of mine) {
      expect(list).toContain(number);
      expect((await shop.get(cookie, `/api/status/${number}`)).status).toBe(200);
    }
    expect(list).not.toContain(other.number);
    expect((await shop.get(cookie, `/api/status/${other.number}`)).status).toBe(404);
  });

  test('runs out after an hour, and with a newer one', async () => {
    const { email } = await owner();
    const first = await linkFor(email, 3);
    const second = await linkFor(email, 4);
    expect((await press(first)).status).toBe(410);
    const live = isNull(oneTimeTokens.usedAt);
    const mine = and(live, eq(oneTimeTokens.kind, 'link'));
    const [row] = await shop.db.select().from(oneTimeTokens).where(mine);
    const life = (row?.expiresAt.getTime() ?? 0) - (row?.createdAt.getTime() ?? 0);
    expect(life).toBe(3_600_000);
    await shop.db.update(oneTimeTokens).set({ expiresAt: new Date() }).where(mine);
    expect((await press(second)).status).toBe(410);
  });

  test('is asked for in the same words whether or not the shop knows the address, and not too often', async () => {
    const unknown = mailbox();
    const ask = (email: string) =>
      shop.ask({ method: 'POST', path: '/check/link', form: { email } });
    const text = async (email: string) => (await (await ask(email)).text()).replaceAll(email, '');
    const { email } = await owner();
    expect(await text(email)).toBe(await text(unknown));
    expect(await lettersTo(unknown)).toEqual([]);
    for (let i = 0; i < 3; i++) await ask(unknown);
    const refused = await ask(unknown);
    expect(refused.status).toBe(429);
    expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(0);
  });
});

describe('what they see', () => {
  test('is their ticket and nothing internal, on the page and as JSON', async () => {
    const customer = { name: 'Ida Brandsma', email: mailbox() };
    const inside = { symptomText: mark('symptom'), condition: mark('condition') };
    const taken = await shop.taken({ customer, ...inside, accessories: ['leads'] });
    const { number } = taken;
    const path = `/api/tickets/${number}`;
    await said(
      await shop.call('senior', 'POST', `${path}/notes`, { json: { body: mark('note') } }),
    );
    const note = { note: mark('event') };
    await said(await shop.step('senior', number, 'begin', 1, note));
    const total = { amount: 4_800, currency: 'EUR' };
    const more = { ...note, estimate: { total, work: 'RT1 and RV1' } };
    await said(await shop.step('senior', number, 'send-estimate', 2, more));
    const cookie = await shop.enter(taken);
    const answer = await shop.get(cookie, `/api/status/${number}`);
    expect(answer.headers.get('etag')).toBe('"3"');
    const seen = (await answer.json()) as Status;
    expect(seen).toEqual({
      number,
      stage: 'estimate-sent',
      leftAt: 'on-the-bench',
      headline: 'We found the fault. Your answer is needed.',
      instrument: {
        maker: 'Tessaly',
        model: 'T9',
        serial: (await shop.detail(number)).instrument.serial,
      },
      accessories: ['Test leads'],
      promisedOn: null,
      history: ['received', 'on-the-bench', 'estimate-sent'].map((stage) => ({
        stage,
        at: expect.stringMatching(/Z$/) as string,
        words: expect.stringMatching(/\.$/) as string,
      })),
      photos: [],
      estimate: { total, work: 'RT1 and RV1', open: true },
      exception: null,
      cautions: [expect.stringContaining('Don’t use this instrument on mains') as string],
      messages: [],
      version: 3,
    });
    const page = await (await shop.get(cookie, `/status/${number}`)).text();
    expect(page).toContain('RT1 and RV1');
    for (const text of [page, JSON.stringify(seen)]) {
      expect(marksIn(text)).toEqual([]);
      expect(text).not.toMatch(/Anselm|Marit|staff\.example|LB-40/);
    }
  });

  test('another’s ticket, one that is not there and the staff’s pages answer the same', async () => {
    const [mine, other] = [await shop.taken(), await shop.taken()];
    const cookie = await shop.enter(mine);
    for (const number of [other.number, '9901-0001', 'x']) {
      expect((await shop.get(cookie, `/api/status/${number}`)).status).toBe(404);
      expect((await shop.get(cookie, `/status/${number}`)).status).toBe(404);
      const fields = { do: 'message', body: 'hello' };
      expect((await shop.form(cookie, `/status/${number}`, fields)).status).toBe(404);
    }
    for (const path of ['/queue', `/tickets/${mine.number}`, `/tickets/${mine.number}/receipt`])
      expect((await shop.get(cookie, path)).status).toBe(404);
    expect((await shop.get(cookie, `/api/tickets/${mine.number}`)).status).toBe(403);
    expect((await shop.get('', `/api/status/${mine.number}`)).status).toBe(401);
    const staff = await shop.get(shop.cookies.owner, `/api/status/${mine.number}`);
    expect(staff.status).toBe(403);
  });

  test('a claim code opens its ticket alone, though the customer has two', async () => {
    const customer = { name: 'Ida Brandsma', email: mailbox() };
    const taken = await Promise.all([1, 2].map(() => shop.take(intakeOf({ customer }))));
    const [one, two] = await Promise.all(taken.map((a) => said<Taken>(a)));
    if (!one || !two) throw new Error('Not taken in.');
    const cookie = await shop.enter(one);
    expect((await shop.get(cookie, `/api/status/${two.number}`)).status).toBe(404);
    const list = await (await shop.get(cookie, '/status')).text();
    expect([list.includes(one.number), list.includes(two.number)]).toEqual([true, false]);
  });
});
