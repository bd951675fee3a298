/** The cursor of the sheet and the cell being edited, and where the keys take them. */
import { useLayoutEffect, useRef, useState } from 'react';
import { parseResistance } from '@/domain/quantities/parse';
import { beginsWith, candidatesFor, matching, settled, taking } from './completion';
import { isField, moveBy, nextEmpty, tabFrom, type Column } from './moves';
import type { Board, Phase } from './panel-props';
import { isBlank, isStruck, pointsOf, type Field, type Row } from './rows';
import type { SheetStore } from './sheet-store';

/** The row of the proposed reading, among the keys of the others. */
export const NEXT = 'next';

export type Cursor = { key: string; column: Column };
/** `pick` is the candidate that Enter takes; -1 for the text itself. */
export type Edit = { text: string; touched: boolean; pick: number };

type Options = {
  store: SheetStore;
  phase: Phase;
  board: Board;
  editable: boolean;
  /** Takes the proposed reading; answers the key of the row it went to. */
  takeNext: (() => string | null) | null;
};

export type Grid = ReturnType<typeof useGrid>;

export function useGrid({ store, phase, board, editable, takeNext }: Options) {
  const [cursor, setCursor] = useState<Cursor>(() => {
    const rows = store.snapshot().sheets[phase].filter((row) => !isStruck(row));
    const start = rows.find(isBlank) ?? rows[0];
    const column = start?.offered ? 'typed' : 'from';
    return { key: start?.key ?? '', column };
  });
  const [edit, setEditState] = useState<Edit | null>(null);
  const editing = useRef<Edit | null>(null);
  const table = useRef<HTMLTableElement>(null);
  const focusDue = useRef(false);

  const rowsNow = () => store.snapshot().sheets[phase].filter((row) => !isStruck(row));
  const rowAt = (key: string) => rowsNow().find((row) => row.key === key);
  const setEdit = (next: Edit | null) => {
    editing.current = next;
    setEditState(next);
  };
  const go = (to: Cursor) => {
    focusDue.current = true;
    setEdit(null);
    // A copy, so that going to where the cursor is moves the focus there too.
    setCursor({ ...to });
  };

  useLayoutEffect(() => {
    if (!focusDue.current) return;
    focusDue.current = false;
    const cell = table.current?.querySelector<HTMLElement>(
      `[data-row="${cursor.key}"][data-column="${cursor.column}"]`,
    );
    (cell?.querySelector('input') ?? cell)?.focus();
  });

  /** Opens the cell: with its text, or empty to be written anew. */
  function open(at: Cursor, keep: boolean) {
    const row = rowAt(at.key);
    if (!row || !editable || !isField(at.column)) return;
    focusDue.current = true;
    setCursor(at);
    setEdit({ text: keep ? row.cells[at.column] : '', touched: !keep, pick: -1 });
  }

  function choices(field: Field, text: string, touched: boolean) {
    return matching(field, touched ? text : '', candidatesFor(field, board));
  }

  /** Ends editing and writes the cell; `chosen` is a candidate taken instead of the text. */
  function commit(chosen?: string): Row | undefined {
    const now = editing.current;
    const { column, key } = cursor;
    if (!now || !isField(column)) return rowAt(key);
    const picked = chosen ?? choices(column, now.text, now.touched)[now.pick]?.name;
    const candidates = candidatesFor(column, board);
    const text =
      picked !== undefined
        ? taking(column, now.touched ? now.text : '', picked)
        : settled(column, now.text, candidates);
    setEdit(null);
    if (now.touched || picked !== undefined) store.write(phase, key, { [column]: text });
    return rowAt(key);
  }

  const wanted: Field[] =
    board.positions.length > 0 ? ['from', 'to', 'position', 'typed'] : ['from', 'to', 'typed'];
  /** Beside a part in From, To stays empty. */
  const wantedIn = (row: Row): Field[] =>
    pointsOf(row.cells, board).part === null ? wanted : wanted.filter((field) => field !== 'to');

  /** On from a row that is done: to what is empty in the next one, else to its reading. */
  function goBelow(key: string) {
    const rows = rowsNow();
    const below = rows[rows.findIndex((row) => row.key === key) + 1];
    if (!below) return go({ key, column: 'typed' });
    const column = isBlank(below)
      ? (nextEmpty(below.cells, wantedIn(below), 'number') ?? 'typed')
      : 'typed';
    go({ key: below.key, column });
  }

  /** Enter: to the next empty cell of the row; from a finished row to the one below. */
  function goOn(row: Row | undefined, column: Column) {
    if (!row) return;
    const empty = nextEmpty(row.cells, wantedIn(row), column);
    const refused = row.cells.typed !== '' && !parseResistance(row.cells.typed).ok;
    if (column === 'typed' && refused) return open({ key: row.key, column: 'typed' }, true);
    if (empty && (column !== 'typed' || empty !== 'position'))
      return go({ key: row.key, column: empty });
    goBelow(row.key);
  }

  function take() {
    const key = takeNext?.();
    if (key) go({ key, column: 'typed' });
  }

  /** True when the key does not begin a name that fits the cell. */
  const isTakeKey = (event: React.KeyboardEvent, column: Column) =>
    takeNext !== null &&
    (event.key.toLowerCase() === 'm' || (event.altKey && event.code === 'KeyM')) &&
    (event.altKey || column === 'typed' || !isField(column) || !beginsWith(column, 'm', board));

  return {
    editable,
    table,
    cursor,
    edit,
    open,
    take,
    commit,
    choices,
    go,
    goBelow,
    setCursor,
    change: (text: string, pick: number) => setEdit({ text, touched: true, pick }),
    pick: (pick: number) => editing.current && setEdit({ ...editing.current, pick }),

    /** A candidate pointed at: it is taken, and the next cell opened where a finger did it. */
    choose(name: string, byFinger: boolean) {
      const { key, column } = cursor;
      commit(name);
      const next = tabFrom(column, false);
      if (next && byFinger) open({ key, column: next }, true);
      else go({ key, column: next ?? column });
    },

    /** One of the two readings that an ambiguous text may have meant. */
    chooseReading(key: string, typed: string) {
      setEdit(null);
      store.write(phase, key, { typed });
      goBelow(key);
    },

    strike(key: string) {
      const rows = rowsNow();
      const at = rows.findIndex((row) => row.key === key);
      const near = rows[at + 1] ?? rows[at - 1];
      void store.strike(phase, key);
      if (near) go({ key: near.key, column: cursor.column });
    },

    undo() {
      const key = store.undo(phase);
      if (key) go({ key, column: 'typed' });
    },

    /** Keys while a cell is being edited; `options` are offered and `active` of them is marked. */
    onEditKey(event: React.KeyboardEvent, options: number, active: number) {
      const { column, key } = cursor;
      const now = editing.current;
      if (!now) return;
      if (event.key === 'Enter') {
        event.preventDefault();
        goOn(commit(), column);
      } else if (event.key === 'Escape') {
        event.preventDefault();
        go(cursor);
      } else if (event.key === 'Tab') {
        const ambiguous = column === 'typed' && isAmbiguous(now.text);
        const next = ambiguous ? null : tabFrom(column, event.shiftKey);
        commit();
        if (!next) return;
        event.preventDefault();
        go({ key, column: next });
      } else if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
        event.preventDefault();
        const step = event.key === 'ArrowDown' ? 1 : -1;
        if (options > 0) {
          setEdit({
            ...now,
            pick: (Math.max(active, step > 0 ? -1 : 0) + step + options) % options,
          });
          return;
        }
        commit();
        const rows = rowsNow();
        const at = rows.findIndex((row) => row.key === key);
        const to = rows[Math.min(rows.length - 1, Math.max(0, at + step))];
        if (to) go({ key: to.key, column });
      }
    },

    /** Keys while the cursor stands on a cell. */
    onGridKey(event: React.KeyboardEvent) {
      // What was typed into an input or pressed on a button is theirs, also once the editing has ended.
      const { target } = event;
      if (target instanceof HTMLInputElement || target instanceof HTMLButtonElement) return;
      const { column, key } = cursor;
      const keys = [...rowsNow().map((row) => row.key), ...(takeNext ? [NEXT] : [])];
      const row = Math.max(0, keys.indexOf(key));
      const ctrl = event.ctrlKey || event.metaKey;
      const moved = moveBy(event.key, { row, column }, keys.length, ctrl);
      if (moved) {
        event.preventDefault();
        go({ key: keys[moved.row] ?? key, column: moved.column });
      } else if (event.key === 'Tab') {
        const next = key === NEXT ? null : tabFrom(column, event.shiftKey);
        if (!next) return;
        event.preventDefault();
        go({ key, column: next });
      } else if (!editable) return;
      else if (ctrl && event.key.toLowerCase() === 'z') {
        event.preventDefault();
        this.undo();
      } else if (ctrl) return;
      else if (isTakeKey(event, column) || (key === NEXT && event.key === 'Enter')) {
        event.preventDefault();
        take();
      } else if (key === NEXT) return;
      else if (event.key === 'Delete') {
        event.preventDefault();
        this.strike(key);
      } else if (event.key === 'Enter' || event.key === 'F2') {
        event.preventDefault();
        open(cursor, true);
      } else if (event.key === 'Backspace') {
        event.preventDefault();
        open(cursor, false);
      } else if (event.key.length === 1 || event.key === 'Dead' || event.key === 'Process') {
        // The letter itself goes into the input that now has the focus.
        open(cursor, false);
      }
    },
  };
}

/** True for a text with two readings, such as 1,600. */
export function isAmbiguous(text: string): boolean {
  const read = parseResistance(text);
  return !read.ok && (read.could?.length ?? 0) > 0;
}
