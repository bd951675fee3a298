import { outbox } from '@/db/schema/outbox';
import { isDuplicate, type Queryable } from '@/db/client';
import { seal } from '../auth/secrets';

export type Mail = { to: string; subject: string; text: string };
/** What the worker knows how to do. */
export type Job =
  | { kind: 'mail'; mail: Mail }
  | { kind: 'photo'; photoId: number }
  /** Somebody asked for a new password: the worker finds out whether there is such an account. */
  | { kind: 'reset'; email: string };

/**
 * Promises a job inside the caller's transaction. `onceKey` names the event ("receipt:2612-0047:1"): a second
 * promise of the same event is ignored.
 */
export async function promise(
  tx: Queryable,
  secret: string,
  onceKey: string,
  job: Job,
  now: Date,
): Promise<void> {
  try {
    await tx.insert(outbox).values({
      kind: job.kind,
      payload: seal(secret, 'outbox', JSON.stringify(job)),
      onceKey,
      dueAt: now,
      createdAt: now,
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
  }
}
