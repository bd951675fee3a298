import { useId } from 'react';
import { writeExpected, type Outlook } from '@/domain/bench/expected';
import { parseResistance } from '@/domain/quantities/parse';
import { pointing } from '../shared/pointing';
import { ReadingScale } from '../shared/ReadingScale';
import { planReading } from '../shared/scale-geometry';
import { Aligned } from './Aligned';
import { FieldCell } from './FieldCell';
import { COLUMNS, type Column } from './moves';
import type { BenchPanelProps, Phase } from './panel-props';
import { partOf } from './part-of-row';
import { FIELDS, missingOf, pointsOf, type Field, type Row } from './rows';
import { noteOf, RowNote } from './RowNote';
import type { SheetStore } from './sheet-store';
import type { Grid } from './use-grid';

/** The ends of every row's scale, Ω: needles compare down the column. */
const SCALE = { min: 0.1, max: 1e8 } as const;

/** What each state says after the number; nothing needs saying of a row that is being filled in. */
const STATE_MARKS = {
  draft: null,
  saving: ['…', 'saving'],
  saved: ['✓', 'saved'],
  failed: ['!', 'not saved'],
  refused: ['!', 'not saved'],
  stale: ['!', 'changed by somebody else'],
  struck: null,
} as const;

function measuredIn(row: Row): number | 'OL' | null {
  const read = parseResistance(row.cells.typed);
  if (!read.ok) return null;
  return read.kind === 'over-range' ? 'OL' : read.ohms;
}

export function SheetRow({
  row,
  number,
  grid,
  store,
  phase,
  board,
  outlook,
  doubtful,
  pointed,
}: {
  row: Row;
  number: number;
  grid: Grid;
  store: SheetStore;
  phase: Phase;
  board: Pick<BenchPanelProps, 'positions' | 'nets' | 'parts'>;
  outlook: (row: Row) => Outlook;
  doubtful: boolean;
  /** The part somebody points at. */
  pointed: string | null;
}) {
  const note = useId();
  const points = pointsOf(row.cells, board);
  const ref = partOf(points, board.parts);
  const { expected, unusable } = outlook(row);
  const measured = measuredIn(row);
  const limits = expected && { predicted: expected.ohms, low: expected.low, high: expected.high };
  const verdict =
    measured !== null && limits
      ? planReading(measured, limits, SCALE.min, SCALE.max).verdict
      : null;
  const off = verdict === 'above' || verdict === 'below';
  const current = (column: Column) => grid.cursor.key === row.key && grid.cursor.column === column;
  const editing = grid.cursor.key === row.key && grid.edit !== null;
  const missing = missingOf(row.cells, board);
  const said = noteOf(row, {
    typed: editing && current('typed') ? (grid.edit?.text ?? '') : row.cells.typed,
    editing,
    missing: missing?.words ?? null,
    unusable,
  });
  const wrong = (field: Field) => {
    if (!said) return undefined;
    const at = row.state.is === 'refused' ? row.state.field : (missing?.field ?? 'typed');
    return field === at ? note : undefined;
  };
  const mark = STATE_MARKS[row.state.is];
  const expectedText = expected ? writeExpected(expected.ohms) : '';
  const where = points.part ?? `${points.from ?? '?'} to ${points.to ?? '?'}`;
  const plain = (column: Column) => ({
    role: 'gridcell',
    'data-row': row.key,
    'data-column': column,
    tabIndex: current(column) ? 0 : -1,
    'aria-selected': current(column),
    onFocus: () => grid.setCursor({ key: row.key, column }),
  });
  const classes = [
    'bench-row',
    doubtful ? 'row-caution' : off ? 'row-danger' : '',
    row.saved ? '' : 'bench-unsaved',
    row.state.is === 'failed' || row.state.is === 'refused' ? 'bench-failed' : '',
    ref !== null && ref === pointed ? 'bench-lit' : '',
  ];
  return (
    <>
      <tr role="row" className={classes.filter(Boolean).join(' ')} {...pointing(ref)}>
        <td
          {...plain('number')}
          className="bench-number"
          aria-label={`Row ${number}${mark ? `, ${mark[1]}` : ''}${doubtful ? ', measure again' : ''}`}
          title={row.saved ? `Entered by ${row.saved.by}` : undefined}
        >
          <span className="bench-count">{number}</span>
          <span className="bench-mark" aria-hidden="true">
            {mark?.[0]}
          </span>
          {(row.saved || row.cells.typed !== '') && grid.editable && (
            <button
              type="button"
              className="bench-strike"
              tabIndex={-1}
              aria-label={`Strike row ${number}`}
              onClick={() => grid.strike(row.key)}
            >
              ×
            </button>
          )}
        </td>
        {FIELDS.map((field) => (
          <FieldCell
            key={field}
            row={row}
            number={number}
            field={field}
            grid={grid}
            current={current(field)}
            wrong={wrong(field)}
          />
        ))}
        <td {...plain('scale')} className="bench-scale">
          {measured !== null ? (
            <ReadingScale
              measured={measured}
              {...limits}
              {...SCALE}
              text={row.cells.typed}
              expectedText={expectedText || undefined}
              label={where}
              tone={doubtful ? 'caution' : undefined}
              numberElsewhere
            />
          ) : null}
        </td>
        <td
          {...plain('expected')}
          className="bench-expected"
          data-label="healthy"
          aria-label={`Row ${number}, Expected: ${expectedText || 'not known'}`}
        >
          {expectedText !== '' && <Aligned text={expectedText} />}
        </td>
      </tr>
      {said && (
        <RowNote
          id={note}
          number={number}
          note={said}
          columns={COLUMNS.length}
          onChoose={(typed) => grid.chooseReading(row.key, typed)}
          onRetry={() => void store.retry(phase, row.key)}
          onSettle={(choice) => void store.settle(phase, row.key, choice)}
        />
      )}
    </>
  );
}
