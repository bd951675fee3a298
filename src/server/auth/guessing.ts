/**
 * Guessing at the two doors: passwords of accounts, claim codes of tickets. Counters must stop guessers and must not
 * become a way to keep the owner of the secret out. So what is counted, and for whom it closes, differs:
 *
 * - One address on one account or ticket: 8 wrong tries in a quarter of an hour, then that address waits. One address
 *   over all of them: 60 passwords, 40 claim codes. An IPv6 address counts by its /64, which one subscriber holds whole.
 * - A browser that came in by this door before is known (known-browser.ts): none of the strangers' counters apply to
 *   it, it has 8 tries of its own. Strangers therefore never keep it out.
 * - One ticket over all strangers' addresses: never refused, only slowed (`slowness`), so that the right code always
 *   opens. There are 30^10 = 5.9e14 codes, drawn evenly (secrets.ts): a hundred thousand addresses at 8 tries a quarter
 *   of an hour make 7.7e7 tries a day, and half the codes take 10 500 years; against any of a thousand tickets at once,
 *   at 40 tries an address, the first hit is expected after 4 200 years.
 * - One account over all strangers' addresses: slowed, and after 40 wrong tries in an hour closed to strangers until
 *   the hour is over. People choose passwords, so slowness alone would not do: this leaves 350 400 tries a year, about
 *   as many as 8 in a quarter of an hour, whoever has how many addresses. A random password of 8 lower-case letters
 *   (2.1e11, half of them) would last 298 000 years, twelve are asked for; one of the few hundred thousand most used
 *   would not last, which is what the second factor is for. Its owner, at a new browser in that hour, comes in by a
 *   reset link: the mailbox is proof enough to make the browser known.
 */
import { setTimeout as pause } from 'node:timers/promises';
import { done, type Outcome, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { knownBrowser, type Door } from './known-browser';
import type { LimitName } from './limits';
import { tellLocked } from './locked';

export type Asker = { request: Request; address: string; requestId: string };
type Counted = [LimitName, string];

const FREE = 10;
const SLOWEST_MS = 5_000;
/** Answers held back at once by this process; more would tie up the shop for a guesser’s sake. */
const MOST_HELD = 50;
let held = 0;

/** How long an answer is held back, in ms, at the n-th wrong try: nothing up to ten, then doubling every ten, to 5 s. */
export const slowness = (n: number): number =>
  n <= FREE ? 0 : Math.min(SLOWEST_MS, Math.round(100 * 2 ** ((n - FREE) / 10)));

async function slowDown(n: number): Promise<void> {
  const ms = slowness(n);
  if (ms === 0 || held >= MOST_HELD) return;
  held += 1;
  await pause(ms).finally(() => (held -= 1));
}

/** Where a try is counted from: an IPv4 address, or the /64 of an IPv6 one. */
export function addressBlock(address: string): string {
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address)?.[1];
  if (mapped) return mapped;
  if (!/^[0-9a-f:]+(%.*)?$/i.test(address) || !address.includes(':')) return address;
  const [head = '', tail] = address.replace(/%.*$/, '').split('::');
  const left = head.split(':').filter(Boolean);
  const right = (tail ?? '').split(':').filter(Boolean);
  const gap = tail === undefined ? 0 : Math.max(0, 8 - left.length - right.length);
  const groups = [...left, ...Array<string>(gap).fill('0'), ...right];
  return `${groups
    .slice(0, 4)
    .map((group) => parseInt(group, 16).toString(16))
    .join(':')}::/64`;
}

/**
 * Counts a try before it is judged, whether or not there is such an account or ticket. A refusal when none is left;
 * else what to call when the try was right, which uncounts it.
 */
export async function takeGuess(
  app: Runtime,
  door: Door,
  asker: Asker,
  now: Date,
): Promise<Outcome<() => Promise<void>>> {
  const { limits, settings } = app;
  const { kind, subject } = door;
  const from = addressBlock(asker.address);
  const browser = knownBrowser(settings, asker.request, door);
  const { requestId } = asker;
  const locked = async (counted: Counted, what: string): Promise<Refusal | null> => {
    const { refusal, first } = await limits.tryTake(...counted);
    if (refusal && first) await tellLocked(app, door, { requestId, from, what }, now);
    return refusal;
  };
  if (browser !== null) {
    const own: Counted = [`${kind}-known`, `${subject} ${browser}`];
    const stop = await locked(own, 'a known browser');
    return stop ?? done(() => limits.clear(...own).then(() => undefined));
  }
  const address: Counted = [`${kind}-address`, from];
  const here: Counted = [kind, `${subject} ${from}`];
  const everywhere: Counted = [`${kind}-everywhere`, subject];
  const stop =
    (await locked(address, 'one address, whoever is tried')) ??
    (await locked(here, 'one address')) ??
    (await locked(everywhere, 'all addresses'));
  if (stop) return stop;
  await slowDown(await limits.used(...everywhere));
  return done(async () => {
    await limits.giveBack(...address);
    await limits.giveBack(...everywhere);
    await limits.clear(...here);
  });
}
