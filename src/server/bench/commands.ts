/** Writing the bench sheet. Readings are kept as typed, with what the parser made of them. */
import { and, count, eq, ne, type SQL } from 'drizzle-orm';
import type { EditReading, NewReading } from '@/contracts/bench';
import { MAX_READINGS } from '@/contracts/compute';
import { inTransaction, type Database, type Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { readings, tickets } from '@/db/schema/tickets';
import { parseResistance } from '@/domain/quantities/parse';
import { isClosed } from '@/domain/tickets/stages';
import { CAUTION_CODES } from '@/domain/tickets/vocabulary';
import type { Granted } from '../auth/actor';
import { absent, done, refuse, refuseField, type Outcome, type Refusal } from '../refusal';
import { cautionsOf } from '../tickets/queries';
import type { TicketHead } from '../tickets/types';
import { asBenchReading } from './queries';

type Written = ReturnType<typeof asBenchReading>;

/**
 * Locks the ticket's row until the transaction ends, so that the sheet of a ticket that is just being closed, or is
 * just full, does not change. Refuses a closed ticket.
 */
async function lockOpen(tx: Queryable, { id }: TicketHead): Promise<Refusal | null> {
  const [now] = await tx
    .select({ stage: tickets.stage })
    .from(tickets)
    .where(eq(tickets.id, id))
    .for('update');
  if (!now) return absent('ticket');
  return isClosed(now.stage)
    ? refuse('conflict', 'The ticket is closed: its bench sheet stays as it is.')
    : null;
}

/** Readings wait for the cautions, and stop when the ticket is closed. */
async function sheetRefusal(tx: Queryable, ticket: TicketHead): Promise<Refusal | null> {
  const closed = await lockOpen(tx, ticket);
  if (closed) return closed;
  const ticked = await cautionsOf(tx, ticket.id);
  return ticked.length < CAUTION_CODES.length
    ? refuse('conflict', 'The cautions are not all ticked: tick them first, then enter readings.')
    : null;
}

/** A phase holds so many readings; `except` is the one being moved into it. */
async function fullRefusal(
  tx: Queryable,
  ticketId: number,
  phase: EditReading['phase'],
  except = 0,
): Promise<Refusal | null> {
  const [held] = await tx
    .select({ n: count() })
    .from(readings)
    .where(
      and(eq(readings.ticketId, ticketId), eq(readings.phase, phase), ne(readings.id, except)),
    );
  return (held?.n ?? 0) < MAX_READINGS
    ? null
    : refuse('too-large', `The sheet holds ${MAX_READINGS} readings: strike one first.`, {
        errors: [{ path: 'readings', message: `${MAX_READINGS} held, no more are taken` }],
      });
}

type Where = Pick<EditReading, 'from' | 'to' | 'part' | 'typed'>;

/** The numbers behind what was typed, or which field is wrong. */
function parsed(
  input: Where,
): Outcome<{ ohms: number | null; overRange: boolean; resolution: number | null }> {
  if (input.part === null && (input.from === null || input.to === null))
    return refuseField(
      input.from === null ? 'from' : 'to',
      'One point is missing: give two points, or one part.',
    );
  if (input.part === null && input.from === input.to)
    return refuseField('to', 'Both points are the same: give two different points.');
  const value = parseResistance(input.typed);
  // A reason names what the text could be by itself.
  if (!value.ok) return refuseField('typed', `${value.reason}.`);
  return value.kind === 'over-range'
    ? done({ ohms: null, overRange: true, resolution: null })
    : done({ ohms: value.ohms, overRange: false, resolution: value.resolution });
}

const columnsOf = (input: EditReading) => ({
  phase: input.phase,
  place: input.place,
  fromNet: input.part === null ? input.from : null,
  toNet: input.part === null ? input.to : null,
  partRef: input.part,
  position: input.position,
  lifted: input.lifted,
  typed: input.typed,
});

/** Enters a reading; the same client key again answers the row that is there. */
export async function enterReading(
  db: Database,
  actor: Granted<'ticket.bench'>,
  ticket: TicketHead,
  input: NewReading,
  now: Date,
): Promise<Outcome<Written>> {
  const value = parsed(input);
  return inTransaction(db, async (tx): Promise<Outcome<Written>> => {
    const refusal = await sheetRefusal(tx, ticket);
    if (refusal) return refusal;
    const entered = () => readingWhere(tx, ticket.id, eq(readings.clientKey, input.clientKey));
    const before = await entered();
    if (before) return done(before);
    if (!value.ok) return value;
    const full = await fullRefusal(tx, ticket.id, input.phase);
    if (full) return full;
    await tx.insert(readings).values({
      ticketId: ticket.id,
      clientKey: input.clientKey,
      ...columnsOf(input),
      ...value.value,
      createdBy: actor.id,
      createdAt: now,
    });
    const written = await entered();
    if (!written) throw new Error('The reading was not written.');
    return done(written);
  });
}

const stale = (current: Written) =>
  refuse('stale', 'Somebody changed this reading meanwhile: both are shown.', {
    more: { current },
  });

async function readingWhere(db: Queryable, ticketId: number, which: SQL) {
  const [row] = await db
    .select({ reading: readings, by: users.name })
    .from(readings)
    .innerJoin(users, eq(users.id, readings.createdBy))
    .where(and(eq(readings.ticketId, ticketId), which));
  return row ? asBenchReading(row.reading, row.by) : null;
}

/** Corrects a reading, made from `version`. */
export async function correctReading(
  db: Database,
  _actor: Granted<'ticket.bench'>,
  ticket: TicketHead,
  id: number,
  version: number,
  input: EditReading,
): Promise<Outcome<Written>> {
  const value = parsed(input);
  return inTransaction(db, async (tx): Promise<Outcome<Written>> => {
    const refusal = await sheetRefusal(tx, ticket);
    if (refusal) return refusal;
    if (!value.ok) return value;
    const full = await fullRefusal(tx, ticket.id, input.phase, id);
    if (full) return full;
    const [changed] = await tx
      .update(readings)
      .set({ ...columnsOf(input), ...value.value, version: version + 1 })
      .where(
        and(eq(readings.id, id), eq(readings.ticketId, ticket.id), eq(readings.version, version)),
      );
    const current = await readingWhere(tx, ticket.id, eq(readings.id, id));
    if (!current) return absent('reading');
    return changed.affectedRows === 1 ? done(current) : stale(current);
  });
}

/** Strikes a reading. */
export async function strikeReading(
  db: Database,
  _actor: Granted<'ticket.bench'>,
  ticket: TicketHead,
  id: number,
  version: number,
): Promise<Outcome<null>> {
  return inTransaction(db, async (tx): Promise<Outcome<null>> => {
    const closed = await lockOpen(tx, ticket);
    if (closed) return closed;
    const [changed] = await tx
      .delete(readings)
      .where(
        and(eq(readings.id, id), eq(readings.ticketId, ticket.id), eq(readings.version, version)),
      );
    if (changed.affectedRows === 1) return done(null);
    const current = await readingWhere(tx, ticket.id, eq(readings.id, id));
    return current ? stale(current) : absent('reading');
  });
}
