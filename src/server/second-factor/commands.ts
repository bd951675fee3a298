/** Turning one's own second factor on and off. */
import { and, eq, isNotNull, isNull } from 'drizzle-orm';
import { inTransaction } from '@/db/client';
import { users } from '@/db/schema/people';
import { record } from '../audit/commands';
import { endSessions } from '../auth/end-access';
import { seal, unseal } from '../auth/secrets';
import { newTotpSecret, stepOfCode, totpAddress } from '../auth/totp';
import { done, refuse, refuseField, type Outcome } from '../refusal';
import type { Runtime } from '../runtime';
import { confirmPassword, type Self } from '../account/commands';

const USE = 'totp-offer';
const LIFE_MS = 30 * 60_000;

type Offered = { userId: number; base32: string; until: number };

/** A secret offered to one person: to scan, to type, and sealed for the form that confirms it. */
export type Offer = { address: string; typed: string; sealed: string };

const offerOf = (app: Runtime, actor: Self, base32: string, sealed: string): Offer => ({
  address: totpAddress(base32, app.settings.shop.name, actor.email),
  typed: base32.match(/.{1,4}/g)?.join(' ') ?? base32,
  sealed,
});

/** Offers a new secret. Nothing is kept until a code of it is given. */
export function offerSecret(app: Runtime, actor: Self, now: Date): Offer {
  const base32 = newTotpSecret();
  const offered: Offered = { userId: actor.id, base32, until: now.getTime() + LIFE_MS };
  return offerOf(app, actor, base32, seal(app.settings.secret, USE, JSON.stringify(offered)));
}

function open(app: Runtime, actor: Self, sealed: string, now: Date): Offered | null {
  const text = unseal(app.settings.secret, USE, sealed);
  if (text === null) return null;
  const offered = JSON.parse(text) as Offered;
  return offered.userId === actor.id && offered.until >= now.getTime() ? offered : null;
}

/** The same offer again, for a form that came back; a new one when it is too old. */
export function offerAgain(app: Runtime, actor: Self, sealed: string, now: Date): Offer {
  const offered = open(app, actor, sealed, now);
  return offered ? offerOf(app, actor, offered.base32, sealed) : offerSecret(app, actor, now);
}

/** Turns it on: the password, and a code that shows the app has the secret. Other sessions end. */
export async function turnOn(
  app: Runtime,
  actor: Self,
  input: {
    current: string;
    code: string;
    sealed: string;
    sessionCookie: string;
    requestId: string;
  },
  now: Date,
): Promise<Outcome<null>> {
  const confirmed = await confirmPassword(app, actor, input.current);
  if (!confirmed.ok) return confirmed;
  const offered = open(app, actor, input.sealed, now);
  if (!offered)
    return refuse('conflict', 'The secret shown was half an hour old: here is a new one to scan.');
  const stop = await app.limits.take('totp', String(actor.id));
  if (stop) return stop;
  const step = stepOfCode(offered.base32, input.code, now);
  if (step === null)
    return refuseField('code', 'Not the code of this secret now: check the clock of your phone.');
  await app.limits.clear('totp', String(actor.id));
  return inTransaction(app.db, async (tx) => {
    const [result] = await tx
      .update(users)
      .set({ totpSecret: seal(app.settings.secret, 'totp', offered.base32), totpLastStep: step })
      .where(and(eq(users.id, actor.id), isNull(users.totpSecret)));
    if (result.affectedRows !== 1)
      return refuse('conflict', 'Your second factor is on already: turn it off first.');
    await endSessions(tx, actor.id, input.sessionCookie);
    const object = `person:${actor.id}`;
    const { requestId } = input;
    await record(tx, { actor, action: 'second-factor.turned-on', object, requestId }, now);
    return done(null);
  });
}

/** Turns it off, by password. */
export async function turnOff(
  app: Runtime,
  actor: Self,
  { current, requestId }: { current: string; requestId: string },
  now: Date,
): Promise<Outcome<null>> {
  const confirmed = await confirmPassword(app, actor, current);
  if (!confirmed.ok) return confirmed;
  return inTransaction(app.db, async (tx) => {
    const [result] = await tx
      .update(users)
      .set({ totpSecret: null, totpLastStep: null })
      .where(and(eq(users.id, actor.id), isNotNull(users.totpSecret)));
    if (result.affectedRows !== 1) return done(null);
    const object = `person:${actor.id}`;
    await record(tx, { actor, action: 'second-factor.turned-off', object, requestId }, now);
    return done(null);
  });
}
