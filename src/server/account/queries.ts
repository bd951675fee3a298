import { count, eq, sql } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { apiTokens, users } from '@/db/schema/people';
import { inUse } from '../tokens/queries';

/** What a person sees of their own account. */
export async function readAccount(db: Queryable, id: number) {
  const [row] = await db
    .select({
      name: users.name,
      email: users.email,
      role: users.role,
      secondFactor: sql`(${users.totpSecret} IS NOT NULL)`.mapWith(Boolean),
    })
    .from(users)
    .where(eq(users.id, id));
  const [held] = await db.select({ n: count() }).from(apiTokens).where(inUse(id));
  if (!row) throw new Error('The account of the person signed in is not there.');
  return { ...row, tokens: held?.n ?? 0 };
}
