/**
 * The worker of one process: takes due jobs row by row (`FOR UPDATE SKIP LOCKED`, so any number of processes may
 * run), does them outside any request, tries again with growing pauses, and lays the hopeless ones aside.
 */
import { and, asc, eq, isNull, lte } from 'drizzle-orm';
import { outbox } from '@/db/schema/outbox';
import { sendResetLink } from '../auth/reset';
import { unseal } from '../auth/secrets';
import { sendMail } from '../mail/send';
import { finishPhoto } from '../photos/finish';
import type { Runtime } from '../runtime';
import type { Job } from './commands';
import { LEASE_MS, pauseMs, TRIES } from './pace';
import { tidy } from './tidy';

/** Takes one due job: it is leased for a minute, so a worker that dies gives it back by itself. */
async function takeJob(app: Runtime, now: Date) {
  return app.db.transaction(async (tx) => {
    const [row] = await tx
      .select()
      .from(outbox)
      .where(and(isNull(outbox.doneAt), isNull(outbox.deadAt), lte(outbox.dueAt, now)))
      .orderBy(asc(outbox.dueAt))
      .limit(1)
      .for('update', { skipLocked: true });
    if (!row) return null;
    await tx
      .update(outbox)
      .set({ attempts: row.attempts + 1, dueAt: new Date(now.getTime() + LEASE_MS) })
      .where(eq(outbox.id, row.id));
    return row;
  });
}

async function perform(app: Runtime, job: Job): Promise<void> {
  if (job.kind === 'mail') await sendMail(app.settings, job.mail);
  else if (job.kind === 'reset') await sendResetLink(app, job.email, new Date());
  // A refused photo is a finished job too; only a store that fails brings it back.
  else await finishPhoto(app, job.photoId, new Date());
}

/** Does one due job; false when there was none. */
export async function workOnce(app: Runtime, now: Date): Promise<boolean> {
  const row = await takeJob(app, now);
  if (!row) return false;
  const mine = eq(outbox.id, row.id);
  try {
    const text = unseal(app.settings.secret, 'outbox', row.payload);
    if (text === null) throw new Error('The job cannot be opened: was APP_SECRET changed?');
    await perform(app, JSON.parse(text) as Job);
    // The payload may hold a claim code or a link: it goes as soon as it has served.
    await app.db
      .update(outbox)
      .set({ doneAt: new Date(), payload: '', lastError: null })
      .where(mine);
  } catch (error) {
    const attempts = row.attempts + 1;
    const dead = attempts >= TRIES;
    const lastError = (error instanceof Error ? error.message : String(error)).slice(0, 500);
    app.log[dead ? 'error' : 'warn'](
      { job: row.id, kind: row.kind, attempts, lastError },
      'job failed',
    );
    await app.db
      .update(outbox)
      .set({
        lastError,
        ...(dead ? { deadAt: new Date() } : { dueAt: new Date(Date.now() + pauseMs(attempts)) }),
      })
      .where(mine);
  }
  return true;
}

export type Worker = { nudge(): void; stop(): Promise<void> };

/** Starts the loop: looks every second, at once when nudged, and tidies up every ten minutes. */
export function startWorker(app: Runtime): Worker {
  let timer: NodeJS.Timeout | undefined;
  let running: Promise<void> | null = null;
  let stopped = false;
  let tidied = 0;

  async function run(): Promise<void> {
    while (!stopped && (await workOnce(app, new Date())));
    if (!stopped && Date.now() - tidied > 600_000) {
      tidied = Date.now();
      await tidy(app, new Date());
    }
  }
  function nudge(): void {
    if (stopped || running) return;
    clearTimeout(timer);
    running = run()
      .catch((error: unknown) => app.log.error({ err: error }, 'worker failed'))
      .finally(() => {
        running = null;
        if (!stopped) timer = setTimeout(nudge, 1000).unref();
      });
  }
  nudge();
  return {
    nudge,
    async stop() {
      stopped = true;
      clearTimeout(timer);
      await running;
    },
  };
}
