/** Reading the API tokens of one member of staff. */
import { and, asc, eq, isNull } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { apiTokens } from '@/db/schema/people';
import type { ApiToken } from '@/contracts/tokens';

/** A person's tokens that were not revoked. */
export const inUse = (userId: number) =>
  and(eq(apiTokens.userId, userId), isNull(apiTokens.revokedAt));

export async function listTokens(db: Queryable, userId: number): Promise<ApiToken[]> {
  const rows = await db
    .select()
    .from(apiTokens)
    .where(inUse(userId))
    .orderBy(asc(apiTokens.createdAt), asc(apiTokens.id));
  return rows.map(({ id, name, hint, scopes, createdAt, lastUsedAt }) => ({
    id,
    name,
    hint,
    scopes,
    createdAt: createdAt.toISOString(),
    lastUsedAt: lastUsedAt?.toISOString() ?? null,
  }));
}
