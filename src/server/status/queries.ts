/** A ticket as its customer sees it: built field by field, so that nothing internal can slip in. */
import { and, asc, eq } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { photos } from '@/db/schema/photos';
import { tickets } from '@/db/schema/tickets';
import type { Status } from '@/contracts/status';
import { customerCautions } from '@/domain/tickets/customer-cautions';
import { CUSTOMER_HEADLINES, CUSTOMER_HISTORY } from '@/domain/tickets/customer-words';
import { ACCESSORIES } from '@/domain/tickets/vocabulary';
import type { CustomerActor } from '../auth/actor';
import { absent, done, type Outcome } from '../refusal';
import { isOwn } from '../tickets/policy';
import { eventsOf, messagesOf, ticketByNumber, ticketRecord } from '../tickets/queries';

const sharedPhotos = (db: Queryable, ticketId: number) =>
  db
    .select({
      id: photos.publicId,
      caption: photos.caption,
      width: photos.width,
      height: photos.height,
    })
    .from(photos)
    .where(and(eq(photos.ticketId, ticketId), eq(photos.shared, true), eq(photos.state, 'ready')))
    .orderBy(asc(photos.id));

/** The customer's own ticket, or the same refusal as for one that is not there. */
export async function ownStatus(
  db: Queryable,
  actor: CustomerActor,
  number: string,
): Promise<Outcome<Status>> {
  const ticket = await ticketByNumber(db, number);
  if (!ticket || !isOwn(actor, ticket)) return absent('ticket');
  const [record, events, written, shared] = await Promise.all([
    ticketRecord(db, ticket.id),
    eventsOf(db, ticket.id),
    messagesOf(db, ticket.id),
    sharedPhotos(db, ticket.id),
  ]);
  const moves = events.filter((e) => e.open && e.kind === 'step' && e.toStage !== null);
  const { stage } = ticket;
  return done({
    number: ticket.number,
    stage,
    leftAt: moves.at(-1)?.fromStage ?? null,
    headline: CUSTOMER_HEADLINES[stage],
    instrument: { maker: ticket.maker, model: ticket.model, serial: ticket.serial },
    accessories: [
      ...record.accessories.map((a) => ACCESSORIES[a]),
      ...(record.accessoryText ? [record.accessoryText] : []),
    ],
    promisedOn: record.promisedOn,
    history: moves.flatMap((e) =>
      e.toStage === null
        ? []
        : [{ at: e.at.toISOString(), stage: e.toStage, words: CUSTOMER_HISTORY[e.toStage] }],
    ),
    photos: shared.map((p) => ({ ...p, width: p.width ?? 0, height: p.height ?? 0 })),
    estimate:
      record.estimateMinor !== null && record.estimateCurrency !== null
        ? {
            total: { amount: record.estimateMinor, currency: record.estimateCurrency },
            work: record.estimateFor ?? '',
            open: stage === 'estimate-sent',
          }
        : null,
    exception: record.exceptionReason,
    cautions: customerCautions(stage, record.exceptionReason),
    messages: written.map((m) => ({ side: m.side, body: m.body, at: m.at.toISOString() })),
    version: ticket.version,
  });
}

/** The customer's tickets, newest first: all of them, or the one of the claim code. */
export async function ownTickets(db: Queryable, actor: CustomerActor) {
  const rows = await db
    .select({ id: tickets.id, number: tickets.number })
    .from(tickets)
    .where(
      actor.ticketId === null
        ? eq(tickets.customerId, actor.customerId)
        : and(eq(tickets.id, actor.ticketId), eq(tickets.customerId, actor.customerId)),
    )
    .orderBy(asc(tickets.receivedAt));
  const found = await Promise.all(rows.slice(-50).map((r) => ownStatus(db, actor, r.number)));
  return found.flatMap((f) => (f.ok ? [f.value] : [])).reverse();
}
