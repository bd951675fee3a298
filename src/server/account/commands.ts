/** What members of staff do to their own account. */
import { and, eq, sql } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { users } from '@/db/schema/people';
import { record } from '../audit/commands';
import type { Granted } from '../auth/actor';
import { endSessions, revokeTokens } from '../auth/end-access';
import { voidOneTime } from '../auth/one-time';
import { checkPassword, hashPassword } from '../auth/passwords';
import { newPublicId } from '../auth/secrets';
import { passwordChangedMail } from '../mail/staff-letters';
import { promise } from '../outbox/commands';
import { done, refuseField, type Outcome, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';

export type Self = Granted<'account.own'>;

/**
 * Whether this is the person's password, for changes that a borrowed screen must not make. Wrong ones are
 * counted for the person, whom nobody but they can hold up so. Answers with the hash it was checked against.
 */
export async function confirmPassword(
  app: Runtime,
  actor: Self,
  password: string,
): Promise<Outcome<string>> {
  const stop = await app.limits.take('confirm', String(actor.id));
  if (stop) return stop;
  const [row] = await app.db
    .select({ hash: users.passwordHash })
    .from(users)
    .where(eq(users.id, actor.id));
  const hash = row?.hash ?? null;
  if (!(await checkPassword(hash, password)) || hash === null)
    return refuseField('current', 'Not your password: type the one you sign in with.');
  await app.limits.clear('confirm', String(actor.id));
  return done(hash);
}

/** Changes one's own name. */
export async function rename(
  db: Database,
  actor: Self,
  { name, requestId }: { name: string; requestId: string },
  now: Date,
): Promise<Outcome<null>> {
  if (name === actor.name) return done(null);
  return inTransaction(db, async (tx) => {
    await tx
      .update(users)
      .set({ name, version: sql`${users.version} + 1` })
      .where(eq(users.id, actor.id));
    const detail = { from: actor.name, to: name };
    const object = `person:${actor.id}`;
    await record(tx, { actor, action: 'person.renamed', object, detail, requestId }, now);
    return done(null);
  });
}

const changedMeanwhile = (): Refusal =>
  refuseField('current', 'Your password was changed meanwhile: type the new one.');

/**
 * Changes one's own password; the session of `sessionCookie` stays, all others end. API tokens stay valid unless
 * `revoke` says otherwise: a plain change must not stop the programs that work with them.
 */
export async function changePassword(
  app: Runtime,
  actor: Self,
  input: {
    current: string;
    password: string;
    revoke: boolean;
    sessionCookie: string;
    requestId: string;
  },
  now: Date,
): Promise<Outcome<null>> {
  const { sessionCookie, requestId } = input;
  const confirmed = await confirmPassword(app, actor, input.current);
  if (!confirmed.ok) return confirmed;
  const passwordHash = await hashPassword(input.password);
  return inTransaction(app.db, async (tx) => {
    const [result] = await tx
      .update(users)
      .set({ passwordHash })
      .where(and(eq(users.id, actor.id), eq(users.passwordHash, confirmed.value)));
    if (result.affectedRows !== 1) return changedMeanwhile();
    await endSessions(tx, actor.id, sessionCookie);
    const tokensRevoked = input.revoke ? await revokeTokens(tx, actor.id, now) : 0;
    await voidOneTime(tx, 'reset', actor.id, now);
    const object = `person:${actor.id}`;
    const detail = { tokensRevoked };
    await record(tx, { actor, action: 'password.changed', object, detail, requestId }, now);
    const shop = shopOf(app.settings);
    const mail = passwordChangedMail(shop, actor, tokensRevoked);
    await promise(tx, shop.secret, `password:${newPublicId()}`, { kind: 'mail', mail }, now);
    return done(null);
  });
}

/** Ends all sessions of the person, this one too. */
export async function signOutEverywhere(
  db: Database,
  actor: Self,
  requestId: string,
  now: Date,
): Promise<void> {
  await inTransaction(db, async (tx) => {
    await endSessions(tx, actor.id);
    const object = `person:${actor.id}`;
    await record(tx, { actor, action: 'session.ended-everywhere', object, requestId }, now);
  });
}
