import { and, eq, isNull } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { apiTokens, users } from '@/db/schema/people';
import type { Actor } from './actor';
import { hashSecret } from './secrets';

/** The member of staff a bearer token stands for; null when unknown, revoked or its owner disabled. */
export async function readApiToken(
  db: Queryable,
  header: string,
  now: Date,
): Promise<Actor | null> {
  const token = /^Bearer ([A-Za-z0-9_-]{20,100})$/.exec(header)?.[1];
  if (!token) return null;
  const [row] = await db
    .select({
      tokenId: apiTokens.id,
      scopes: apiTokens.scopes,
      lastUsedAt: apiTokens.lastUsedAt,
      id: users.id,
      name: users.name,
      email: users.email,
      role: users.role,
    })
    .from(apiTokens)
    .innerJoin(users, eq(users.id, apiTokens.userId))
    .where(
      and(
        eq(apiTokens.tokenHash, hashSecret(token)),
        isNull(apiTokens.revokedAt),
        isNull(users.disabledAt),
      ),
    );
  if (!row || row.role === 'customer') return null;
  if (!row.lastUsedAt || now.getTime() - row.lastUsedAt.getTime() > 60_000)
    await db.update(apiTokens).set({ lastUsedAt: now }).where(eq(apiTokens.id, row.tokenId));
  const { id, name, email, role, scopes } = row;
  return { kind: 'staff', id, name, email, role, scopes };
}
