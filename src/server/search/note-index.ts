/**
 * The index of published notes, held by each process. The row `faults` of `revisions` moves in the same transaction as
 * the published set, so a process that looks at it finds a note as soon as it is published anywhere.
 */
import { and, eq, inArray, isNotNull, sql } from 'drizzle-orm';
import MiniSearch from 'minisearch';
import type { Queryable } from '@/db/client';
import { faultNotes, faultRevisions } from '@/db/schema/faults';
import { boards, models } from '@/db/schema/shop';
import { partRefs, sectionWords, type FaultBody, type Section } from '@/domain/faults/body';
import { INDEX_OPTIONS, labelWords, type NoteDocument } from '@/domain/faults/search-options';
import type { Incident, PartKind } from '@/domain/parts/kinds';
import type { Symptom } from '@/domain/tickets/vocabulary';

/** How long a process may go without looking whether anything was published. */
const TRUST_MS = 250;

/** A published note as the search knows it. */
export type IndexedNote = {
  id: number;
  revision: number;
  title: string;
  board: { id: number; label: string } | null;
  partKind: PartKind | null;
  incident: Incident | null;
  symptoms: Symptom[];
  refs: Set<string>;
  body: FaultBody;
  updatedAt: Date;
  document: NoteDocument;
};

export type FaultIndex = {
  /** Moves with every change of what is published. */
  stamp: string;
  /** The part of the stamp that moves with boards and their labels. */
  labels: string;
  notes: Map<number, IndexedNote>;
  search: MiniSearch<NoteDocument>;
};

type Keeper = { index: FaultIndex; lookedAt: number; looking: Promise<void> | null };
const keepers = new WeakMap<object, Keeper>();

/** One cheap read: the counter, and the labels of boards (a new label must find its board's notes). */
async function readStamp(db: Queryable): Promise<{ notes: string; labels: string }> {
  const [rows] = (await db.execute(sql`
    SELECT (SELECT value FROM revisions WHERE name = 'faults') AS f,
           (SELECT CONCAT(COUNT(*), '.', COALESCE(SUM(version), 0))
              FROM models WHERE board_id IS NOT NULL) AS m,
           (SELECT CONCAT(COUNT(*), '.', COALESCE(SUM(version), 0)) FROM boards) AS b`)) as unknown as [
    { f: number | null; m: string; b: string }[],
  ];
  const row = rows[0];
  return { notes: String(row?.f ?? 0), labels: `${row?.m}/${row?.b}` };
}

type Labels = Map<
  number,
  { board: typeof boards.$inferSelect; models: (typeof models.$inferSelect)[] }
>;

async function readLabels(db: Queryable): Promise<Labels> {
  const [rows, labels] = await Promise.all([
    db.select().from(boards),
    db.select().from(models).where(isNotNull(models.boardId)),
  ]);
  return new Map(
    rows.map((board) => [
      board.id,
      { board, models: labels.filter((m) => m.boardId === board.id) },
    ]),
  );
}

type Facts = Omit<IndexedNote, 'document' | 'board'> & { boardId: number | null };

async function readNotes(db: Queryable, ids: number[]): Promise<Facts[]> {
  if (ids.length === 0) return [];
  const rows = await db
    .select({ note: faultNotes, body: faultRevisions.body })
    .from(faultNotes)
    .innerJoin(
      faultRevisions,
      and(
        eq(faultRevisions.noteId, faultNotes.id),
        eq(faultRevisions.revision, faultNotes.publishedRevision),
      ),
    )
    .where(inArray(faultNotes.id, ids));
  return rows.map(({ note, body }) => ({
    id: note.id,
    revision: note.publishedRevision ?? 0,
    title: note.title,
    boardId: note.boardId,
    partKind: note.partKind,
    incident: note.incident,
    symptoms: note.symptoms,
    refs: new Set(partRefs(body)),
    body,
    updatedAt: note.publishedAt ?? note.updatedAt,
  }));
}

function indexed(facts: Facts, labels: Labels): IndexedNote {
  const { boardId, ...note } = facts;
  const of = boardId === null ? undefined : labels.get(boardId);
  const board = of?.board ?? null;
  const words = (section: Section) => sectionWords(note.body[section]);
  return {
    ...note,
    board: board && { id: board.id, label: `${board.code} rev ${board.revision}` },
    document: {
      id: note.id,
      title: note.title,
      refs: [...note.refs].join(' '),
      labels: labelWords({ ...note, board, models: of?.models ?? [] }),
      about: board?.about ?? '',
      symptom: words('symptom'),
      cause: words('cause'),
      proof: words('proof'),
      repair: words('repair'),
    },
  };
}

/** Takes over what changed: a note when its published revision did, its labels when its board's did. */
async function bringUpToDate(db: Queryable, index: FaultIndex): Promise<void> {
  const stamp = await readStamp(db);
  const now = `${stamp.notes}/${stamp.labels}`;
  if (now === index.stamp) return;
  const published = await db
    .select({ id: faultNotes.id, revision: faultNotes.publishedRevision })
    .from(faultNotes)
    .where(eq(faultNotes.state, 'published'));
  const standing = new Set(published.map((n) => n.id));
  const changed = published.filter((n) => index.notes.get(n.id)?.revision !== n.revision);
  const [fresh, labels] = await Promise.all([
    readNotes(
      db,
      changed.map((n) => n.id),
    ),
    readLabels(db),
  ]);
  // No await below: a question sees the index before or after, never between.
  for (const id of [...index.notes.keys()])
    if (!standing.has(id)) {
      index.notes.delete(id);
      index.search.discard(id);
    }
  const relabelled = stamp.labels === index.labels ? [] : [...index.notes.values()];
  const kept = relabelled
    .filter((n) => !changed.some((c) => c.id === n.id))
    .map((n) => ({ ...n, boardId: n.board?.id ?? null }));
  for (const note of [...kept, ...fresh].map((facts) => indexed(facts, labels))) {
    const before = index.notes.get(note.id);
    index.notes.set(note.id, note);
    if (!before) index.search.add(note.document);
    else if (!sameDocument(before.document, note.document)) index.search.replace(note.document);
  }
  index.stamp = now;
  index.labels = stamp.labels;
}

const sameDocument = (a: NoteDocument, b: NoteDocument) =>
  (Object.keys(a) as (keyof NoteDocument)[]).every((field) => a[field] === b[field]);

/** The index as it stands now, at most a quarter of a second old. */
export async function faultIndex(db: Queryable, now: Date): Promise<FaultIndex> {
  let keeper = keepers.get(db);
  if (!keeper) {
    const search = new MiniSearch<NoteDocument>(INDEX_OPTIONS);
    const index = { stamp: '', labels: '', notes: new Map(), search };
    keeper = { index, lookedAt: 0, looking: null };
    keepers.set(db, keeper);
  }
  const held = keeper;
  const age = now.getTime() - held.lookedAt;
  if (age >= 0 && age < TRUST_MS) return held.index;
  held.looking ??= bringUpToDate(db, held.index)
    .then(() => {
      held.lookedAt = now.getTime();
    })
    .finally(() => {
      held.looking = null;
    });
  await held.looking;
  return held.index;
}
