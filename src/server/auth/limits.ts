/** Limits on guessing. Counters live in MariaDB, so several app processes share them. */
import { RateLimiterMySQL, type RateLimiterRes } from 'rate-limiter-flexible';
import type { Pool } from 'mysql2/promise';
import { refuse, type Refusal } from '../refusal';

const WINDOWS = {
  /** Wrong passwords for one account. */
  'sign-in': { points: 8, duration: 15 * 60 },
  /** Wrong passwords from one address, whoever is tried. */
  'sign-in-address': { points: 60, duration: 15 * 60 },
  /** Wrong codes of one account's second factor. */
  totp: { points: 6, duration: 15 * 60 },
  /** Wrong claim codes for one ticket from one address: guesses elsewhere must not keep its owner out. */
  claim: { points: 8, duration: 15 * 60 },
  /** For one ticket from everywhere; of 30^10 codes so few are nothing. */
  'claim-ticket': { points: 200, duration: 15 * 60 },
  'claim-address': { points: 40, duration: 15 * 60 },
  /** Mails asked for by one mailbox (reset and one-time links). */
  mail: { points: 4, duration: 60 * 60 },
  'mail-address': { points: 30, duration: 60 * 60 },
  /** Messages of one customer. */
  message: { points: 20, duration: 60 * 60 },
  /** API tokens made by one person. */
  token: { points: 30, duration: 15 * 60 },
} as const;
export type LimitName = keyof typeof WINDOWS;

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

  return {
    /** Takes one try; a refusal when none is left. */
    async take(name: LimitName, subject: string): Promise<Refusal | null> {
      try {
        await limiters[name].consume(keyOf(subject));
        return null;
      } catch (left) {
        if (left instanceof Error) throw left;
        return refusal((left as RateLimiterRes).msBeforeNext);
      }
    },
    /** After a success the counter starts anew. */
    clear: (name: LimitName, subject: string) => limiters[name].delete(keyOf(subject)),
    /** Gives one try back: it turned out to be no guess. */
    giveBack: (name: LimitName, subject: string) => limiters[name].reward(keyOf(subject)),
  };
}
