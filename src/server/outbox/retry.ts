import { and, eq, isNull } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { outbox } from '@/db/schema/outbox';
import { record } from '../audit/commands';
import type { Granted } from '../auth/actor';
import { absent, done, type Outcome } from '../refusal';
import { retryable } from './queries';

/** Gives a job that was laid aside, or that waits after a failed try, its tries anew, beginning now. */
export async function retryJob(
  db: Database,
  actor: Granted<'audit.read'>,
  { id, requestId }: { id: number; requestId: string },
  now: Date,
): Promise<Outcome<null>> {
  return inTransaction(db, async (tx) => {
    const [result] = await tx
      .update(outbox)
      .set({ attempts: 0, dueAt: now, deadAt: null })
      .where(and(eq(outbox.id, id), isNull(outbox.doneAt), retryable(now)));
    if (result.affectedRows !== 1) return absent('job to try again');
    await record(tx, { actor, action: 'outbox.retried', object: `job:${id}`, requestId }, now);
    return done(null);
  });
}
