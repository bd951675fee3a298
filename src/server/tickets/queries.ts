/** Reading tickets: the queue, one ticket, what was written on it. */
import { alias } from 'drizzle-orm/mysql-core';
import {
  and,
  asc,
  count,
  desc,
  eq,
  inArray,
  isNull,
  like,
  not,
  or,
  sql,
  type AnyColumn,
  type SQL,
} from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { boards, customers, instruments, models } from '@/db/schema/shop';
import { messages, ticketCautions, ticketEvents, ticketNotes, tickets } from '@/db/schema/tickets';
import type { QueueQuery } from '@/contracts/tickets';
import { CLOSED_STAGES, STAGES } from '@/domain/tickets/stages';
import { containing } from '../customers/queries';
import { afterPlace, type Held, type Place } from '../http/cursor';

const bench = alias(users, 'bench');

const row = {
  id: tickets.id,
  number: tickets.number,
  stage: tickets.stage,
  stageBefore: tickets.stageBefore,
  version: tickets.version,
  instrumentId: instruments.id,
  serial: instruments.serial,
  maker: models.maker,
  model: models.name,
  category: models.category,
  modelId: models.id,
  boardId: tickets.boardId,
  boardCode: boards.code,
  boardRevision: boards.revision,
  customerId: customers.id,
  customerName: customers.name,
  symptoms: tickets.symptoms,
  incident: tickets.incident,
  assignedId: tickets.assignedTo,
  assignedName: bench.name,
  promisedOn: tickets.promisedOn,
  receivedAt: tickets.receivedAt,
  stageAt: tickets.stageAt,
  unseen:
    sql<number>`(SELECT COUNT(*) FROM ${messages} WHERE ${messages.ticketId} = ${tickets.id} AND ${messages.side} = 'customer' AND ${messages.seenAt} IS NULL)`.mapWith(
      Number,
    ),
};

const joined = (db: Queryable) =>
  db
    .select(row)
    .from(tickets)
    .innerJoin(instruments, eq(instruments.id, tickets.instrumentId))
    .innerJoin(models, eq(models.id, instruments.modelId))
    .innerJoin(customers, eq(customers.id, tickets.customerId))
    .leftJoin(boards, eq(boards.id, tickets.boardId))
    .leftJoin(bench, eq(bench.id, tickets.assignedTo));

export type TicketLine = Awaited<ReturnType<typeof joined>>[number];

function conditions(query: QueueQuery, me: number): SQL | undefined {
  const closed = [...CLOSED_STAGES];
  const pattern = containing(query.q);
  return and(
    query.stage === 'open'
      ? not(inArray(tickets.stage, closed))
      : query.stage === 'closed'
        ? inArray(tickets.stage, closed)
        : query.stage === 'all'
          ? undefined
          : eq(tickets.stage, query.stage),
    query.who === 'mine'
      ? eq(tickets.assignedTo, me)
      : query.who === 'nobody'
        ? isNull(tickets.assignedTo)
        : undefined,
    query.board ? eq(boards.code, query.board) : undefined,
    query.q
      ? or(
          like(tickets.number, pattern),
          like(instruments.serial, pattern),
          like(customers.name, pattern),
          like(sql`CONCAT(${models.maker}, ' ', ${models.name})`, pattern),
          like(tickets.symptomText, pattern),
        )
      : undefined,
  );
}

type Order = { by: AnyColumn | SQL; held: Held; of: (t: TicketLine) => Place['value'] };

/** What the queue is in order of. Without a promise a ticket comes after those that have one, either way. */
function orderOf(sort: string): Order & { descending: boolean } {
  const descending = sort.startsWith('-');
  const never = descending ? '0000-00-00' : '9999-99-99';
  const stages = sql.join(
    STAGES.map((stage) => sql`${stage}`),
    sql`, `,
  );
  const orders: Record<string, Order> = {
    promised: {
      by: sql`COALESCE(CAST(${tickets.promisedOn} AS CHAR), ${never})`,
      held: 'string',
      of: (t) => t.promisedOn ?? never,
    },
    received: { by: tickets.receivedAt, held: 'date', of: (t) => t.receivedAt },
    number: { by: tickets.number, held: 'string', of: (t) => t.number },
    customer: { by: customers.name, held: 'string', of: (t) => t.customerName },
    stage: {
      by: sql`FIELD(${tickets.stage}, ${stages})`,
      held: 'number',
      of: (t) => STAGES.indexOf(t.stage) + 1,
    },
  };
  const order = orders[sort.replace('-', '')];
  if (!order) throw new RangeError(`Order given as ${sort}; one of the queue is needed.`);
  return { ...order, descending };
}

