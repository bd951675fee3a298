import { eq } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { tickets } from '@/db/schema/tickets';
import { isClosed } from '@/domain/tickets/stages';
import { grant, type Actor } from '../auth/actor';
import { absent, refuse, type Refusal } from '../refusal';
import type { PhotoGuard } from './types';

/** Why this person may not see the photo; null when they may. A customer is never told that there is one. */
export function refuseView(actor: Actor | null, photo: PhotoGuard | null): Refusal | null {
  if (!actor) return refuse('signed-out', 'You are not signed in, or no longer: sign in first.');
  if (actor.kind === 'staff') {
    const permission = photo && photo.ticketId === null ? 'board.read' : 'ticket.read';
    if (!grant(actor, permission))
      return refuse('not-allowed', 'Your role or token may not do this.');
    return photo ? null : absent('photo');
  }
  const theirs =
    photo !== null &&
    photo.shared &&
    photo.ticketId !== null &&
    photo.customerId === actor.customerId &&
    (actor.ticketId === null || actor.ticketId === photo.ticketId);
  return theirs ? null : absent('photo');
}

/**
 * Photos of a closed ticket stay as they are: they tell how the instrument left. Null where they may be changed, as
 * those of a board file always may; what is dated before the closing belongs to the time before. In a transaction the
 * ticket is not closed before that ends.
 */
export async function refuseClosed(
  db: Queryable,
  { ticketId }: { ticketId: number | null },
  now: Date,
): Promise<Refusal | null> {
  if (ticketId === null) return null;
  const [ticket] = await db
    .select({ stage: tickets.stage, closedAt: tickets.closedAt })
    .from(tickets)
    .where(eq(tickets.id, ticketId))
    .for('update');
  const closed = ticket && isClosed(ticket.stage) && !(ticket.closedAt && now < ticket.closedAt);
  return closed ? refuse('conflict', 'The ticket is closed: its photos stay as they are.') : null;
}
