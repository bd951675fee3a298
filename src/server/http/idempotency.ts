/**
 * A repeated POST with the same `Idempotency-Key` and body gets the first one's answer. Key, work and answer stand or
 * fall together, in one transaction: whatever ends the process, the work of a key was done wholly or not at all, and a
 * repeat finds out which. Answers are kept sealed: one may hold a claim code or a token, which stands nowhere else in
 * the database.
 */
import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { inTransaction, isDuplicate, type Database, type Queryable } from '@/db/client';
import { idempotency } from '@/db/schema/outbox';
import { seal, unseal } from '../auth/secrets';
import { refuse, refuseField } from '../refusal';
import { problemResponse } from './problem';

/** Whose request it is, and the secret that its answer is sealed with. */
export type Repeat = { userId: number; key: string; secret: string };
type Asked = { path: string; body: unknown; now: Date };

const USE = 'idempotency';
const TRIES = 3;
const mine = ({ userId, key }: Repeat) =>
  and(eq(idempotency.userId, userId), eq(idempotency.key, key));

const hashOf = ({ path, body }: Asked) =>
  createHash('sha256')
    .update(`${path}\n${JSON.stringify(body)}`)
    .digest('hex');

/** Thrown to undo the work of a request that was refused: its key can be used again. */
class Undone extends Error {
  constructor(readonly response: Response) {
    super('refused');
  }
}

/** Takes the key, waiting for whoever has it in hand; false when its work was done. */
async function takeKey(tx: Queryable, { userId, key }: Repeat, asked: Asked): Promise<boolean> {
  try {
    const row = { userId, key, bodyHash: hashOf(asked), createdAt: asked.now };
    await tx.insert(idempotency).values(row);
    return true;
  } catch (error) {
    if (isDuplicate(error)) return false;
    throw error;
  }
}

async function keep(tx: Queryable, repeat: Repeat, response: Response): Promise<void> {
  const answer = await response.clone().text();
  const { status, headers } = response;
  const sealed = answer && seal(repeat.secret, USE, answer);
  await tx
    .update(idempotency)
    .set({ status, etag: headers.get('etag'), answer: sealed })
    .where(mine(repeat));
}

/** The first request's answer again, or why this is no repeat of it. */
async function answerAgain(db: Queryable, repeat: Repeat, asked: Asked): Promise<Response> {
  const [row] = await db.select().from(idempotency).where(mine(repeat));
  if (row && row.bodyHash !== hashOf(asked))
    return problemResponse(
      refuseField(
        'Idempotency-Key',
        'This Idempotency-Key was used with another body: take a new key.',
      ),
    );
  const answer = row?.answer ? unseal(repeat.secret, USE, row.answer) : '';
  if (!row?.status || answer === null)
    return problemResponse(
      refuse('conflict', 'The first answer with this key cannot be read again: take a new key.'),
    );
  const headers = new Headers({ 'idempotency-replayed': 'true' });
  if (answer) headers.set('content-type', 'application/json');
  if (row.etag) headers.set('etag', row.etag);
  return new Response(answer || null, { status: row.status, headers });
}

/** Does the work, unless it was done for this key before. `work` writes with the database it is given alone. */
export async function onceForKey(
  db: Database,
  repeat: Repeat,
  asked: Asked,
  work: (tx: Database) => Promise<Response>,
): Promise<Response> {
  if (!/^[\x21-\x7e]{1,80}$/.test(repeat.key))
    return problemResponse(
      refuse('bad-request', 'The Idempotency-Key is not 1 to 80 printable characters.'),
    );
  const attempt = () =>
    inTransaction(db, async (tx) => {
      if (!(await takeKey(tx, repeat, asked))) return null;
      const response = await work(tx as unknown as Database);
      if (!response.ok) throw new Undone(response);
      await keep(tx, repeat, response);
      return response;
    });
  for (let tries = 1; ; tries++) {
    try {
      return (await attempt()) ?? (await answerAgain(db, repeat, asked));
    } catch (error) {
      if (error instanceof Undone) return error.response;
      // Somebody wrote the same row meanwhile; this transaction cannot see it, the next one does.
      if (!isDuplicate(error) || tries === TRIES) throw error;
    }
  }
}
