import { and, count, eq, isNotNull, ne } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { photos, pins } from '@/db/schema/photos';
import { customers, instruments, models } from '@/db/schema/shop';
import { readings, tickets } from '@/db/schema/tickets';
import type { IntakeRecord } from '@/domain/tickets/intake-fields';

/** What was written down of a ticket, and the rows that hold it. Null when there is no such ticket. */
export async function writtenDown(db: Queryable, number: string) {
  const [row] = await db
    .select({ ticket: tickets, instrument: instruments, model: models, customer: customers })
    .from(tickets)
    .innerJoin(instruments, eq(instruments.id, tickets.instrumentId))
    .innerJoin(models, eq(models.id, instruments.modelId))
    .innerJoin(customers, eq(customers.id, tickets.customerId))
    .where(eq(tickets.number, number));
  if (!row) return null;
  const { ticket, instrument, model, customer } = row;
  const record: IntakeRecord = {
    name: customer.name,
    email: customer.email ?? '',
    phone: customer.phone ?? '',
    address: customer.address ?? '',
    maker: model.maker,
    model: model.name,
    serial: instrument.serial,
    symptoms: ticket.symptoms,
    symptomText: ticket.symptomText,
    incident: ticket.incident,
    accessories: ticket.accessories,
    accessoryText: ticket.accessoryText,
    condition: ticket.condition,
    promisedOn: ticket.promisedOn ?? '',
  };
  return { ...row, record };
}
export type WrittenDown = NonNullable<Awaited<ReturnType<typeof writtenDown>>>;

/** Whether the instrument has other tickets than this one. */
export async function hasOtherTickets(db: Queryable, instrumentId: number, ticketId: number) {
  const [row] = await db
    .select({ n: count() })
    .from(tickets)
    .where(and(eq(tickets.instrumentId, instrumentId), ne(tickets.id, ticketId)));
  return (row?.n ?? 0) > 0;
}

/** Whether readings or pins of the ticket name points and parts of its board. */
export async function leansOnBoard(db: Queryable, ticketId: number): Promise<boolean> {
  const [read] = await db
    .select({ n: count() })
    .from(readings)
    .where(eq(readings.ticketId, ticketId));
  const [pinned] = await db
    .select({ n: count() })
    .from(pins)
    .innerJoin(photos, eq(photos.id, pins.photoId))
    .where(and(eq(photos.ticketId, ticketId), isNotNull(pins.partId)));
  return (read?.n ?? 0) + (pinned?.n ?? 0) > 0;
}
