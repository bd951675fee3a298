/**
 * The index of published notes, held by each process. The row `faults` of `revisions` moves in the same transaction as
 * the published set, so a process that looks at it finds a note as soon as it is published anywhere.
 */
import { and, eq, inArray, isNotNull, sql } from 'drizzle-orm';
import MiniSearch from 'minisearch';
import type { Queryable } from '@/db/client';
import { faultNotes, faultRevisions } from '@/db/schema/faults';
import { boards, models } from '@/db/schema/shop';
import { partRefs, sectionWords, SECTIONS, type FaultBody } from '@/domain/faults/body';
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
  notes: Map<number, IndexedNote>;
  search: MiniSearch<NoteDocument>;
};

type Keeper = { index: FaultIndex; lookedAt: number; looking: Promise<void> | null };
const keepers = new WeakMap<object, Keeper>();

/** One cheap read: the counter, and the labels of boards (a new label must find its board's notes). */
async function readStamp(db: Queryable): Promise<string> {
  const [rows] = (await db.execute(sql`
    SELECT (SELECT value FROM revisions WHERE name = 'faults') AS f,
           (SELECT CONCAT(COUNT(*), '.', COALESCE(SUM(version), 0)) FROM models) AS m,
           (SELECT CONCAT(COUNT(*), '.', COALESCE(SUM(version), 0)) FROM boards) AS b`)) as unknown as [
    { f: number | null; m: string; b: string }[],
  ];
  const row = rows[0];
  return `${row?.f ?? 0}/${row?.m}/${row?.b}`;
}

async function readNotes(db: Queryable, ids: number[]): Promise<IndexedNote[]> {
  if (ids.length === 0) return [];
  const rows = await db
    .select({ note: faultNotes, body: faultRevisions.body, board: boards })
    .from(faultNotes)
    .innerJoin(
      faultRevisions,
      and(
        eq(faultRevisions.noteId, faultNotes.id),
        eq(faultRevisions.revision, faultNotes.publishedRevision),
      ),
    )
    .leftJoin(boards, eq(boards.id, faultNotes.boardId))
    .where(inArray(faultNotes.id, ids));
  const labels = await db.select().from(models).where(isNotNull(models.boardId));
  return rows.map(({ note, body, board }) => {
    const refs = partRefs(body);
    const sections = Object.fromEntries(SECTIONS.map((s) => [s, sectionWords(body[s])]));
    return {
      id: note.id,
      revision: note.publishedRevision ?? 0,
      title: note.title,
      board: board ? { id: board.id, label: `${board.code} rev ${board.revision}` } : null,
      partKind: note.partKind,
      incident: note.incident,
      symptoms: note.symptoms,
      refs: new Set(refs),
      body,
      updatedAt: note.publishedAt ?? note.updatedAt,
      document: {
        id: note.id,
        title: note.title,
        refs: refs.join(' '),
        labels: labelWords({
          board,
          models: board ? labels.filter((m) => m.boardId === board.id) : [],
          partKind: note.partKind,
          symptoms: note.symptoms,
          incident: note.incident,
        }),
        about: board?.about ?? '',
        ...(sections as Record<(typeof SECTIONS)[number], string>),
      },
    };
  });
}

/** Takes over what changed: notes are read only when theirs did, all of them when a board's labels did. */
async function bringUpToDate(db: Queryable, index: FaultIndex): Promise<void> {
  const stamp = await readStamp(db);
  if (stamp === index.stamp) return;
  const labelsMoved = stamp.split('/').slice(1).join() !== index.stamp.split('/').slice(1).join();
  const published = await db
    .select({ id: faultNotes.id, revision: faultNotes.publishedRevision })
    .from(faultNotes)
    .where(eq(faultNotes.state, 'published'));
  const standing = new Set(published.map((n) => n.id));
  const changed = published.filter(
    (n) => labelsMoved || index.notes.get(n.id)?.revision !== n.revision,
  );
  const fresh = await readNotes(
    db,
    changed.map((n) => n.id),
  );
  // No await below: a question sees the index before or after, never between.
  for (const id of [...index.notes.keys()])
    if (!standing.has(id)) {
      index.notes.delete(id);
      index.search.discard(id);
    }
  for (const note of fresh) {
    if (index.notes.has(note.id)) index.search.replace(note.document);
    else index.search.add(note.document);
    index.notes.set(note.id, note);
  }
  index.stamp = stamp;
}

/** The index as it stands now, at most a quarter of a second old. */
export async function faultIndex(db: Queryable, now: Date): Promise<FaultIndex> {
  let keeper = keepers.get(db);
  if (!keeper) {
    const index = { stamp: '', notes: new Map(), search: new MiniSearch(INDEX_OPTIONS) };
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
