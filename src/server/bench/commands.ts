/** Writing the bench sheet. Readings are kept as typed, with what the parser made of them. */
import { and, count, eq } from 'drizzle-orm';
import { inTransaction, isDuplicate, type Database, type Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { readings } from '@/db/schema/tickets';
import type { EditReading, NewReading } from '@/contracts/bench';
import { parseResistance } from '@/domain/quantities/parse';
import { isClosed } from '@/domain/tickets/stages';
import { CAUTION_CODES } from '@/domain/tickets/vocabulary';
import type { Granted } from '../auth/actor';
import { absent, done, refuse, refuseField, type Outcome, type Refusal } from '../refusal';
import { cautionsOf } from '../tickets/queries';
import type { TicketHead } from '../tickets/types';
import { asBenchReading } from './queries';

const MOST_READINGS = 60;
type Written = ReturnType<typeof asBenchReading>;

/** Readings wait for the cautions, and stop when the ticket is closed. */
async function sheetRefusal(db: Queryable, ticket: TicketHead): Promise<Refusal | null> {
  if (isClosed(ticket.stage))
    return refuse('conflict', 'The ticket is closed: its bench sheet stays as it is.');
  const ticked = await cautionsOf(db, ticket.id);
  return ticked.length < CAUTION_CODES.length
    ? refuse('conflict', 'The cautions are not all ticked: tick them first, then enter readings.')
    : null;
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
  if (!value.ok) {
    const could = value.could?.length ? ` It could be ${value.could.join(' or ')}.` : '';
    return refuseField('typed', `${value.reason}${could}`);
  }
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
  const refusal = await sheetRefusal(db, ticket);
  if (refusal) return refusal;
  const value = parsed(input);
  if (!value.ok) return value;
  const byKey = and(eq(readings.ticketId, ticket.id), eq(readings.clientKey, input.clientKey));
  try {
    return await inTransaction(db, async (tx): Promise<Outcome<Written>> => {
      const [held] = await tx
        .select({ n: count() })
        .from(readings)
        .where(and(eq(readings.ticketId, ticket.id), eq(readings.phase, input.phase)));
      if ((held?.n ?? 0) >= MOST_READINGS)
        return refuse('too-large', `The sheet holds ${MOST_READINGS} readings: strike one first.`);
      await tx.insert(readings).values({
        ticketId: ticket.id,
        clientKey: input.clientKey,
        ...columnsOf(input),
        ...value.value,
        createdBy: actor.id,
        createdAt: now,
      });
      const [row] = await tx.select().from(readings).where(byKey);
      if (!row) throw new Error('The reading was not written.');
      return done(asBenchReading(row, actor.name));
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
    const [row] = await db
      .select({ reading: readings, by: users.name })
      .from(readings)
      .innerJoin(users, eq(users.id, readings.createdBy))
      .where(byKey);
    if (!row) throw error;
    return done(asBenchReading(row.reading, row.by));
  }
}

const stale = (current: Written) =>
  refuse('stale', 'Somebody changed this reading meanwhile: both are shown.', {
    more: { current },
  });

async function readingOf(db: Queryable, ticketId: number, id: number) {
  const [row] = await db
    .select({ reading: readings, by: users.name })
    .from(readings)
    .innerJoin(users, eq(users.id, readings.createdBy))
    .where(and(eq(readings.id, id), eq(readings.ticketId, ticketId)));
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
  const refusal = await sheetRefusal(db, ticket);
  if (refusal) return refusal;
  const value = parsed(input);
  if (!value.ok) return value;
  const [changed] = await db
    .update(readings)
    .set({ ...columnsOf(input), ...value.value, version: version + 1 })
    .where(
      and(eq(readings.id, id), eq(readings.ticketId, ticket.id), eq(readings.version, version)),
    );
  const current = await readingOf(db, ticket.id, id);
  if (!current) return absent('reading');
  return changed.affectedRows === 1 ? done(current) : stale(current);
}

/** Strikes a reading. */
export async function strikeReading(
  db: Database,
  _actor: Granted<'ticket.bench'>,
  ticket: TicketHead,
  id: number,
  version: number,
): Promise<Outcome<null>> {
  if (isClosed(ticket.stage))
    return refuse('conflict', 'The ticket is closed: its bench sheet stays as it is.');
  const [changed] = await db
    .delete(readings)
    .where(
      and(eq(readings.id, id), eq(readings.ticketId, ticket.id), eq(readings.version, version)),
    );
  if (changed.affectedRows === 1) return done(null);
  const current = await readingOf(db, ticket.id, id);
  return current ? stale(current) : absent('reading');
}
