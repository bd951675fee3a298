/** Writing which board a model carries. */
import { and, eq, isNull, notInArray, sql } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { models } from '@/db/schema/shop';
import { instruments } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import { CLOSED_STAGES } from '@/domain/tickets/stages';
import { record } from '../audit/commands';
import type { Granted } from '../auth/actor';
import { done, refuse, refuseField, type Outcome } from '../refusal';
import { leaveEvent } from '../tickets/commands';
import { boardById, boardLabel } from './queries';

/**
 * Says which board a model carries that none was known of. Its open tickets without a board stand on it from now on;
 * closed ones stay as they were.
 */
export async function nameBoard(
  db: Database,
  actor: Granted<'board.edit'>,
  { modelId, boardId, requestId }: { modelId: number; boardId: number; requestId: string },
  now: Date,
): Promise<Outcome<null>> {
  return inTransaction(db, async (tx): Promise<Outcome<null>> => {
    const board = await boardById(tx, boardId);
    if (!board) return refuseField('board', 'There is no such board: choose one of the list.');
    const [changed] = await tx
      .update(models)
      .set({ boardId, version: sql`version + 1` })
      .where(and(eq(models.id, modelId), isNull(models.boardId)));
    if (changed.affectedRows !== 1)
      return refuse('conflict', 'The board of this model is known already: look at it again.');
    const waiting = await tx
      .select({ id: tickets.id })
      .from(tickets)
      .innerJoin(instruments, eq(instruments.id, tickets.instrumentId))
      .where(
        and(
          eq(instruments.modelId, modelId),
          isNull(tickets.boardId),
          notInArray(tickets.stage, [...CLOSED_STAGES]),
        ),
      )
      .for('update');
    const label = boardLabel(board);
    const event = { kind: 'corrected', note: `Board: ${label}`, open: false } as const;
    for (const { id } of waiting) {
      await tx
        .update(tickets)
        .set({ boardId, version: sql`version + 1` })
        .where(eq(tickets.id, id));
      await leaveEvent(tx, id, actor, event, now);
    }
    const entry = { action: 'model.board-named', object: `model:${modelId}`, requestId };
    await record(tx, { actor, ...entry, detail: { board: { from: null, to: label } } }, now);
    return done(null);
  });
}
