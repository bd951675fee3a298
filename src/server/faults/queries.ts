/** Reading notes, their revisions and lists of them, and proposing the ones that fit a ticket. */
import { and, asc, count, desc, eq, inArray, like, max, or, sql, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/mysql-core';
import type { FaultDetail, FaultRow, FaultsQuery, Revision, RevisionRow } from '@/contracts/faults';
import type { Queryable } from '@/db/client';
import { faultNotes, faultRevisions, faultSteps } from '@/db/schema/faults';
import { users } from '@/db/schema/people';
import { boards } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import { fitOf, type TicketFacts } from '@/domain/faults/fit';
import { termsOf } from '@/domain/faults/search-terms';
import { offeredFaultSteps } from '@/domain/faults/states';
import { roleMay } from '@/domain/people';
import type { StaffActor } from '../auth/actor';
import { containing } from '../customers/queries';
import { afterPlace, pageOf, readCursor } from '../http/cursor';
import { done, type Outcome } from '../refusal';
import { faultIndex } from '../search/note-index';
import { mayEdit, mayRead, seesAllRevisions, standingOf } from './policy';
import type { NoteHead, Proposal } from './types';
import { boardName, faultRow } from './views';

/** The head of a note that this person may read, or null. */
export async function headOf(
  db: Queryable,
  actor: StaffActor,
  id: number,
): Promise<NoteHead | null> {
  const [note] = await db.select().from(faultNotes).where(eq(faultNotes.id, id));
  return note && mayRead(actor, note) ? note : null;
}

async function readRevision(db: Queryable, noteId: number, revision: number) {
  const [row] = await db
    .select({ revision: faultRevisions, author: users.name, board: boards })
    .from(faultRevisions)
    .innerJoin(users, eq(users.id, faultRevisions.authorId))
    .leftJoin(boards, eq(boards.id, faultRevisions.boardId))
    .where(and(eq(faultRevisions.noteId, noteId), eq(faultRevisions.revision, revision)));
  return row ?? null;
}

/**
 * One note: `newest` as those who edit it need it, `reader` as everybody sees it (the published revision, or the
 * newest before there is one). Null when it is not there or not open to this person.
 */
export async function readFault(
  db: Queryable,
  actor: StaffActor,
  id: number,
  as: 'reader' | 'newest',
): Promise<FaultDetail | null> {
  const authors = alias(users, 'authors');
  const publishers = alias(users, 'publishers');
  const [row] = await db
    .select({ note: faultNotes, author: authors.name, publisher: publishers.name, ticket: tickets })
    .from(faultNotes)
    .innerJoin(authors, eq(authors.id, faultNotes.createdBy))
    .leftJoin(publishers, eq(publishers.id, faultNotes.publishedBy))
    .leftJoin(tickets, eq(tickets.id, faultNotes.fromTicketId))
    .where(eq(faultNotes.id, id));
  if (!row || !mayRead(actor, row.note)) return null;
  const { note } = row;
  const edits = mayEdit(actor, note);
  const published = note.state === 'published' ? note.publishedRevision : null;
  const shown = as === 'newest' && edits ? note.revision : (published ?? note.revision);
  const found = await readRevision(db, id, shown);
  if (!found) throw new Error(`Fault note ${id} has no revision ${shown}`);
  const { revision, board } = found;
  return {
    ...faultRow(actor, note, board, row.author),
    title: revision.title,
    partKind: revision.partKind,
    incident: revision.incident,
    symptoms: revision.symptoms,
    shown,
    body: revision.body,
    ticket: row.ticket?.number ?? null,
    publishedBy: row.publisher,
    mayEdit: edits,
    steps: offeredFaultSteps(standingOf(actor, note), actor.role),
    version: note.version,
  };
}

/** When each revision reached its readers. */
async function publishedTimes(db: Queryable, noteId: number): Promise<Map<number, Date>> {
  const rows = await db
    .select({ revision: faultSteps.revision, at: max(faultSteps.at) })
    .from(faultSteps)
    .where(and(eq(faultSteps.noteId, noteId), eq(faultSteps.toState, 'published')))
    .groupBy(faultSteps.revision);
  return new Map(rows.flatMap(({ revision, at }) => (at ? [[revision, new Date(at)]] : [])));
}

/** The revisions open to this person, newest first; null when the note is not. */
export async function revisionsOf(
  db: Queryable,
  actor: StaffActor,
  id: number,
): Promise<RevisionRow[] | null> {
  const note = await headOf(db, actor, id);
  if (!note) return null;
  const [rows, published] = await Promise.all([
    db
      .select({
        revision: faultRevisions.revision,
        title: faultRevisions.title,
        at: faultRevisions.at,
        author: users.name,
      })
      .from(faultRevisions)
      .innerJoin(users, eq(users.id, faultRevisions.authorId))
      .where(eq(faultRevisions.noteId, id))
      .orderBy(desc(faultRevisions.revision)),
    publishedTimes(db, id),
  ]);
  const all = seesAllRevisions(actor, note);
  return rows
    .filter((row) => all || published.has(row.revision))
    .map((row) => ({
      ...row,
      at: row.at.toISOString(),
      publishedAt: published.get(row.revision)?.toISOString() ?? null,
    }));
}

/** One revision, whole; null when it or its note is not open to this person. */
export async function revisionOf(
  db: Queryable,
  actor: StaffActor,
  id: number,
  number: number,
): Promise<Revision | null> {
  const note = await headOf(db, actor, id);
  if (!note) return null;
  const [found, published] = await Promise.all([
    readRevision(db, id, number),
    publishedTimes(db, id),
  ]);
  if (!found || !(seesAllRevisions(actor, note) || published.has(number))) return null;
  const { revision, author, board } = found;
  return {
    revision: number,
    title: revision.title,
    author,
    at: revision.at.toISOString(),
    publishedAt: published.get(number)?.toISOString() ?? null,
    board: boardName(board),
    partKind: revision.partKind,
    incident: revision.incident,
    symptoms: revision.symptoms,
    body: revision.body,
  };
}

/** The steps a note has taken, oldest first, for those who may read all of it. */
export async function stepsOf(db: Queryable, actor: StaffActor, id: number) {
  const note = await headOf(db, actor, id);
  if (!note || !seesAllRevisions(actor, note)) return [];
  return db.select().from(faultSteps).where(eq(faultSteps.noteId, id)).orderBy(faultSteps.id);
}

/** The rule of policy.ts `mayRead`, as a condition. */
export function openTo(actor: StaffActor): SQL | undefined {
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
    openTo(actor),
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
  const down = query.sort.startsWith('-');
  const column = query.sort.endsWith('title') ? faultNotes.title : faultNotes.updatedAt;
  const place = readCursor(query.sort, query.cursor, column.dataType);
  if (!place.ok) return place;
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

/** Every note of a list, page after page: for a file. */
export async function* everyFault(db: Queryable, actor: StaffActor, query: FaultsQuery) {
  let cursor: string | undefined;
  do {
    const page = await listFaults(db, actor, { ...query, cursor, limit: 200 });
    if (!page.ok) return;
    yield* page.value.items;
    cursor = page.value.next ?? undefined;
  } while (cursor);
}

const excerptOf = (text: string, length = 160) =>
  text.length <= length ? text : `${text.slice(0, text.lastIndexOf(' ', length))} …`;

/** Published notes that fit a ticket, the best first. */
export async function proposeNotes(
  app: { db: Queryable },
  ticket: TicketFacts,
  now: Date,
  limit = 5,
): Promise<Proposal[]> {
  const { notes } = await faultIndex(app.db, now);
  const proposals: Proposal[] = [];
  for (const note of notes.values()) {
    const fit = fitOf(
      {
        ...note,
        boardId: note.board?.id ?? null,
        modeTerms: new Set(termsOf(`${note.title} ${note.document.cause}`)),
      },
      ticket,
    );
    if (!fit) continue;
    proposals.push({
      id: note.id,
      title: note.title,
      excerpt: excerptOf(note.document.cause),
      board: note.board?.label ?? null,
      partKind: note.partKind,
      ...fit,
    });
  }
  return proposals.sort((a, b) => b.score - a.score || a.id - b.id).slice(0, limit);
}
