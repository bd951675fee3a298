/** The lists of the fault base that come from the database: every state, not only what is published. */
import { and, asc, count, desc, eq, gt, inArray, like, or, sql, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/mysql-core';
import type { FaultRow, FaultsQuery } from '@/contracts/faults';
import type { Queryable } from '@/db/client';
import { faultNotes, faultRevisions } from '@/db/schema/faults';
import { users } from '@/db/schema/people';
import { boards } from '@/db/schema/shop';
import { roleMay } from '@/domain/people';
import type { StaffActor } from '../auth/actor';
import { containing } from '../customers/queries';
import { afterPlace, pageOf, readCursor } from '../http/cursor';
import { done, type Outcome } from '../refusal';
import { faultRow } from './queries';

/** The rule of policy.ts `mayRead`, as a condition. */
function open(actor: StaffActor): SQL | undefined {
  if (roleMay(actor.role, 'fault.publish')) return undefined;
  if (!roleMay(actor.role, 'fault.draft')) return eq(faultNotes.state, 'published');
  return or(
    inArray(faultNotes.state, ['published', 'in-review']),
    eq(faultNotes.createdBy, actor.id),
  );
}

type Choice = Pick<FaultsQuery, 'q' | 'state' | 'board' | 'kind' | 'symptom'>;

function conditions(actor: StaffActor, query: Choice): (SQL | undefined)[] {
  const pattern = containing(query.q);
  return [
    open(actor),
    query.state && eq(faultNotes.state, query.state),
    query.board ? eq(faultNotes.boardId, query.board) : undefined,
    query.kind && eq(faultNotes.partKind, query.kind),
    query.symptom
      ? sql`JSON_CONTAINS(${faultNotes.symptoms}, ${JSON.stringify(query.symptom)})`
      : undefined,
    query.q ? or(like(faultNotes.title, pattern), like(faultNotes.words, pattern)) : undefined,
  ];
}

/** One page of the notes this person may see. */
export async function listFaults(
  db: Queryable,
  actor: StaffActor,
  query: FaultsQuery,
): Promise<Outcome<{ items: FaultRow[]; next: string | null }>> {
  const place = readCursor(query.sort, query.cursor);
  if (!place.ok) return place;
  const down = query.sort.startsWith('-');
  const column = query.sort.endsWith('title') ? faultNotes.title : faultNotes.updatedAt;
  const order = down ? desc : asc;
  const rows = await db
    .select({ note: faultNotes, board: boards, author: users.name })
    .from(faultNotes)
    .innerJoin(users, eq(users.id, faultNotes.createdBy))
    .leftJoin(boards, eq(boards.id, faultNotes.boardId))
    .where(
      and(
        ...conditions(actor, query),
        place.value && afterPlace(column, faultNotes.id, place.value, down),
      ),
    )
    .orderBy(order(column), order(faultNotes.id))
    .limit(query.limit + 1);
  const page = pageOf(rows, query.limit, query.sort, ({ note }) => ({
    value: query.sort.endsWith('title') ? note.title : note.updatedAt,
    id: note.id,
  }));
  return done({
    items: page.items.map(({ note, board, author }) => faultRow(actor, note, board, author)),
    next: page.next,
  });
}

/** A numbered page of one state's notes with how many there are, for the page that shows them. */
export async function listFaultsPage(
  db: Queryable,
  actor: StaffActor,
  query: Choice & { sort: string },
  page: number,
  size: number,
): Promise<{ items: FaultRow[]; total: number }> {
  const where = and(...conditions(actor, query));
  const column = query.sort.endsWith('title') ? faultNotes.title : faultNotes.updatedAt;
  const order = query.sort === 'title' || query.sort === 'updated' ? asc : desc;
  const [rows, [counted]] = await Promise.all([
    db
      .select({ note: faultNotes, board: boards, author: users.name })
      .from(faultNotes)
      .innerJoin(users, eq(users.id, faultNotes.createdBy))
      .leftJoin(boards, eq(boards.id, faultNotes.boardId))
      .where(where)
      .orderBy(order(column), order(faultNotes.id))
      .limit(size)
      .offset((page - 1) * size),
    db.select({ n: count() }).from(faultNotes).where(where),
  ]);
  return {
    items: rows.map(({ note, board, author }) => faultRow(actor, note, board, author)),
    total: counted?.n ?? 0,
  };
}

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
        open(actor),
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
