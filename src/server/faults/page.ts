/** What the pages show: one note with its history or two revisions compared; the editor with its ticket's material. */
import { asc } from 'drizzle-orm';
import type { FaultDetail, NoteAddress, Revision, RevisionRow } from '@/contracts/faults';
import type { Queryable } from '@/db/client';
import { boards } from '@/db/schema/shop';
import { SECTIONS, sectionLines } from '@/domain/faults/body';
import { compareTexts, type Change } from '@/domain/faults/compare';
import { SECTION_LABELS } from '@/domain/faults/complete';
import type { Ohms } from '@/domain/network/types';
import type { Incident, PartKind } from '@/domain/parts/kinds';
import { incidentLabels, kindLabels } from '@/domain/parts/words';
import { formatOhms } from '@/domain/quantities/format';
import { SYMPTOMS, type Symptom } from '@/domain/tickets/vocabulary';
import type { StaffActor } from '../auth/actor';
import { sheetOf, suspectsOf } from '../bench/queries';
import { boardNetwork, labelsOf } from '../boards/queries';
import { photosOfTicket } from '../photos/queries';
import { ticketByNumber } from '../tickets/queries';
import { readFault, revisionOf, revisionsOf, stepsOf } from './queries';

export type Compared = {
  before: Revision;
  after: Revision;
  fields: { name: string; changes: Change[]; changed: boolean }[];
};

export type NotePage = {
  note: FaultDetail;
  shown: Revision;
  /** Every label the board is sold under. */
  labels: { maker: string; name: string }[];
  revisions: RevisionRow[];
  steps: Awaited<ReturnType<typeof stepsOf>>;
  compared: Compared | null;
};

const factLines = (r: Revision) =>
  [
    `Board: ${r.board?.label ?? 'none'}`,
    `Part family: ${r.partKind ? kindLabels[r.partKind] : 'none'}`,
    `Incident: ${r.incident ? incidentLabels[r.incident] : 'any'}`,
    `Symptoms: ${r.symptoms.map((s) => SYMPTOMS[s]).join('; ') || 'none'}`,
  ].join('\n');

function compare(before: Revision, after: Revision): Compared {
  const texts: [string, string, string][] = [
    ['Title', before.title, after.title],
    ['About', factLines(before), factLines(after)],
    ...SECTIONS.map((s): [string, string, string] => [
      SECTION_LABELS[s],
      sectionLines(before.body[s]),
      sectionLines(after.body[s]),
    ]),
  ];
  const fields = texts.map(([name, a, b]) => ({
    name,
    changes: compareTexts(a, b),
    changed: a !== b,
  }));
  return { before, after, fields };
}

/** Null when the note, or the revision asked for, is not there or not open to this person. */
export async function notePage(
  db: Queryable,
  actor: StaffActor,
  id: number,
  asked: NoteAddress,
): Promise<NotePage | null> {
  const note = await readFault(db, actor, id, 'reader');
  if (!note) return null;
  const open = (number: number) => revisionOf(db, actor, id, number);
  const [shown, pair, labels, revisions, steps] = await Promise.all([
    open(asked.revision ?? note.shown),
    asked.compare ? Promise.all(asked.compare.map(open)) : null,
    note.board ? labelsOf(db, note.board.id) : [],
    revisionsOf(db, actor, id),
    stepsOf(db, actor, id),
  ]);
  if (!shown || !revisions) return null;
  const [before, after] = pair ?? [];
  if (pair && (!before || !after)) return null;
  const compared = before && after ? compare(before, after) : null;
  return { note, shown, labels, revisions, steps, compared };
}

export type Material = {
  number: string;
  boardId: number | null;
  readings: {
    from: string;
    to: string;
    position: string;
    typed: string;
    expected: string | null;
  }[];
  photos: { id: string; caption: string }[];
  parts: { ref: string; kind: PartKind; value: string }[];
  symptoms: Symptom[];
  incident: Incident;
};

/** Beyond this a usual meter shows OL, Ω: api.md's default over range. */
const OVER_RANGE_OHMS = 60e6;
const LONGEST = 40;

const written = (ohms: Ohms) => (ohms === 'OL' || ohms > OVER_RANGE_OHMS ? 'OL' : formatOhms(ohms));

type SheetRow = Awaited<ReturnType<typeof sheetOf>>[number];

function readingWords(reading: SheetRow, expected: Ohms | undefined) {
  const conditions = [
    reading.position ?? '',
    reading.lifted.length > 0 ? `${reading.lifted.join(', ')} lifted` : '',
    reading.phase === 'after-repair' ? 'after repair' : '',
  ];
  return {
    from: reading.part ?? reading.from ?? '',
    to: reading.part === null ? (reading.to ?? '') : '',
    position: conditions.filter(Boolean).join(', ').slice(0, LONGEST),
    typed: reading.typed,
    expected: expected === undefined ? null : written(expected),
  };
}

/** Readings with what the healthy network would show, photos, parts; null when there is no such ticket. */
export async function ticketMaterial(db: Queryable, number: string): Promise<Material | null> {
  const ticket = await ticketByNumber(db, number);
  if (!ticket) return null;
  const [sheet, found, after, photos, board] = await Promise.all([
    sheetOf(db, ticket.id),
    suspectsOf(db, ticket, 'as-found'),
    suspectsOf(db, ticket, 'after-repair'),
    photosOfTicket(db, ticket.id),
    ticket.boardId === null ? null : boardNetwork(db, ticket.boardId),
  ]);
  const expected = new Map(
    [...found.expected, ...after.expected].map(({ reading, ohms }) => [reading, ohms]),
  );
  return {
    number,
    boardId: ticket.boardId,
    readings: sheet.map((reading) => readingWords(reading, expected.get(reading.id))),
    photos: photos.map(({ id, caption, side, phase }) => ({
      id,
      caption: caption || `${side}, ${phase} repair`,
    })),
    parts: (board?.parts ?? []).map(({ ref, kind, value }) => ({ ref, kind, value })),
    symptoms: ticket.symptoms,
    incident: ticket.incident,
  };
}

/** The boards a note may stand on. */
export async function boardChoices(db: Queryable): Promise<{ id: number; label: string }[]> {
  const rows = await db.select().from(boards).orderBy(asc(boards.code), asc(boards.revision));
  return rows.map(({ id, code, revision, maker }) => ({
    id,
    label: `${code} rev ${revision} (${maker})`,
  }));
}
