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

/** Revokes all API tokens of a person. */
export async function revokeTokens(tx: Queryable, userId: number, now: Date): Promise<void> {
  await tx
    .update(apiTokens)
    .set({ revokedAt: now })
    .where(and(eq(apiTokens.userId, userId), isNull(apiTokens.revokedAt)));
}
