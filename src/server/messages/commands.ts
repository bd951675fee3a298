/** The conversation with the customer, and notes among the staff. */
import { and, eq, isNull, lte } from 'drizzle-orm';
import { inTransaction, type Database, type Queryable } from '@/db/client';
import { customers } from '@/db/schema/shop';
import { messages, ticketNotes } from '@/db/schema/tickets';
import type { CustomerActor, Granted } from '../auth/actor';
import { shopWroteMail } from '../mail/letters';
import { promise } from '../outbox/commands';
import { leaveEvent } from '../tickets/commands';
import type { Shop } from '../tickets/types';

type Ticket = { id: number; number: string; customerId: number };
type Written = { id: number; side: 'customer' | 'shop'; author: string; body: string; at: Date };

/** Marks the customer's messages; `upTo` is the last one that was on the screen: what came later waits on. */
const markSeen = (tx: Queryable, ticketId: number, upTo: number | undefined, now: Date) =>
  tx
    .update(messages)
    .set({ seenAt: now })
    .where(
      and(
        eq(messages.ticketId, ticketId),
        eq(messages.side, 'customer'),
        isNull(messages.seenAt),
        upTo === undefined ? undefined : lte(messages.id, upTo),
      ),
    );

/** The shop writes; the customer is told by mail (never the text itself: mail is not private). */
export async function writeToCustomer(
  db: Database,
  actor: Granted<'ticket.message'>,
  ticket: Ticket,
  body: string,
  shop: Shop,
  now: Date,
  upTo?: number,
): Promise<Written> {
  return inTransaction(db, async (tx) => {
    const [made] = await tx
      .insert(messages)
      .values({
        ticketId: ticket.id,
        side: 'shop',
        authorId: actor.id,
        authorName: actor.name,
        body,
        at: now,
      })
      .$returningId();
    if (!made) throw new Error('The message was not written.');
    await markSeen(tx, ticket.id, upTo, now);
    await leaveEvent(
      tx,
      ticket.id,
      actor,
      { kind: 'message', note: 'to the customer', open: false },
      now,
    );
    const [customer] = await tx.select().from(customers).where(eq(customers.id, ticket.customerId));
    if (customer?.email)
      await promise(
        tx,
        shop.secret,
        `message:${made.id}`,
        {
          kind: 'mail',
          mail: shopWroteMail(shop, { name: customer.name, email: customer.email }, ticket.number),
        },
        now,
      );
    return { id: made.id, side: 'shop', author: actor.name, body, at: now };
  });
}

/** The customer writes; the queue and the ticket show it as waiting for an answer. */
export async function writeToShop(
  db: Database,
  actor: CustomerActor,
  ticket: Ticket,
  body: string,
  now: Date,
): Promise<Written> {
  return inTransaction(db, async (tx) => {
    const [made] = await tx
      .insert(messages)
      .values({
        ticketId: ticket.id,
        side: 'customer',
        authorId: actor.id,
        authorName: actor.name,
        body,
        at: now,
      })
      .$returningId();
    if (!made) throw new Error('The message was not written.');
    await leaveEvent(
      tx,
      ticket.id,
      actor,
      { kind: 'message', note: 'from the customer', open: false },
      now,
    );
    return { id: made.id, side: 'customer', author: actor.name, body, at: now };
  });
}

/** Somebody at the shop has read the customer's messages. */
export async function seeMessages(
  db: Database,
  _actor: Granted<'ticket.message'>,
  ticketId: number,
  upTo: number | undefined,
  now: Date,
): Promise<void> {
  await markSeen(db, ticketId, upTo, now);
}

export async function writeNote(
  db: Database,
  actor: Granted<'ticket.message'>,
  ticketId: number,
  body: string,
  now: Date,
): Promise<{ id: number; author: string; body: string; at: Date }> {
  const [made] = await db
    .insert(ticketNotes)
    .values({ ticketId, authorId: actor.id, authorName: actor.name, body, at: now })
    .$returningId();
  if (!made) throw new Error('The note was not written.');
  return { id: made.id, author: actor.name, body, at: now };
}
