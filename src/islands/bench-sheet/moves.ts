/** Where the keys lead on the sheet. */
import type { Cells, Field } from './rows';

export const COLUMNS = [
  'number',
  'from',
  'to',
  'position',
  'lifted',
  'typed',
  'scale',
  'expected',
] as const;
export type Column = (typeof COLUMNS)[number];

export const COLUMN_NAMES: Readonly<Record<Column, string>> = {
  number: 'Number',
  from: 'From',
  to: 'To',
  position: 'Switch',
  lifted: 'Lifted',
  typed: 'Reading',
  scale: 'Against healthy',
  expected: 'Expected',
};

export const isField = (column: Column): column is Field =>
  column !== 'number' && column !== 'scale' && column !== 'expected';

/** Row by its place from the top. */
export type Place = { row: number; column: Column };

const ROWS_A_PAGE = 10;

const columnAt = (index: number): Column =>
  COLUMNS[Math.min(COLUMNS.length - 1, Math.max(0, index))] ?? 'number';

/** Where an arrow, Home, End, Page Up or Page Down leads; null for any other key. Edges hold. */
export function moveBy(key: string, from: Place, rows: number, ctrl = false): Place | null {
  const at = COLUMNS.indexOf(from.column);
  const row = (to: number) => ({ ...from, row: Math.min(rows - 1, Math.max(0, to)) });
  switch (key) {
    case 'ArrowUp':
      return row(from.row - 1);
    case 'ArrowDown':
      return row(from.row + 1);
    case 'ArrowLeft':
      return { ...from, column: columnAt(at - 1) };
    case 'ArrowRight':
      return { ...from, column: columnAt(at + 1) };
    case 'PageUp':
      return row(from.row - ROWS_A_PAGE);
    case 'PageDown':
      return row(from.row + ROWS_A_PAGE);
    case 'Home':
      return { row: ctrl ? 0 : from.row, column: 'number' };
    case 'End':
      return { row: ctrl ? rows - 1 : from.row, column: 'expected' };
    default:
      return null;
  }
}

/** Tab's way through a row. Lifted is off it: it is seldom filled, and the arrows reach it. */
const TAB_STOPS: readonly Column[] = ['from', 'to', 'position', 'typed'];

/** Where Tab leads inside the row; null when it leaves the sheet. */
export function tabFrom(column: Column, back: boolean): Column | null {
  const order = back ? TAB_STOPS.toReversed() : TAB_STOPS;
  const passed = (stop: Column) =>
    back
      ? COLUMNS.indexOf(stop) < COLUMNS.indexOf(column)
      : COLUMNS.indexOf(stop) > COLUMNS.indexOf(column);
  return order.find(passed) ?? null;
}

/** The empty cell of the row to go to next: after this column first, else before it; null when none is left. */
export function nextEmpty(cells: Cells, wanted: readonly Field[], after: Column): Field | null {
  const empty = wanted.filter((field) => cells[field] === '' && field !== after);
  const later = empty.find((field) => COLUMNS.indexOf(field) > COLUMNS.indexOf(after));
  return later ?? empty[0] ?? null;
}
