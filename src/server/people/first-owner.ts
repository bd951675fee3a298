/** How a new shop begins: the first owner is invited from the command line, once. */
import { and, eq, isNotNull } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { users } from '@/db/schema/people';
import { record, THE_SHOP } from '../audit/commands';
import { issueOneTime } from '../auth/one-time';
import { done, refuse, type Outcome } from '../refusal';

/**
 * The secret of a one-time link with which the first owner chooses a password. A repeat for the same address
 * before it was used issues a new link.
 */
export async function inviteFirstOwner(
  db: Database,
  { email, name }: { email: string; name: string },
  now: Date,
): Promise<Outcome<string>> {
  return inTransaction(db, async (tx) => {
    const [settled] = await tx
      .select({ id: users.id })
      .from(users)
      .where(and(eq(users.role, 'owner'), isNotNull(users.passwordHash)))
      .for('update');
    if (settled)
      return refuse('conflict', 'An owner exists: they invite people on the page «People».');
    const [waiting] = await tx
      .select({ id: users.id })
      .from(users)
      .where(and(eq(users.role, 'owner'), eq(users.email, email)));
    const [made] = waiting
      ? [waiting]
      : await tx
          .insert(users)
          .values({ email, name, role: 'owner', createdAt: now })
          .$returningId();
    if (!made) throw new Error('The account was not written.');
    const object = `person:${made.id}`;
    await record(
      tx,
      { actor: THE_SHOP, action: 'person.invited', object, detail: { email, role: 'owner' } },
      now,
    );
    return done(await issueOneTime(tx, 'invite', made.id, now));
  });
}
