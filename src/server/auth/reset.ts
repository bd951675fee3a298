/** A forgotten password: a link by mail, used once. */
import { and, eq, isNotNull, isNull } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { users } from '@/db/schema/people';
import { record } from '../audit/commands';
import { passwordChangedMail, resetMail } from '../mail/staff-letters';
import { sendMail } from '../mail/send';
import { promise } from '../outbox/commands';
import { done, refuse, type Done, type Outcome, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';
import type { Shop } from '../tickets/types';
import { endSessions, revokeTokens } from './end-access';
import { issueOneTime, readOneTime, useOneTime, voidOneTime } from './one-time';
import { hashPassword } from './passwords';
import { newPublicId } from './secrets';

export const linkServed = (): Refusal =>
  refuse('absent', 'This link has served or its time is over: ask for a new one.');

/**
 * Asks for a reset link. Whether there is such an account is looked up later, by the worker, so that neither the
 * answer nor its time tells.
 */
export async function askForReset(
  app: Runtime,
  email: string,
  address: string,
  now: Date,
): Promise<Done<null> | Refusal> {
  const stop =
    (await app.limits.take('mail-address', address)) ?? (await app.limits.take('mail', email));
  if (stop) return stop;
  const onceKey = `reset:${newPublicId()}`;
  await promise(app.db, app.settings.secret, onceKey, { kind: 'reset', email }, now);
  app.worker?.nudge();
  return done(null);
}

const canReset = (email: string) =>
  and(eq(users.staffEmail, email), isNull(users.disabledAt), isNotNull(users.passwordHash));

/** The worker's part: mails a link when there is an account that may sign in. */
export async function sendResetLink(app: Runtime, email: string, now: Date): Promise<void> {
  const [person] = await app.db
    .select({ id: users.id, name: users.name, email: users.email })
    .from(users)
    .where(canReset(email));
  if (!person) return;
  const token = await inTransaction(app.db, (tx) => issueOneTime(tx, 'reset', person.id, now));
  await sendMail(app.settings, resetMail(shopOf(app.settings), person, token));
}

/** Whose password a link resets, for the form; null when it has served. */
export async function readReset(
  db: Database,
  token: string,
  now: Date,
): Promise<{ id: number; email: string } | null> {
  const userId = await readOneTime(db, 'reset', token, now);
  if (userId === null) return null;
  const [person] = await db
    .select({ id: users.id, email: users.email })
    .from(users)
    .where(and(eq(users.id, userId), isNull(users.disabledAt)));
  return person ?? null;
}

/**
 * Sets a new password by a link, ends all sessions of the person and revokes their API tokens: who resets may do so
 * because somebody else had the old one, and a token made with it would outlive it.
 */
export async function resetPassword(
  db: Database,
  input: { token: string; password: string; requestId: string },
  shop: Shop,
  now: Date,
): Promise<Outcome<null>> {
  if (!(await readReset(db, input.token, now))) return linkServed();
  const passwordHash = await hashPassword(input.password);
  return inTransaction(db, async (tx) => {
    const id = await useOneTime(tx, 'reset', input.token, now);
    if (id === null) return linkServed();
    const [person] = await tx
      .select({ id: users.id, name: users.name, email: users.email })
      .from(users)
      .where(and(eq(users.id, id), isNull(users.disabledAt)))
      .for('update');
    if (!person) return linkServed();
    await tx.update(users).set({ passwordHash }).where(eq(users.id, id));
    await endSessions(tx, id);
    const tokensRevoked = await revokeTokens(tx, id, now);
    await voidOneTime(tx, 'reset', id, now);
    const { requestId } = input;
    const detail = { tokensRevoked };
    await record(
      tx,
      { actor: person, action: 'password.reset', object: `person:${id}`, detail, requestId },
      now,
    );
    const mail = passwordChangedMail(shop, person, tokensRevoked);
    await promise(tx, shop.secret, `password:${newPublicId()}`, { kind: 'mail', mail }, now);
    return done(null);
  });
}