/** What the column holds that the queue is in order of. */
export const heldBy = (sort: string): Held => orderOf(sort).held;

/** A ticket's place in an order of the queue. */
export const placeOfTicket = (sort: string, ticket: TicketLine): Place => ({
  value: orderOf(sort).of(ticket),
  id: ticket.id,
});

/** The tickets that match, in order: from a place on, or from a number of rows on. */
export function queueRows(
  db: Queryable,
  query: QueueQuery,
  me: number,
  part: { limit: number; after?: Place | undefined; offset?: number },
): Promise<TicketLine[]> {
  const { by, descending } = orderOf(query.sort);
  const way = descending ? desc : asc;
  const after = part.after && afterPlace(by, tickets.id, part.after, descending);
  return joined(db)
    .where(and(conditions(query, me), after))
    .orderBy(way(by), way(tickets.id))
    .limit(part.limit)
    .offset(part.offset ?? 0);
}

/** One page of the queue and how many there are in all. */
export async function queue(
  db: Queryable,
  query: QueueQuery,
  me: number,
  limit: number,
  offset: number,
) {
  const [rows, [total]] = await Promise.all([
    queueRows(db, query, me, { limit, offset }),
    db
      .select({ n: count() })
      .from(tickets)
      .innerJoin(instruments, eq(instruments.id, tickets.instrumentId))
      .innerJoin(models, eq(models.id, instruments.modelId))
      .innerJoin(customers, eq(customers.id, tickets.customerId))
      .leftJoin(boards, eq(boards.id, tickets.boardId))
      .where(conditions(query, me)),
  ]);
  return { rows, total: total?.n ?? 0 };
}

/** One ticket by its number, or null. */
export async function ticketByNumber(db: Queryable, number: string) {
  const [found] = await joined(db).where(eq(tickets.number, number));
  return found ?? null;
}
export type TicketFull = NonNullable<Awaited<ReturnType<typeof ticketByNumber>>>;

/** What the intake wrote down and what was agreed. */
export async function ticketRecord(db: Queryable, id: number) {
  const [found] = await db.select().from(tickets).where(eq(tickets.id, id));
  if (!found) throw new Error(`Ticket ${id} is gone.`);
  return found;
}

export const eventsOf = (db: Queryable, ticketId: number) =>
  db
    .select()
    .from(ticketEvents)
    .where(eq(ticketEvents.ticketId, ticketId))
    .orderBy(asc(ticketEvents.at), asc(ticketEvents.id));

export const cautionsOf = (db: Queryable, ticketId: number) =>
  db
    .select({ caution: ticketCautions.caution, at: ticketCautions.at, by: ticketCautions.byName })
    .from(ticketCautions)
    .where(eq(ticketCautions.ticketId, ticketId));

export const messagesOf = (db: Queryable, ticketId: number) =>
  db
    .select({
      id: messages.id,
      side: messages.side,
      author: messages.authorName,
      body: messages.body,
      at: messages.at,
      seenAt: messages.seenAt,
    })
    .from(messages)
    .where(eq(messages.ticketId, ticketId))
    .orderBy(asc(messages.id));

export const notesOf = (db: Queryable, ticketId: number) =>
  db
    .select({
      id: ticketNotes.id,
      author: ticketNotes.authorName,
      body: ticketNotes.body,
      at: ticketNotes.at,
    })
    .from(ticketNotes)
    .where(eq(ticketNotes.ticketId, ticketId))
    .orderBy(asc(ticketNotes.id));

/** Who can be given a ticket. */
export const benchPeople = (db: Queryable) =>
  db
    .select({ id: users.id, name: users.name })
    .from(users)
    .where(and(inArray(users.role, ['technician', 'senior', 'owner']), isNull(users.disabledAt)))
    .orderBy(asc(users.name));

/** Every ticket of an instrument, newest first. */
export const ticketsOfInstrument = (db: Queryable, instrumentId: number) =>
  joined(db)
    .where(eq(tickets.instrumentId, instrumentId))
    .orderBy(desc(tickets.receivedAt))
    .limit(100);

export const ticketsOfCustomer = (db: Queryable, customerId: number) =>
  joined(db).where(eq(tickets.customerId, customerId)).orderBy(desc(tickets.receivedAt)).limit(100);
