/** What the outbox still holds. The payload is never read here: it may hold a claim code or a link. */
import { and, asc, count, desc, gt, isNotNull, isNull, or, sql, type SQL } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { outbox } from '@/db/schema/outbox';
import { LEASE_MS } from './pace';

const shown = {
  id: outbox.id,
  kind: outbox.kind,
  attempts: outbox.attempts,
  createdAt: outbox.createdAt,
  dueAt: outbox.dueAt,
  deadAt: outbox.deadAt,
  lastError: outbox.lastError,
};
const STATES = {
  /** Waiting for its time, or for the worker. */
  waiting: and(isNull(outbox.doneAt), isNull(outbox.deadAt)),
  /** Laid aside after ten tries. */
  aside: and(isNull(outbox.doneAt), isNotNull(outbox.deadAt)),
} as const;
export type JobState = keyof typeof STATES;
export type JobRow = Awaited<ReturnType<typeof listJobs>>[number];

/**
 * What may be tried again at once: a job laid aside, or one that pauses after a failed try. One that is due within a
 * lease may be in a worker's hands, and comes soon anyway.
 */
export const retryable = (now: Date): SQL | undefined =>
  or(
    isNotNull(outbox.deadAt),
    and(isNotNull(outbox.lastError), gt(outbox.dueAt, new Date(now.getTime() + LEASE_MS))),
  );

/** Jobs in one state: those laid aside newest first, those waiting by their time. */
export async function listJobs(
  db: Queryable,
  state: JobState,
  now: Date,
  part: { limit: number; offset: number },
) {
  const order = state === 'aside' ? desc(outbox.deadAt) : asc(outbox.dueAt);
  const columns = { ...shown, retryable: sql`COALESCE(${retryable(now)}, 0)`.mapWith(Boolean) };
  return db
    .select(columns)
    .from(outbox)
    .where(STATES[state])
    .orderBy(order, asc(outbox.id))
    .limit(part.limit)
    .offset(part.offset);
}

export async function countJobs(db: Queryable, state: JobState): Promise<number> {
  const [row] = await db.select({ n: count() }).from(outbox).where(STATES[state]);
  return row?.n ?? 0;
}
