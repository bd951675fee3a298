import type { CustomerActor } from '../auth/actor';

/** A customer sees their own tickets; one who came in by claim code, that ticket alone. */
export function isOwn(actor: CustomerActor, ticket: { id: number; customerId: number }): boolean {
  return (
    ticket.customerId === actor.customerId &&
    (actor.ticketId === null || actor.ticketId === ticket.id)
  );
}
