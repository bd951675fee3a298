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
