/** The audit log as lists: a page for the API, a file for the owner. */
import type { AuditLine, AuditQuery } from '@/contracts/audit';
import type { Queryable } from '@/db/client';
import { everyRow, pageOf, readCursor } from '../http/cursor';
import { csvResponse, type CsvColumn } from '../http/csv';
import { done, type Outcome } from '../refusal';
import { listAudit, placeOfLine } from './queries';

export async function auditPage(
  db: Queryable,
  query: AuditQuery,
  zone: string,
): Promise<Outcome<{ items: AuditLine[]; next: string | null }>> {
  const { sort, limit } = query;
  const after = readCursor(sort, query.cursor, 'date');
  if (!after.ok) return after;
  const rows = await listAudit(db, query, zone, { limit: limit + 1, after: after.value });
  return done(pageOf(rows, limit, sort, placeOfLine));
}

const COLUMNS: readonly CsvColumn<AuditLine>[] = [
  { name: 'at', value: (line) => line.at },
  { name: 'by', value: (line) => line.by.name },
  { name: 'action', value: (line) => line.action },
  { name: 'object', value: (line) => line.object },
  { name: 'detail', value: (line) => JSON.stringify(line.detail) },
  { name: 'request', value: (line) => line.requestId },
];

export const auditFile = (
  request: Request,
  db: Queryable,
  query: AuditQuery,
  zone: string,
): Response =>
  csvResponse(
    request,
    'audit',
    COLUMNS,
    everyRow((limit, after) => listAudit(db, query, zone, { limit, after }), placeOfLine),
  );
