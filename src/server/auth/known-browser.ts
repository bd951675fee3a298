/**
 * Browsers that signed in before. A sealed cookie names the browser and what it was let in to; it opens nothing, it
 * only takes the browser out of the limits that strangers fill (see guessing.ts).
 */
import type { Settings } from '../settings';
import { hashSecret, newPublicId, seal, unseal } from './secrets';

const NAME = 'mw_known';
const USE = 'known-browser';
const HALF_A_YEAR_S = 182 * 24 * 60 * 60;
/** A bench screen is shared; the oldest entries make room. */
const MOST = 12;

type Note = { browser: string; been: string[] };
/** An account by its e-mail, or a ticket by its number. */
export type Door = { kind: 'sign-in' | 'claim'; subject: string };

const keyOf = ({ kind, subject }: Door) =>
  hashSecret(`${kind}:${subject.toLowerCase()}`).slice(0, 16);

function noteIn(settings: Settings, request: Request): Note | null {
  const header = request.headers.get('cookie') ?? '';
  const sealed = /(?:^|;\s*)mw_known=([\w-]{1,1000})(?:;|$)/.exec(header)?.[1];
  const text = sealed === undefined ? null : unseal(settings.secret, USE, sealed);
  return text === null ? null : (JSON.parse(text) as Note);
}

/** The browser's own name when it came in by this door before; null for a stranger. */
export function knownBrowser(settings: Settings, request: Request, door: Door): string | null {
  const note = noteIn(settings, request);
  return note?.been.includes(keyOf(door)) ? note.browser : null;
}

/** The `Set-Cookie` value by which the browser is known at this door from now on. */
export function rememberBrowser(settings: Settings, request: Request, door: Door): string {
  const before = noteIn(settings, request);
  const key = keyOf(door);
  const note: Note = {
    browser: before?.browser ?? newPublicId(),
    been: [key, ...(before?.been ?? []).filter((other) => other !== key)].slice(0, MOST),
  };
  const value = seal(settings.secret, USE, JSON.stringify(note));
  const secure = settings.secureCookies ? '; Secure' : '';
  return `${NAME}=${value}; Path=/; Max-Age=${HALF_A_YEAR_S}; HttpOnly; SameSite=Lax${secure}`;
}
