/**
 * Between the two steps of signing in on the page: the password was right, the code is still to come. The browser
 * carries a sealed note of it, so that the password need not be typed again or kept.
 */
import { hashSecret, seal, unseal } from './secrets';
import { openAccount, type Account } from './sign-in';
import type { Runtime } from '../runtime';

const USE = 'half-sign-in';
const LIFE_MS = 5 * 60_000;

type Half = { id: number; password: string; until: number };

/** The note for the form that asks for the code. It is void after five minutes or once the password changes. */
export function sealHalf(app: Runtime, account: Account, now: Date): string {
  const half: Half = {
    id: account.id,
    password: hashSecret(account.passwordHash),
    until: now.getTime() + LIFE_MS,
  };
  return seal(app.settings.secret, USE, JSON.stringify(half));
}

/** The account of a note; null when it is not ours, too old, or no longer true. */
export async function readHalf(app: Runtime, note: string, now: Date): Promise<Account | null> {
  const text = note.length > 1000 ? null : unseal(app.settings.secret, USE, note);
  if (text === null) return null;
  const half = JSON.parse(text) as Half;
  if (half.until < now.getTime()) return null;
  const account = await openAccount(app, { id: half.id });
  return account && hashSecret(account.passwordHash) === half.password ? account : null;
}
