/** What the page of one note shows: the note, the revision asked for or two of them compared, and its history. */
import type { FaultDetail, NoteAddress, Revision, RevisionRow } from '@/contracts/faults';
import type { Queryable } from '@/db/client';
import { SECTIONS, sectionLines } from '@/domain/faults/body';
import { compareTexts, type Change } from '@/domain/faults/compare';
import { SECTION_LABELS } from '@/domain/faults/complete';
import { incidentLabels, kindLabels } from '@/domain/parts/words';
import { SYMPTOMS } from '@/domain/tickets/vocabulary';
import type { StaffActor } from '../auth/actor';
import { labelsOf } from '../boards/queries';
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
