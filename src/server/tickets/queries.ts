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
  type SQL,
} from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { boards, customers, instruments, models } from '@/db/schema/shop';
import { messages, ticketCautions, ticketEvents, ticketNotes, tickets } from '@/db/schema/tickets';
import type { QueueQuery } from '@/contracts/tickets';
import { CLOSED_STAGES, STAGES } from '@/domain/tickets/stages';
import { containing } from '../customers/queries';

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

export type TicketLine = Awaited<ReturnType<typeof queue>>['rows'][number];

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

function order(sort: string): SQL[] {
  const backwards = sort.startsWith('-');
  const way = (column: SQL) => (backwards ? desc(column) : asc(column));
  const stagePlace = sql`FIELD(${tickets.stage}, ${sql.join(
    STAGES.map((s) => sql`${s}`),
    sql`, `,
  )})`;
  const by: Record<string, SQL[]> = {
    // Without a promise a ticket comes after those that have one.
    promised: [asc(sql`${tickets.promisedOn} IS NULL`), way(sql`${tickets.promisedOn}`)],
    received: [way(sql`${tickets.receivedAt}`)],
    number: [way(sql`${tickets.number}`)],
    customer: [way(sql`${customers.name}`)],
    stage: [way(stagePlace)],
  };
  return [...(by[sort.replace('-', '')] ?? []), asc(tickets.id)];
}

/** One page of the queue and how many there are in all. */
export async function queue(
  db: Queryable,
  query: QueueQuery,
  me: number,
  limit: number,
  offset: number,
) {
  const where = conditions(query, me);
  const [rows, [total]] = await Promise.all([
    joined(db)
      .where(where)
      .orderBy(...order(query.sort))
      .limit(limit)
      .offset(offset),
    db
      .select({ n: count() })
      .from(tickets)
      .innerJoin(instruments, eq(instruments.id, tickets.instrumentId))
      .innerJoin(models, eq(models.id, instruments.modelId))
      .innerJoin(customers, eq(customers.id, tickets.customerId))
      .leftJoin(boards, eq(boards.id, tickets.boardId))
      .where(where),
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
