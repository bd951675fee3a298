/** Reading the bench sheet, and what its readings say. */
import { and, asc, eq } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { readings } from '@/db/schema/tickets';
import type { BenchReading, Suspects } from '@/contracts/bench';
import type { Incident } from '@/domain/parts/kinds';
import { boardNetwork } from '../boards/queries';
import { judged } from './judged';

type Phase = BenchReading['phase'];

export function asBenchReading(reading: typeof readings.$inferSelect, by: string) {
  return {
    id: reading.id,
    clientKey: reading.clientKey,
    phase: reading.phase,
    place: reading.place,
    from: reading.fromNet,
    to: reading.toNet,
    part: reading.partRef,
    position: reading.position,
    lifted: reading.lifted,
    typed: reading.typed,
    value: reading.overRange || reading.ohms === null ? ('OL' as const) : reading.ohms,
    resolution: reading.resolution,
    by,
    version: reading.version,
  };
}

/** The rows of a ticket's bench sheet, in order. */
export async function sheetOf(db: Queryable, ticketId: number, phase?: Phase) {
  const rows = await db
    .select({ reading: readings, by: users.name })
    .from(readings)
    .innerJoin(users, eq(users.id, readings.createdBy))
    .where(
      and(
        eq(readings.ticketId, ticketId),
        phase === undefined ? undefined : eq(readings.phase, phase),
      ),
    )
    .orderBy(asc(readings.phase), asc(readings.place), asc(readings.id));
  return rows.map(({ reading, by }) => asBenchReading(reading, by));
}

/** What the readings of one phase say: ranked over the network, and part by part where there is none. */
export async function suspectsOf(
  db: Queryable,
  ticket: { id: number; boardId: number | null; incident: Incident },
  phase: Phase,
): Promise<Suspects> {
  const [sheet, board] = await Promise.all([
    sheetOf(db, ticket.id, phase),
    ticket.boardId === null ? null : boardNetwork(db, ticket.boardId),
  ]);
  return judged(board ?? { positions: [], parts: [] }, sheet, ticket.incident);
}
