/** Reading the audit log. */
import { and, asc, count, desc, eq, gte, like, lt, ne, or, type SQL } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { audit } from '@/db/schema/people';
import { BUT_SIGN_INS, SIGN_IN, type AuditLine, type AuditQuery } from '@/contracts/audit';
import { startOfDay } from '@/domain/time/shop-day';
import { containing } from '../customers/queries';
import { afterPlace, type Place } from '../http/cursor';

type Filter = Pick<AuditQuery, 'q' | 'action' | 'by' | 'from' | 'to'>;

function actionIs(action: string): SQL | undefined {
  if (action === '') return undefined;
  if (action === BUT_SIGN_INS) return ne(audit.action, SIGN_IN);
  return action.endsWith('.')
    ? like(audit.action, containing(action).slice(1))
    : eq(audit.action, action);
}

function matching({ q, action, by, from, to }: Filter, zone: string): SQL | undefined {
  const pattern = containing(q);
  return and(
    q ? or(like(audit.object, pattern), like(audit.actorName, pattern)) : undefined,
    actionIs(action),
    by ? eq(audit.actorId, by) : undefined,
    from ? gte(audit.at, startOfDay(from, zone)) : undefined,
    to ? lt(audit.at, startOfDay(to, zone, 1)) : undefined,
  );
}

const lineOf = (row: typeof audit.$inferSelect): AuditLine => ({
  id: row.id,
  at: row.at.toISOString(),
  by: { id: row.actorId, name: row.actorName },
  action: row.action,
  object: row.object,
  detail: row.detail,
  requestId: row.requestId,
});

export const placeOfLine = (line: AuditLine): Place => ({ value: new Date(line.at), id: line.id });

/** The lines that match, in order: from a place on, or from a number of rows on. */
export async function listAudit(
  db: Queryable,
  query: Filter & Pick<AuditQuery, 'sort'>,
  zone: string,
  part: { limit: number; after?: Place | undefined; offset?: number },
): Promise<AuditLine[]> {
  const descending = query.sort === '-at';
  const way = descending ? desc : asc;
  const after = part.after && afterPlace(audit.at, audit.id, part.after, descending);
  const rows = await db
    .select()
    .from(audit)
    .where(and(matching(query, zone), after))
    .orderBy(way(audit.at), way(audit.id))
    .limit(part.limit)
    .offset(part.offset ?? 0);
  return rows.map(lineOf);
}

export async function countAudit(db: Queryable, query: Filter, zone: string): Promise<number> {
  const [row] = await db.select({ n: count() }).from(audit).where(matching(query, zone));
  return row?.n ?? 0;
}

/** The actions that stand in the log, for the filter. */
export async function auditActions(db: Queryable): Promise<string[]> {
  const rows = await db
    .selectDistinct({ action: audit.action })
    .from(audit)
    .orderBy(asc(audit.action));
  return rows.map(({ action }) => action);
}

/** The latest lines about one thing. */
export async function linesAbout(
  db: Queryable,
  object: string,
  limit: number,
): Promise<AuditLine[]> {
  const rows = await db
    .select()
    .from(audit)
    .where(eq(audit.object, object))
    .orderBy(desc(audit.at), desc(audit.id))
    .limit(limit);
  return rows.map(lineOf);
}
