/**
 * The claim code is kept hashed only; between intake and the printed receipt it travels in a sealed cookie that
 * this ticket's receipt alone is sent, for a quarter of an hour.
 */
import { seal, unseal } from '../auth/secrets';
import type { Settings } from '../settings';

const NAME = 'mw_receipt';

/** A claim code in place of an old one: the address it is mailed to, if there is one. */
type Renewed = { mailedTo: string | null };
type Fresh = { code: string; renewed: Renewed | null };

/** The `Set-Cookie` value that carries a fresh claim code to its receipt. */
export function receiptCookie(
  settings: Settings,
  number: string,
  claimCode: string,
  renewed: Renewed | null = null,
): string {
  const value = seal(settings.secret, 'receipt', JSON.stringify([number, claimCode, renewed]));
  const secure = settings.secureCookies ? '; Secure' : '';
  return `${NAME}=${value}; Path=/tickets/${number}/receipt; Max-Age=900; HttpOnly; SameSite=Strict${secure}`;
}

/** The claim code for this ticket's receipt, or null when it is not fresh any more. */
export function freshClaim(
  settings: Settings,
  number: string,
  cookie: string | undefined,
): Fresh | null {
  const text = cookie === undefined ? null : unseal(settings.secret, 'receipt', cookie);
  if (text === null) return null;
  const [of, code, renewed] = JSON.parse(text) as [string, string, Renewed | null | undefined];
  return of === number ? { code, renewed: renewed ?? null } : null;
}

export const RECEIPT_COOKIE = NAME;
