/** Notes as lists, the API and files show them. */
import type { FaultRow } from '@/contracts/faults';
import type { faultNotes } from '@/db/schema/faults';
import type { boards } from '@/db/schema/shop';
import { FAULT_STATE_LABELS } from '@/domain/faults/states';
import { incidentLabels, kindLabels } from '@/domain/parts/words';
import { SYMPTOMS } from '@/domain/tickets/vocabulary';
import type { StaffActor } from '../auth/actor';
import { csvResponse, type CsvColumn } from '../http/csv';
import { correctionWaits, mayEdit } from './policy';

type BoardRow = typeof boards.$inferSelect;
type NoteRow = typeof faultNotes.$inferSelect;

export const boardName = (board: BoardRow | null) =>
  board && { id: board.id, label: `${board.code} rev ${board.revision}`, maker: board.maker };

/** A note as a line of a list. What only those who work on it may know is left out for the others. */
export function faultRow(
  actor: StaffActor,
  note: NoteRow,
  board: BoardRow | null,
  author: string,
): FaultRow {
  const edits = mayEdit(actor, note);
  return {
    id: note.id,
    title: note.title,
    state: note.state,
    board: boardName(board),
    partKind: note.partKind,
    incident: note.incident,
    symptoms: note.symptoms,
    author,
    own: note.createdBy === actor.id,
    correction: edits && correctionWaits(note),
    revision: edits ? note.revision : (note.publishedRevision ?? note.revision),
    publishedRevision: note.publishedRevision,
    createdAt: note.createdAt.toISOString(),
    updatedAt: note.updatedAt.toISOString(),
    publishedAt: note.publishedAt?.toISOString() ?? null,
  };
}

const COLUMNS: CsvColumn<FaultRow>[] = [
  { name: 'note', value: (n) => n.id },
  { name: 'title', value: (n) => n.title },
  { name: 'state', value: (n) => FAULT_STATE_LABELS[n.state] },
  { name: 'board', value: (n) => n.board?.label },
  { name: 'part family', value: (n) => n.partKind && kindLabels[n.partKind] },
  { name: 'incident', value: (n) => n.incident && incidentLabels[n.incident] },
  { name: 'symptoms', value: (n) => n.symptoms.map((s) => SYMPTOMS[s]).join('; ') },
  { name: 'author', value: (n) => n.author },
  { name: 'updated', value: (n) => n.updatedAt },
  { name: 'published', value: (n) => n.publishedAt },
];

/** A list of notes as a file for a spreadsheet. */
export const faultsCsv = (request: Request, rows: AsyncIterable<FaultRow>): Response =>
  csvResponse(request, 'fault-notes', COLUMNS, rows);
