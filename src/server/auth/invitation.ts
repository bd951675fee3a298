/** Taking up an invitation: the link shows whom it is for, the form sets the password, once. */
import { and, eq, isNull, sql } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { users } from '@/db/schema/people';
import { record } from '../audit/commands';
import { done, type Outcome } from '../refusal';
import { readOneTime, useOneTime } from './one-time';
import { hashPassword } from './passwords';
import { linkServed } from './reset';
import { openAccount, type Account } from './sign-in';
import type { Runtime } from '../runtime';

const invited = (id: number) =>
  and(eq(users.id, id), isNull(users.disabledAt), isNull(users.passwordHash));

/** Who is invited by this link; null when it has served. */
export async function readInvitation(db: Database, token: string, now: Date) {
  const id = await readOneTime(db, 'invite', token, now);
  if (id === null) return null;
  const [person] = await db
    .select({ name: users.name, email: users.email, role: users.role })
    .from(users)
    .where(invited(id));
  return person ?? null;
}

/** Uses the link: the account gets its name and password. Answers with the account, ready to sign in. */
export async function takeUpInvitation(
  app: Runtime,
  input: { token: string; name: string; password: string; requestId: string },
  now: Date,
): Promise<Outcome<Account>> {
  const { token, name, requestId } = input;
  if (!(await readInvitation(app.db, token, now))) return linkServed();
  const passwordHash = await hashPassword(input.password);
  const id = await inTransaction(app.db, async (tx) => {
    const userId = await useOneTime(tx, 'invite', token, now);
    if (userId === null) return null;
    const [changed] = await tx
      .update(users)
      .set({ name, passwordHash, version: sql`${users.version} + 1` })
      .where(invited(userId));
    if (changed.affectedRows !== 1) return null;
    const actor = { id: userId, name };
    await record(
      tx,
      { actor, action: 'person.joined', object: `person:${userId}`, requestId },
      now,
    );
    return userId;
  });
  const account = id === null ? null : await openAccount(app, { id });
  return account ? done(account) : linkServed();
}
