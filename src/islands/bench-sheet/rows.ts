/** Rows of the bench sheet as they stand on the screen: what was typed, and what of it the shop has saved. */
import type { BenchReading, EditReading } from '@/contracts/bench';
import type { Points } from '@/domain/bench/types';
import { parseResistance } from '@/domain/quantities/parse';
import type { Board, Phase } from './panel-props';

export const FIELDS = ['from', 'to', 'position', 'lifted', 'typed'] as const;
export type Field = (typeof FIELDS)[number];
export type Cells = Readonly<Record<Field, string>>;

export type RowState =
  /** Not saved: being filled in. */
  | { is: 'draft' }
  | { is: 'saving' }
  | { is: 'saved' }
  /** The server was not reached; it is tried again. */
  | { is: 'failed'; words: string }
  | { is: 'refused'; words: string; field: Field | null }
  /** Somebody changed the reading meanwhile. */
  | { is: 'stale'; theirs: BenchReading; doing: 'edit' | 'strike' }
  | { is: 'struck' };

export type Row = {
  readonly key: string;
  readonly place: number;
  readonly cells: Cells;
  readonly saved: BenchReading | null;
  readonly state: RowState;
  /** After repair: the points of a row as found, waiting for a value. */
  readonly offered: boolean;
};

export const EMPTY: Cells = { from: '', to: '', position: '', lifted: '', typed: '' };

/** A saved reading as its cells show it; a part stands in From, with To empty. */
export function cellsOf(reading: BenchReading): Cells {
  return {
    from: reading.part ?? reading.from ?? '',
    to: reading.to ?? '',
    position: reading.position ?? '',
    lifted: (reading.lifted ?? []).join(', '),
    typed: reading.typed,
  };
}

export const savedRow = (reading: BenchReading): Row => ({
  key: `r${reading.id}`,
  place: reading.place,
  cells: cellsOf(reading),
  saved: reading,
  state: { is: 'saved' },
  offered: false,
});

/** References in the Lifted cell, set apart by commas or spaces. */
export const liftedOf = (text: string): string[] => text.split(/[\s,;]+/).filter(Boolean);

/** The points the cells name. From alone, when it is no net, is a part with the leads straight on it. */
export function pointsOf(cells: Cells, board: Board): Points {
  const isNet = board.nets.some(({ name }) => name === cells.from);
  const straight = cells.to === '' && cells.from !== '' && !isNet;
  return {
    from: straight ? null : cells.from || null,
    to: straight ? null : cells.to || null,
    part: straight ? cells.from : null,
    position: cells.position || null,
    lifted: liftedOf(cells.lifted),
  };
}

/** What keeps the row from being saved, and the field it concerns; null when nothing does. */
export function missingOf(cells: Cells, board: Board): { field: Field; words: string } | null {
  const { from, to, part } = pointsOf(cells, board);
  if (part === null && from === null)
    return { field: 'from', words: 'From is missing: a net, or a part to measure straight on it.' };
  if (part === null && to === null) return { field: 'to', words: 'To is missing: name its net.' };
  if (part === null && from === to)
    return { field: 'to', words: 'Both points are the same: give two different points.' };
  const read = parseResistance(cells.typed);
  return read.ok ? null : { field: 'typed', words: sentence(read.reason) };
}

const sentence = (words: string) =>
  `${words.charAt(0).toUpperCase()}${words.slice(1)}${words.endsWith('.') ? '' : '.'}`;

/** What is sent for a complete row; null while something is missing. */
export function bodyOf(row: Row, phase: Phase, board: Board): EditReading | null {
  if (missingOf(row.cells, board)) return null;
  return { ...pointsOf(row.cells, board), phase, place: row.place, typed: row.cells.typed };
}

/** True when the cells say something else than the shop has saved. */
export function isChanged({ cells, saved }: Row): boolean {
  if (!saved) return true;
  const kept = cellsOf(saved);
  return FIELDS.some((field) => cells[field] !== kept[field]);
}

/** True when nothing was typed that could be lost. */
export const isBlank = ({ saved, cells }: Row): boolean => !saved && cells.typed === '';

export const isStruck = ({ state }: Row): boolean => state.is === 'struck';

/** An empty row after the others: it copies the switch position of the row above, and From unless it is a part. */
export function entryAfter(rows: readonly Row[], key: string): Row {
  const above = rows.findLast((row) => !isStruck(row));
  const place = rows.reduce((most, row) => Math.max(most, row.place + 1), 0);
  return {
    key,
    place,
    cells: {
      ...EMPTY,
      from: above && above.cells.to !== '' ? above.cells.from : '',
      position: above?.cells.position ?? '',
    },
    saved: null,
    state: { is: 'draft' },
    offered: false,
  };
}

const samePoints = (a: Cells, b: Cells) =>
  (['from', 'to', 'position', 'lifted'] as const).every((field) => a[field] === b[field]);

/** For the sheet after repair: the points measured as found that have no reading there yet. */
export function offeredRows(found: readonly Row[], after: readonly Row[]): Row[] {
  return found
    .filter((row) => row.saved && !isStruck(row))
    .filter((row) => after.every((other) => !samePoints(other.cells, row.cells)))
    .map((row) => ({
      key: `o${row.saved?.id ?? row.key}`,
      place: row.place,
      cells: { ...row.cells, typed: '' },
      saved: null,
      state: { is: 'draft' },
      offered: true,
    }));
}
