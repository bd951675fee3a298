import { count, eq } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { ticketCautions } from '@/db/schema/tickets';
import type { Incident } from '@/domain/parts/kinds';
import type { Stage, TicketFacts } from '@/domain/tickets/stages';
import { CAUTION_CODES } from '@/domain/tickets/vocabulary';
import type { CustomerActor } from '../auth/actor';
import { judged } from '../bench/judged';
import { sheetOf } from '../bench/queries';
import { boardNetwork } from '../boards/queries';

/** A customer sees their own tickets; one who came in by claim code, that ticket alone. */
export function isOwn(actor: CustomerActor, ticket: { id: number; customerId: number }): boolean {
  return (
    ticket.customerId === actor.customerId &&
    (actor.ticketId === null || actor.ticketId === ticket.id)
  );
}

/** Where the readings after repair are asked for: elsewhere no step looks at them. */
const ASKS: readonly Stage[] = ['in-repair', 'release-check'];
/** The incident was before the repair: what is accused after it, the readings alone accuse. */
const AFTER: Incident = 'unknown';

async function proofOf(
  db: Queryable,
  ticket: { id: number; stage: Stage; boardId: number | null },
): Promise<Pick<TicketFacts, 'hasNetwork' | 'afterRepair'>> {
  if (!ASKS.includes(ticket.stage))
    return { hasNetwork: false, afterRepair: { readings: 0, usable: 0, accused: [] } };
  const [sheet, board] = await Promise.all([
    sheetOf(db, ticket.id, 'after-repair'),
    ticket.boardId === null ? null : boardNetwork(db, ticket.boardId),
  ]);
  const { diagnosis, alone, unused } = judged(board ?? { positions: [], parts: [] }, sheet, AFTER);
  const suspects = diagnosis?.parts.filter(({ standing }) => standing === 'suspect') ?? [];
  const parts = alone.filter(({ verdict }) => verdict === 'suspect');
  return {
    hasNetwork: board?.parts.some(({ nets }) => nets !== null) ?? false,
    afterRepair: {
      readings: sheet.length,
      usable: sheet.length - unused.length,
      accused: [...new Set([...suspects, ...parts].map(({ ref }) => ref))],
    },
  };
}

/** What the state machine wants to know. */
export async function factsOf(
  db: Queryable,
  ticket: { id: number; stage: Stage; stageBefore: Stage | null; boardId: number | null },
): Promise<TicketFacts> {
  const [ticked] = await db
    .select({ n: count() })
    .from(ticketCautions)
    .where(eq(ticketCautions.ticketId, ticket.id));
  return {
    stage: ticket.stage,
    stageBefore: ticket.stageBefore,
    cautionsTicked: (ticked?.n ?? 0) >= CAUTION_CODES.length,
    ...(await proofOf(db, ticket)),
  };
}
