/** The rows of both phases and their saving. Outside React, so that saves go on whatever is drawn. */
import type { BenchReading } from '@/contracts/bench';
import { MAX_READINGS } from '@/contracts/compute';
import { named } from './completion';
import type { Board, Phase } from './panel-props';
import type { PasteReport } from './paste-report';
import type { Pasted } from './pasted';
import {
  bodyOf,
  entryAfter,
  isBlank,
  isChanged,
  isStruck,
  missingOf,
  offeredRows,
  savedRow,
  cellsOf,
  type Cells,
  type Field,
  type Row,
} from './rows';
import { savingOf, type Ask, type Outcome } from './saving';

export type Sheets = Readonly<Record<Phase, readonly Row[]>>;
/** What the screen draws: the rows, and how often each phase was saved since the page was made. */
export type Snapshot = {
  sheets: Sheets;
  saves: Readonly<Record<Phase, number>>;
  /** What became of the last paste; null once something else was done. */
  pasted: Readonly<Record<Phase, PasteReport | null>>;
};

export type SheetStore = ReturnType<typeof openSheet>;

type Options = {
  ticketNumber: string;
  board: Board;
  readings: readonly BenchReading[];
  editable: boolean;
  ask: Ask;
  newClientKey: () => string;
};

export function openSheet(options: Options) {
  const { board, editable } = options;
  const saving = savingOf(options.ticketNumber, options.ask);
  const clientKeys = new Map<string, string>();
  const busy = new Set<string>();
  /** Rows to strike once the save that is under way has ended. */
  const toStrike = new Set<string>();
  const listeners = new Set<() => void>();
  /** Rows of a paste that was taken back: no line stays to bring them back by. */
  const unpasted = new Set<string>();
  /** Offered rows that were struck. */
  const refused = new Set<string>();
  let made = 0;
  const newKey = () => `n${(made += 1)}`;

  /** There is always one empty row at the end to type into, until the sheet is full. */
  function withEntry(rows: readonly Row[]): readonly Row[] {
    if (!editable || rows.filter((r) => !isStruck(r)).length >= MAX_READINGS) return rows;
    const last = rows.findLast((row) => !isStruck(row));
    return last && isBlank(last) && !last.offered ? rows : [...rows, entryAfter(rows, newKey())];
  }
  const opened = (phase: Phase) =>
    options.readings.filter((reading) => reading.phase === phase).map(savedRow);
  const found = opened('as-found');
  const after = opened('after-repair');
  let now: Snapshot = {
    sheets: { 'as-found': withEntry(found), 'after-repair': withEntry(after) },
    saves: { 'as-found': 0, 'after-repair': 0 },
    pasted: { 'as-found': null, 'after-repair': null },
  };
  /** For each phase the rows a paste wrote, with the cells they had; null when the last deed was no paste. */
  const toUnpaste: Record<Phase, Map<string, Cells | null> | null> = {
    'as-found': null,
    'after-repair': null,
  };

  function publish(phase: Phase, rows: readonly Row[], saved = 0) {
    now = {
      ...now,
      sheets: { ...now.sheets, [phase]: withEntry(rows) },
      saves: { ...now.saves, [phase]: now.saves[phase] + saved },
    };
    for (const listener of listeners) listener();
  }
  const rowOf = (phase: Phase, key: string) => now.sheets[phase].find((row) => row.key === key);
  function change(phase: Phase, key: string, by: Partial<Row>, saved = 0) {
    const rows = now.sheets[phase].map((row) => (row.key === key ? { ...row, ...by } : row));
    publish(phase, rows, saved);
  }

  function fail(phase: Phase, key: string, outcome: Outcome, doing: 'edit' | 'strike') {
    if (outcome.is === 'stale')
      change(phase, key, { state: { is: 'stale', theirs: outcome.theirs, doing } });
    else if (outcome.is === 'unreachable')
      change(phase, key, { state: { is: 'failed', words: outcome.words } });
    else if (outcome.is === 'refused')
      change(phase, key, { state: { is: 'refused', words: outcome.words, field: outcome.field } });
  }

  /** Saves what the row says, and again while it changes meanwhile. One request a row at a time. */
  async function save(phase: Phase, key: string): Promise<void> {
    if (busy.has(key)) return;
    busy.add(key);
    try {
      for (;;) {
        const row = rowOf(phase, key);
        const body = row && !isStruck(row) && isChanged(row) ? bodyOf(row, phase, board) : null;
        if (!row || !body) return;
        change(phase, key, { state: { is: 'saving' }, offered: false });
        const clientKey = clientKeys.get(key) ?? options.newClientKey();
        clientKeys.set(key, clientKey);
        const outcome = row.saved
          ? await saving.edit(row.saved, body)
          : await saving.add(body, clientKey);
        if (outcome.is !== 'done') return fail(phase, key, outcome, 'edit');
        // Cells that nobody touched meanwhile become what the shop keeps; a repeated entry may answer an older text.
        const untouched = row.saved !== null && rowOf(phase, key)?.cells === row.cells;
        const cells = untouched ? { cells: cellsOf(outcome.reading) } : {};
        change(phase, key, { saved: outcome.reading, state: { is: 'saved' }, ...cells }, 1);
      }
    } finally {
      busy.delete(key);
      if (toStrike.delete(key)) void strike(phase, key);
    }
  }

  /** What is done by hand after a paste is undone before it, and by itself. */
  function forgetPaste(phase: Phase) {
    toUnpaste[phase] = null;
    if (now.pasted[phase]) now = { ...now, pasted: { ...now.pasted, [phase]: null } };
  }

  async function strike(phase: Phase, key: string): Promise<void> {
    const row = rowOf(phase, key);
    if (!row || isStruck(row)) return;
    if (busy.has(key)) {
      toStrike.add(key);
      return;
    }
    const traceless = unpasted.delete(key);
    const others = () => now.sheets[phase].filter((other) => other.key !== key);
    const kept = now.sheets[phase].filter((other) => other.key === key || !isStruck(other));
    if (!row.saved) {
      clientKeys.delete(key);
      if (row.offered) refused.add(key);
      publish(phase, kept);
      if (isBlank(row) || traceless) publish(phase, others());
      else change(phase, key, { state: { is: 'struck' } });
      return;
    }
    busy.add(key);
    publish(phase, kept);
    change(phase, key, { state: { is: 'saving' } });
    const outcome = await saving.strike(row.saved);
    busy.delete(key);
    if (outcome.is !== 'gone') return fail(phase, key, outcome, 'strike');
    clientKeys.delete(key);
    if (traceless) publish(phase, others(), 1);
    else change(phase, key, { saved: null, state: { is: 'struck' } }, 1);
  }

  function write(phase: Phase, key: string, cells: Partial<Cells>) {
    const row = rowOf(phase, key);
    if (!row || !editable) return;
    const next = { ...row, cells: { ...row.cells, ...cells } };
    const waiting = missingOf(next.cells, board) !== null;
    const state = waiting && row.state.is !== 'saving' ? ({ is: 'draft' } as const) : row.state;
    change(phase, key, { cells: next.cells, state });
    if (isChanged(next)) void save(phase, key);
    else if (row.saved && !busy.has(key)) change(phase, key, { state: { is: 'saved' } });
  }

  return {
    subscribe(listener: () => void) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    snapshot: () => now,
    /** Writes cells of a row, and saves the row when nothing is missing. */
    write(phase: Phase, key: string, cells: Partial<Cells>) {
      forgetPaste(phase);
      write(phase, key, cells);
    },
    /** Offers, after the repair, the points measured as found that have no reading there yet. */
    offer() {
      if (!editable) return;
      const rows = now.sheets['after-repair'].filter((row) => !isBlank(row) || row.offered);
      const offers = offeredRows(now.sheets['as-found'], rows);
      publish('after-repair', [...rows, ...offers.filter(({ key }) => !refused.has(key))]);
    },
    /** Puts cells into the empty row at the end, and answers its key; null when the sheet is full. */
    fillEntry(phase: Phase, cells: Cells): string | null {
      const entry = now.sheets[phase].findLast((row) => isBlank(row) && !isStruck(row));
      if (!entry || entry.offered || !editable) return null;
      write(phase, entry.key, cells);
      return entry.key;
    },
    /**
     * Pasted lines become rows at the end; a column of values goes down from the cell it was pasted into. What can be
     * saved is saved, the rest stays to be corrected; lines without a reading, and those for which there is no room,
     * are not taken. The snapshot says what became of each.
     */
    paste(phase: Phase, key: string, field: Field, pasted: Exclude<Pasted, { kind: 'cell' }>) {
      if (!editable) return;
      const before = new Map<string, Cells | null>();
      const report = { taken: 0, empty: [] as number[], beyond: 0 };
      const put = (row: Row, cells: Partial<Cells>) => {
        before.set(row.key, isBlank(row) ? null : row.cells);
        write(phase, row.key, cells);
        report.taken += 1;
      };
      if (pasted.kind === 'rows')
        pasted.rows.forEach((cells, i) => {
          const entry = now.sheets[phase].findLast((row) => isBlank(row) && !isStruck(row));
          if (cells.typed === '') report.empty.push(pasted.lines[i] ?? i + 1);
          else if (entry) put(entry, named(cells, board));
          else report.beyond += 1;
        });
      else {
        let at = now.sheets[phase].findIndex((row) => row.key === key);
        for (const value of pasted.values) {
          while (now.sheets[phase][at] && isStruck(now.sheets[phase][at] as Row)) at += 1;
          const row = now.sheets[phase][at];
          if (row) put(row, { [field]: value });
          else report.beyond += 1;
          at += 1;
        }
      }
      toUnpaste[phase] = before.size > 0 ? before : null;
      now = { ...now, pasted: { ...now.pasted, [phase]: report } };
      publish(phase, now.sheets[phase]);
    },
    strike(phase: Phase, key: string) {
      forgetPaste(phase);
      return strike(phase, key);
    },
    /** Takes the last paste back whole, else brings the struck row back; answers a row to go to. */
    undo(phase: Phase): string | null {
      const before = toUnpaste[phase];
      if (before) {
        forgetPaste(phase);
        for (const [key, cells] of before) {
          if (cells) write(phase, key, cells);
          else {
            unpasted.add(key);
            void strike(phase, key);
          }
        }
        publish(phase, now.sheets[phase]);
        return now.sheets[phase].findLast(isBlank)?.key ?? null;
      }
      const struck = now.sheets[phase].find(isStruck);
      if (!struck) return null;
      change(phase, struck.key, { state: { is: 'draft' } });
      void save(phase, struck.key);
      return struck.key;
    },
    retry: save,
    /** Tries every row again that did not reach the server. */
    retryAll() {
      for (const phase of ['as-found', 'after-repair'] as const)
        for (const row of now.sheets[phase])
          if (row.state.is === 'failed') void save(phase, row.key);
    },
    /** After a clash: `mine` writes over the other version, `theirs` takes it. */
    async settle(phase: Phase, key: string, choice: 'mine' | 'theirs') {
      const row = rowOf(phase, key);
      if (!row || row.state.is !== 'stale') return;
      const { theirs, doing } = row.state;
      if (choice === 'theirs') {
        change(phase, key, { saved: theirs, cells: cellsOf(theirs), state: { is: 'saved' } }, 1);
        return;
      }
      change(phase, key, { saved: theirs, state: { is: 'draft' } });
      await (doing === 'strike' ? strike(phase, key) : save(phase, key));
    },
    /** True while something typed has not reached the shop. */
    unsaved: () =>
      (['as-found', 'after-repair'] as const).some((phase) =>
        now.sheets[phase].some(
          (row) =>
            !isStruck(row) &&
            row.cells.typed !== '' &&
            (isChanged(row) || row.state.is === 'saving'),
        ),
      ),
  };
}
