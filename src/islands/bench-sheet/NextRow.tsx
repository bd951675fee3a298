import type { Suspects } from '@/contracts/bench';
import { COLUMNS, type Column } from './moves';
import { NEXT, type Grid } from './use-grid';

export type Proposal = NonNullable<Suspects['diagnosis']>['next'][number];

const bits = (value: number) => (value < 0.095 ? value.toFixed(2) : value.toFixed(1));

/** The reading that would tell most, as the last, dashed row: one key takes it. */
export function NextRow({ next, grid }: { next: Proposal; grid: Grid }) {
  const current = (column: Column) => grid.cursor.key === NEXT && grid.cursor.column === column;
  const cell = (column: Column) => ({
    role: 'gridcell',
    'data-row': NEXT,
    'data-column': column,
    tabIndex: current(column) ? 0 : -1,
    'aria-selected': current(column),
    onFocus: (event: React.FocusEvent) =>
      event.target === event.currentTarget && grid.setCursor({ key: NEXT, column }),
  });
  const words: Partial<Record<Column, string>> = {
    from: next.from,
    to: next.to,
    position: next.position,
    lifted: next.lifted.join(' '),
  };
  const name = `${next.from} to ${next.to}, ${next.position}`;
  return (
    <tr role="row" className="bench-row row-next">
      {COLUMNS.map((column) => {
        if (column === 'expected') return null;
        if (column === 'number')
          return (
            <td key={column} {...cell(column)} className="bench-number" aria-label="Proposed next">
              <span aria-hidden="true">→</span>
            </td>
          );
        if (column === 'typed')
          return (
            <td key={column} {...cell(column)} className="bench-take">
              <button
                type="button"
                className="button-text"
                aria-label={`Measure this next: ${name}`}
                aria-keyshortcuts="M"
                onClick={grid.take}
              >
                measure this <kbd>M</kbd>
              </button>
            </td>
          );
        if (column === 'scale')
          return (
            <td key={column} {...cell(column)} colSpan={2} className="bench-bits">
              next: {bits(next.bits)} bit
              {next.lifted.length > 0 && `, lift ${next.lifted.join(', ')}`}
            </td>
          );
        return (
          <td key={column} {...cell(column)} className={`bench-cell bench-${column}`}>
            <span className="bench-text">{words[column]}</span>
          </td>
        );
      })}
    </tr>
  );
}
