/** What waits in the fault base: notes in review, corrections, drafts. */
import { and, asc, count, eq, gt, inArray, or } from 'drizzle-orm';
import { alias } from 'drizzle-orm/mysql-core';
import type { FaultRow } from '@/contracts/faults';
import type { Queryable } from '@/db/client';
import { faultNotes, faultRevisions } from '@/db/schema/faults';
import { users } from '@/db/schema/people';
import { boards } from '@/db/schema/shop';
import { roleMay } from '@/domain/people';
import type { StaffActor } from '../auth/actor';
import { openTo } from '../faults/queries';
import { faultRow } from '../faults/views';

/** How many notes wait in the review queue for this person. */
export async function countWaiting(db: Queryable, actor: StaffActor): Promise<number> {
  const correction = and(
    eq(faultNotes.state, 'published'),
    gt(faultNotes.revision, faultNotes.publishedRevision),
  );
  const [counted] = await db
    .select({ n: count() })
    .from(faultNotes)
    .where(
      roleMay(actor.role, 'fault.publish')
        ? or(eq(faultNotes.state, 'in-review'), correction)
        : eq(faultNotes.state, 'in-review'),
    );
  return counted?.n ?? 0;
}

export type Work = FaultRow & {
  /** Who wrote the newest revision, and when. */
  by: string;
  at: Date;
};

/** What waits: notes in review, corrections not yet published (for seniors), and drafts. */
export async function reviewQueue(
  db: Queryable,
  actor: StaffActor,
): Promise<{ review: Work[]; corrections: Work[]; own: Work[]; others: Work[] }> {
  const writers = alias(users, 'writers');
  const rows = await db
    .select({
      note: faultNotes,
      revision: faultRevisions,
      board: boards,
      author: users.name,
      by: writers.name,
    })
    .from(faultNotes)
    .innerJoin(
      faultRevisions,
      and(
        eq(faultRevisions.noteId, faultNotes.id),
        eq(faultRevisions.revision, faultNotes.revision),
      ),
    )
    .innerJoin(users, eq(users.id, faultNotes.createdBy))
    .innerJoin(writers, eq(writers.id, faultRevisions.authorId))
    .leftJoin(boards, eq(boards.id, faultRevisions.boardId))
    .where(
      and(
        openTo(actor),
        or(
          inArray(faultNotes.state, ['draft', 'in-review']),
          and(
            eq(faultNotes.state, 'published'),
            gt(faultNotes.revision, faultNotes.publishedRevision),
          ),
        ),
      ),
    )
    .orderBy(asc(faultRevisions.at), asc(faultNotes.id))
    .limit(500);
  const work = rows.map(({ note, revision, board, author, by }) => ({
    ...faultRow(actor, note, board, author),
    title: revision.title,
    partKind: revision.partKind,
    symptoms: revision.symptoms,
    by,
    at: revision.at,
  }));
  return {
    review: work.filter((n) => n.state === 'in-review'),
    corrections: work.filter((n) => n.correction),
    own: work.filter((n) => n.state === 'draft' && n.own),
    others: work.filter((n) => n.state === 'draft' && !n.own),
  };
}
