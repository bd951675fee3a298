/** Lines of the audit log about guessing that was stopped. */
import { eq } from 'drizzle-orm';
import { users } from '@/db/schema/people';
import { tickets } from '@/db/schema/tickets';
import { record, THE_SHOP } from '../audit/commands';
import type { Runtime } from '../runtime';
import type { Door } from './known-browser';

type About = { from: string; what: string; requestId: string };

async function objectOf({ db }: Runtime, { kind, subject }: Door): Promise<string | null> {
  if (kind === 'claim') {
    const found = await db.$count(tickets, eq(tickets.number, subject));
    return found > 0 ? `ticket:${subject}` : null;
  }
  const [person] = await db
    .select({ id: users.id })
    .from(users)
    .where(eq(users.staffEmail, subject));
  return person ? `person:${person.id}` : null;
}

/**
 * Leaves a line for the owner, one for each account or ticket in a quarter of an hour. Guesses at what is not there
 * leave none, and there are 60 lines an hour at most: strangers must not be able to fill the log.
 */
export async function tellLocked(app: Runtime, door: Door, about: About, now: Date): Promise<void> {
  const { from, what, requestId } = about;
  app.log.warn({ door: door.kind, from, what }, 'tries stopped');
  const object = await objectOf(app, door);
  if (object === null) return;
  if (await app.limits.take('locked-line', object)) return;
  if (await app.limits.take('locked-lines', 'all')) return;
  const action = door.kind === 'claim' ? 'claim.locked' : 'session.locked';
  const detail = { 'too many wrong tries by': what, from };
  await record(app.db, { actor: THE_SHOP, action, object, detail, requestId }, now);
}
