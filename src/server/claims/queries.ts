/**
 * The claim code is kept hashed only; between intake and the printed receipt it travels in a sealed cookie that
 * this ticket's receipt alone is sent, for a quarter of an hour.
 */
import { seal, unseal } from '../auth/secrets';
import type { Settings } from '../settings';

const NAME = 'mw_receipt';

/** The `Set-Cookie` value that carries a fresh claim code to its receipt. */
export function receiptCookie(settings: Settings, number: string, claimCode: string): string {
  const value = seal(settings.secret, 'receipt', JSON.stringify([number, claimCode]));
  const secure = settings.secureCookies ? '; Secure' : '';
  return `${NAME}=${value}; Path=/tickets/${number}/receipt; Max-Age=900; HttpOnly; SameSite=Strict${secure}`;
}

/** The claim code for this ticket's receipt, or null when it is not fresh any more. */
export function receiptCode(
  settings: Settings,
  number: string,
  cookie: string | undefined,
): string | null {
  const text = cookie === undefined ? null : unseal(settings.secret, 'receipt', cookie);
  if (text === null) return null;
  const [of, code] = JSON.parse(text) as [string, string];
  return of === number ? code : null;
}

export const RECEIPT_COOKIE = NAME;
