/** The second factor: time-based one-time codes (RFC 6238: SHA-1, six digits, steps of 30 s). */
import { Secret, TOTP } from 'otpauth';
import { and, eq, isNotNull, isNull, lt, or } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { unseal } from './secrets';

const STEP_SECONDS = 30;
/** Steps a code may be early or late: the clocks of phones are not exact. */
const WINDOW = 1;

/** A new secret in base 32: 160 bits, the length RFC 4226 recommends. */
export const newTotpSecret = (): string => new Secret({ size: 20 }).base32;

const totpOf = (base32: string, issuer = '', label = '') =>
  new TOTP({
    issuer,
    label,
    secret: Secret.fromBase32(base32),
    algorithm: 'SHA1',
    digits: 6,
    period: STEP_SECONDS,
  });

/** The `otpauth://` address an authenticator app reads from a QR code. */
export const totpAddress = (base32: string, issuer: string, email: string): string =>
  totpOf(base32, issuer, email).toString();

/** The time step whose code this is, at most one step off; null when it is none of them. */
export function stepOfCode(base32: string, code: string, now: Date): number | null {
  const totp = totpOf(base32);
  const timestamp = now.getTime();
  const delta = totp.validate({ token: code, timestamp, window: WINDOW });
  return delta === null ? null : totp.counter({ timestamp }) + delta;
}

/** Takes a code of an account whose second factor is on. True once for each code, and never for an older one. */
export async function takeCode(
  db: Queryable,
  secret: string,
  account: { id: number; totpSecret: string },
  code: string,
  now: Date,
): Promise<boolean> {
  const base32 = unseal(secret, 'totp', account.totpSecret);
  if (base32 === null) return false;
  const step = stepOfCode(base32, code, now);
  if (step === null) return false;
  const [result] = await db
    .update(users)
    .set({ totpLastStep: step })
    .where(
      and(
        eq(users.id, account.id),
        isNotNull(users.totpSecret),
        or(isNull(users.totpLastStep), lt(users.totpLastStep, step)),
      ),
    );
  return result.affectedRows === 1;
}
