import { useMemo } from 'react';
import type { Suspects } from '@/contracts/bench';
import { outlookOn } from '@/domain/bench/expected';
import { COLUMN_NAMES, COLUMNS, isField } from './moves';
import { NextRow } from './NextRow';
import type { Board, Phase } from './panel-props';
import { readPasted } from './pasted';
import { EMPTY, isBlank, isStruck, pointsOf, type Row } from './rows';
import { SheetRow } from './SheetRow';
import type { SheetStore } from './sheet-store';
import { useGrid } from './use-grid';

/** The rows of one phase as a grid. */
export function SheetGrid({
  rows,
  phase,
  store,
  board,
  editable,
  told,
  pointed,
}: {
  rows: readonly Row[];
  phase: Phase;
  store: SheetStore;
  board: Board;
  editable: boolean;
  told: Suspects | null;
  pointed: string | null;
}) {
  const outlook = useMemo(() => outlookOn(board), [board]);
  const diagnosis = told?.diagnosis ?? null;
  const next = editable ? diagnosis?.next[0] : undefined;
  const takeNext = next
    ? () =>
        store.fillEntry(phase, {
          ...EMPTY,
          from: next.from,
          to: next.to,
          position: next.position,
          lifted: next.lifted.join(', '),
        })
    : null;
  const grid = useGrid({ store, phase, board, editable, takeNext });
  const doubted = new Set(
    diagnosis?.doubtful.map(({ reading }) => told?.expected[reading]?.reading) ?? [],
  );

  function onPaste(event: React.ClipboardEvent) {
    const { column, key } = grid.cursor;
    if (!editable || !isField(column)) return;
    const pasted = readPasted(event.clipboardData.getData('text/plain'));
    // Plain text goes into the input by itself.
    if (pasted.kind === 'cell' && grid.edit) return;
    event.preventDefault();
    if (pasted.kind === 'cell') store.write(phase, key, { [column]: pasted.text });
    else store.paste(phase, key, column, pasted);
  }

  let number = 0;
  return (
    <table
      ref={grid.table}
      role="grid"
      aria-label="Bench sheet"
      aria-readonly={!editable}
      className="bench-grid"
      tabIndex={-1}
      onFocus={(event) => event.target === event.currentTarget && grid.go(grid.cursor)}
      onKeyDown={(event) => grid.onGridKey(event)}
      onPaste={onPaste}
    >
      <thead>
        <tr role="row">
          {COLUMNS.map((column) => (
            <th key={column} role="columnheader" scope="col" className={`bench-head-${column}`}>
              {column === 'number' ? <abbr title="Number">#</abbr> : COLUMN_NAMES[column]}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => {
          if (isStruck(row))
            return (
              <tr role="row" key={row.key} className="bench-note bench-note-soft">
                <td role="gridcell" colSpan={COLUMNS.length}>
                  <div className="bench-note-line">
                    <span role="status">
                      Struck out:{' '}
                      <s>
                        {[row.cells.from, row.cells.to, row.cells.position, row.cells.typed]
                          .filter(Boolean)
                          .join(', ')}
                      </s>
                    </span>
                    <button type="button" className="button-text" onClick={grid.undo}>
                      Bring it back
                    </button>
                  </div>
                </td>
              </tr>
            );
          number += 1;
          return (
            <SheetRow
              key={row.key}
              row={row}
              number={number}
              grid={grid}
              store={store}
              phase={phase}
              board={board}
              outlook={({ cells }) => {
                const points = pointsOf(cells, board);
                const whole = points.part !== null || (points.from !== null && points.to !== null);
                return whole ? outlook(points) : { expected: null, unusable: null };
              }}
              doubtful={row.saved !== null && doubted.has(row.saved.id)}
              pointed={pointed}
            />
          );
        })}
        {next && rows.some(isBlank) && <NextRow next={next} grid={grid} />}
      </tbody>
    </table>
  );
}
