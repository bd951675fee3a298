import type { FaultRow, FaultsQuery } from '@/contracts/faults';
import type { Queryable } from '@/db/client';
import { FAULT_STATE_LABELS } from '@/domain/faults/states';
import { incidentLabels, kindLabels } from '@/domain/parts/words';
import { SYMPTOMS } from '@/domain/tickets/vocabulary';
import type { StaffActor } from '../auth/actor';
import { csvResponse, type CsvColumn } from '../http/csv';
import { listFaults } from './list';

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

async function* everyRow(db: Queryable, actor: StaffActor, query: FaultsQuery) {
  let cursor: string | undefined;
  do {
    const page = await listFaults(db, actor, { ...query, cursor, limit: 200 });
    if (!page.ok) return;
    yield* page.value.items;
    cursor = page.value.next ?? undefined;
  } while (cursor);
}

/** The whole list, not one page of it. */
export function faultsCsv(
  request: Request,
  db: Queryable,
  actor: StaffActor,
  query: FaultsQuery,
): Response {
  return csvResponse(request, 'fault-notes', COLUMNS, everyRow(db, actor, query));
}
