import { and, eq, isNull, ne } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { apiTokens, sessions } from '@/db/schema/people';
import { hashSecret } from './secrets';

/** Ends a person's sessions in the change's own transaction; the one of `keep` (a cookie's value) stays. */
export async function endSessions(tx: Queryable, userId: number, keep?: string): Promise<void> {
  const theirs = eq(sessions.userId, userId);
  await tx
    .delete(sessions)
    .where(keep === undefined ? theirs : and(theirs, ne(sessions.id, hashSecret(keep))));
}

/** Ends the sessions that a ticket's claim code opened. */
export async function endClaimSessions(tx: Queryable, ticketId: number): Promise<void> {
  await tx.delete(sessions).where(eq(sessions.ticketId, ticketId));
}

/** Revokes all API tokens of a person; answers how many there were. */
export async function revokeTokens(tx: Queryable, userId: number, now: Date): Promise<number> {
  const [result] = await tx
    .update(apiTokens)
    .set({ revokedAt: now })
    .where(and(eq(apiTokens.userId, userId), isNull(apiTokens.revokedAt)));
  return result.affectedRows;
}
