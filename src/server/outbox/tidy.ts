import { and, isNotNull, lt, or } from 'drizzle-orm';
import { idempotency, outbox } from '@/db/schema/outbox';
import { oneTimeTokens, rateLimits } from '@/db/schema/people';
import { sweepPhotos } from '../photos/sweep';
import type { Runtime } from '../runtime';

const DAY = 86_400_000;

/** Removes what has served: old answers, used tokens, done jobs, ended sessions, run-out counters, abandoned uploads. */
export async function tidy(app: Runtime, now: Date): Promise<void> {
  const daysAgo = (days: number) => new Date(now.getTime() - days * DAY);
  await app.db.delete(idempotency).where(lt(idempotency.createdAt, daysAgo(1)));
  await app.db
    .delete(oneTimeTokens)
    .where(or(lt(oneTimeTokens.expiresAt, daysAgo(1)), lt(oneTimeTokens.usedAt, daysAgo(1))));
  await app.db.delete(outbox).where(and(isNotNull(outbox.doneAt), lt(outbox.doneAt, daysAgo(30))));
  await app.db.delete(rateLimits).where(lt(rateLimits.expire, now.getTime()));
  await app.sessions.sweep();
  await sweepPhotos(app, now);
}
