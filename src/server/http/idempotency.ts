/** A repeated POST with the same `Idempotency-Key` and body gets the first one's answer. */
import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { isDuplicate, type Queryable } from '@/db/client';
import { idempotency } from '@/db/schema/outbox';
import { refuse, type Refusal } from '../refusal';

export type Kept = { status: number; answer: string; etag: string | null };

const hashBody = (path: string, body: unknown) =>
  createHash('sha256')
    .update(`${path}\n${JSON.stringify(body)}`)
    .digest('hex');

/** `first` when the work is to be done; the kept answer, or a refusal, when it was asked before. */
export async function openRepeatable(
  db: Queryable,
  userId: number,
  key: string,
  path: string,
  body: unknown,
  now: Date,
): Promise<'first' | Kept | Refusal> {
  if (!/^[\x21-\x7e]{1,80}$/.test(key))
    return refuse('bad-request', 'The Idempotency-Key is not 1 to 80 printable characters.');
  const bodyHash = hashBody(path, body);
  try {
    await db.insert(idempotency).values({ userId, key, bodyHash, createdAt: now });
    return 'first';
  } catch (error) {
    if (!isDuplicate(error)) throw error;
  }
  const [row] = await db
    .select()
    .from(idempotency)
    .where(and(eq(idempotency.userId, userId), eq(idempotency.key, key)));
  if (!row)
    return refuse('conflict', 'The first request with this key failed just now: repeat it.');
  if (row.bodyHash !== bodyHash)
    return refuse('invalid', 'This Idempotency-Key was used with another body: take a new key.');
  if (row.status === null)
    return refuse('conflict', 'The first request with this key is still at work: wait for it.');
  return { status: row.status, answer: row.answer ?? '', etag: row.etag };
}

/** Keeps the answer; a failed first try is forgotten so that it can be repeated. */
export async function closeRepeatable(
  db: Queryable,
  userId: number,
  key: string,
  kept: Kept | null,
): Promise<void> {
  const mine = and(eq(idempotency.userId, userId), eq(idempotency.key, key));
  if (kept) await db.update(idempotency).set(kept).where(mine);
  else await db.delete(idempotency).where(mine);
}
