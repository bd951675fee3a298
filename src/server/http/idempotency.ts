/**
 * A repeated POST with the same `Idempotency-Key` and body gets the first one's answer. Answers are kept sealed: one may
 * hold a claim code or a token, which stands nowhere else in the database.
 */
import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { isDuplicate, type Queryable } from '@/db/client';
import { idempotency } from '@/db/schema/outbox';
import { seal, unseal } from '../auth/secrets';
import { refuse, type Refusal } from '../refusal';

export type Kept = { status: number; answer: string; etag: string | null };
/** Whose request it is, and the secret that its answer is sealed with. */
export type Repeat = { userId: number; key: string; secret: string };

const USE = 'idempotency';
const mine = ({ userId, key }: Repeat) =>
  and(eq(idempotency.userId, userId), eq(idempotency.key, key));

const hashBody = (path: string, body: unknown) =>
  createHash('sha256')
    .update(`${path}\n${JSON.stringify(body)}`)
    .digest('hex');

/** `first` when the work is to be done; the kept answer, or a refusal, when it was asked before. */
export async function openRepeatable(
  db: Queryable,
  repeat: Repeat,
  path: string,
  body: unknown,
  now: Date,
): Promise<'first' | Kept | Refusal> {
  const { userId, key, secret } = repeat;
  if (!/^[\x21-\x7e]{1,80}$/.test(key))
    return refuse('bad-request', 'The Idempotency-Key is not 1 to 80 printable characters.');
  const bodyHash = hashBody(path, body);
  try {
    await db.insert(idempotency).values({ userId, key, bodyHash, createdAt: now });
    return 'first';
  } catch (error) {
    if (!isDuplicate(error)) throw error;
  }
  const [row] = await db.select().from(idempotency).where(mine(repeat));
  if (!row)
    return refuse('conflict', 'The first request with this key failed just now: repeat it.');
  if (row.bodyHash !== bodyHash)
    return refuse('invalid', 'This Idempotency-Key was used with another body: take a new key.');
  if (row.status === null)
    return refuse('conflict', 'The first request with this key is still at work: wait for it.');
  const answer = row.answer ? unseal(secret, USE, row.answer) : '';
  if (answer === null)
    return refuse(
      'conflict',
      'The first answer with this key cannot be read again: take a new key.',
    );
  return { status: row.status, answer, etag: row.etag };
}

/** Keeps the answer; a failed first try is forgotten so that it can be repeated. */
export async function closeRepeatable(
  db: Queryable,
  repeat: Repeat,
  kept: Kept | null,
): Promise<void> {
  if (!kept) {
    await db.delete(idempotency).where(mine(repeat));
    return;
  }
  const answer = kept.answer && seal(repeat.secret, USE, kept.answer);
  await db
    .update(idempotency)
    .set({ ...kept, answer })
    .where(mine(repeat));
}
