/** Paging by the last row given: a list that grows meanwhile neither repeats nor loses a row. */
import { Column, is, sql, type AnyColumn, type SQL } from 'drizzle-orm';
import { done, refuseField, type Outcome } from '../refusal';

/** Where a page ended: the sorted column's value and the key of its last row. */
export type Place = { value: string | number | Date; id: number };
/** What the sorted column holds, as Drizzle names it. */
export type Held = 'string' | 'number' | 'date';

const wrong = () => refuseField('cursor', 'Not a cursor of this list and order: begin anew.');

/** The opaque text of a place. It holds the order, so that it cannot be used with another. */
export function writeCursor(sort: string, { value, id }: Place): string {
  const kept = value instanceof Date ? { at: value.getTime() } : value;
  return Buffer.from(JSON.stringify([sort, kept, id])).toString('base64url');
}

/**
 * The place again; undefined when there is no cursor, a refusal when it is not one of this order or its value is not
 * of the kind that the sorted column holds.
 */
export function readCursor(
  sort: string,
  cursor: string | undefined,
  held: Held,
): Outcome<Place | undefined> {
  if (cursor === undefined) return done(undefined);
  let parts: unknown;
  try {
    parts = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
  } catch {
    return wrong();
  }
  if (!Array.isArray(parts) || parts.length !== 3 || parts[0] !== sort) return wrong();
  const [, kept, id] = parts as unknown[];
  if (typeof id !== 'number' || !Number.isSafeInteger(id)) return wrong();
  if (held !== 'date')
    return typeof kept === held && (typeof kept === 'string' || Number.isFinite(kept))
      ? done({ value: kept as string | number, id })
      : wrong();
  const at = (kept as { at?: unknown } | null)?.at;
  if (typeof at !== 'number' || Math.abs(at) > 8.64e15) return wrong();
  return done({ value: new Date(at), id });
}

/** The rows after a place. `column`, or what is computed of it, must not be null; `key` breaks ties the same way. */
export function afterPlace(
  column: AnyColumn | SQL,
  key: AnyColumn,
  { value, id }: Place,
  descending: boolean,
): SQL {
  const past = sql.raw(descending ? '<' : '>');
  const given = is(column, Column) ? sql.param(value, column) : sql.param(value);
  return sql`(${column} ${past} ${given} OR (${column} = ${given} AND ${key} ${past} ${id}))`;
}

/**
 * Cuts what was read (`limit + 1` rows) to a page and names the next one.
 *
 * @param placeOf the place of a row in the order of the list.
 */
export function pageOf<Row>(
  rows: readonly Row[],
  limit: number,
  sort: string,
  placeOf: (row: Row) => Place,
): { items: Row[]; next: string | null } {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  const next = rows.length > limit && last !== undefined ? writeCursor(sort, placeOf(last)) : null;
  return { items, next };
}

/** Every row of a list, read in batches: what an export walks. */
export async function* everyRow<Row>(
  read: (limit: number, after: Place | undefined) => Promise<Row[]>,
  placeOf: (row: Row) => Place,
): AsyncGenerator<Row> {
  const batch = 500;
  let after: Place | undefined;
  for (;;) {
    const rows = await read(batch, after);
    yield* rows;
    const last = rows.at(-1);
    if (rows.length < batch || last === undefined) return;
    after = placeOf(last);
  }
}
