/** Limits on guessing. Counters live in MariaDB, so several app processes share them. */
import { RateLimiterMySQL, type RateLimiterRes } from 'rate-limiter-flexible';
import type { Pool } from 'mysql2/promise';
import { refuse, type Refusal } from '../refusal';

const WINDOWS = {
  // What each of these closes, and for whom, is reasoned in guessing.ts.
  /** Wrong passwords for one account from one address. */
  'sign-in': { points: 8, duration: 15 * 60 },
  /** Wrong passwords from one address, whoever is tried. */
  'sign-in-address': { points: 60, duration: 15 * 60 },
  /** Wrong passwords for one account by all strangers. */
  'sign-in-everywhere': { points: 40, duration: 60 * 60 },
  /** Wrong passwords for one account by a browser that signed in to it before. */
  'sign-in-known': { points: 8, duration: 15 * 60 },
  /** The password asked again of somebody who is signed in. */
  confirm: { points: 8, duration: 15 * 60 },
  /** Wrong codes of one account's second factor. */
  totp: { points: 6, duration: 15 * 60 },
  /** Wrong claim codes for one ticket from one address: guesses elsewhere must not keep its owner out. */
  claim: { points: 8, duration: 15 * 60 },
  'claim-address': { points: 40, duration: 15 * 60 },
  /** For one ticket by all strangers: counted to slow them, never refused. */
  'claim-everywhere': { points: 1_000_000_000, duration: 15 * 60 },
  'claim-known': { points: 8, duration: 15 * 60 },
  /** Lines of the audit log about one account or ticket, and about all. */
  'locked-line': { points: 1, duration: 15 * 60 },
  'locked-lines': { points: 60, duration: 60 * 60 },
  /** Mails asked for by one mailbox (reset and one-time links). */
  mail: { points: 4, duration: 60 * 60 },
  'mail-address': { points: 30, duration: 60 * 60 },
  /** Messages of one customer. */
  message: { points: 20, duration: 60 * 60 },
  /** API tokens made by one person. */
  token: { points: 30, duration: 15 * 60 },
} as const;
export type LimitName = keyof typeof WINDOWS;

type Tried = { used: number; refusal: Refusal | null; first: boolean };

export type Limits = ReturnType<typeof makeLimits>;

export function makeLimits(pool: Pool, databaseName: string) {
  const limiters = Object.fromEntries(
    Object.entries(WINDOWS).map(([name, w]) => [
      name,
      new RateLimiterMySQL({
        storeClient: pool.pool,
        dbName: databaseName,
        tableName: 'rate_limits',
        tableCreated: true,
        keyPrefix: name,
        ...w,
      }),
    ]),
  ) as Record<LimitName, RateLimiterMySQL>;

  const keyOf = (subject: string) => subject.toLowerCase().slice(0, 180);
  const refusal = (ms: number): Refusal =>
    refuse('too-many', 'Too many tries: wait, then try again.', {
      retryAfter: Math.max(1, Math.ceil(ms / 1000)),
    });

  /** Takes one try: how many were used with it, a refusal when none was left, and whether that is the first one. */
  async function tryTake(name: LimitName, subject: string): Promise<Tried> {
    const { points } = WINDOWS[name];
    try {
      const { consumedPoints } = await limiters[name].consume(keyOf(subject));
      return { used: consumedPoints, refusal: null, first: false };
    } catch (left) {
      if (left instanceof Error) throw left;
      const { consumedPoints, msBeforeNext } = left as RateLimiterRes;
      return {
        used: consumedPoints,
        refusal: refusal(msBeforeNext),
        first: consumedPoints === points + 1,
      };
    }
  }

  return {
    tryTake,
    /** Takes one try; a refusal when none is left. */
    take: async (name: LimitName, subject: string) => (await tryTake(name, subject)).refusal,
    /** Tries used in the window that runs. */
    used: async (name: LimitName, subject: string) =>
      (await limiters[name].get(keyOf(subject)))?.consumedPoints ?? 0,
    /** After a success the counter starts anew. */
    clear: (name: LimitName, subject: string) => limiters[name].delete(keyOf(subject)),
    /** Gives one try back: it turned out to be no guess. */
    giveBack: (name: LimitName, subject: string) => limiters[name].reward(keyOf(subject)),
  };
}
