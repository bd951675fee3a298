import { describe, expect, it } from 'vitest';
import {
  beginsWith,
  candidatesFor,
  matching,
  named,
  settled,
  taking,
} from '@/islands/bench-sheet/completion';
import { moveBy, nextEmpty, tabFrom } from '@/islands/bench-sheet/moves';
import { readPasted } from '@/islands/bench-sheet/pasted';
import {
  bodyOf,
  cellsOf,
  EMPTY,
  entryAfter,
  isChanged,
  liftedOf,
  missingOf,
  offeredRows,
  pointsOf,
  savedRow,
} from '@/islands/bench-sheet/rows';
import { board, saved } from '../fixtures/bench-board';

describe('moving over the sheet', () => {
  const at = { row: 2, column: 'to' } as const;

  it.each([
    ['ArrowUp', { row: 1, column: 'to' }],
    ['ArrowDown', { row: 3, column: 'to' }],
    ['ArrowLeft', { row: 2, column: 'from' }],
    ['ArrowRight', { row: 2, column: 'position' }],
    ['Home', { row: 2, column: 'number' }],
    ['End', { row: 2, column: 'expected' }],
    ['PageUp', { row: 0, column: 'to' }],
    ['PageDown', { row: 4, column: 'to' }],
    ['a', null],
  ])('%s leads to %o', (key, place) => {
    expect(moveBy(key, at, 5)).toEqual(place);
  });

  it('holds at the edges, and goes to the corners with Control', () => {
    expect(moveBy('ArrowUp', { row: 0, column: 'number' }, 5)).toEqual({
      row: 0,
      column: 'number',
    });
    expect(moveBy('ArrowLeft', { row: 0, column: 'number' }, 5)?.column).toBe('number');
    expect(moveBy('ArrowRight', { row: 0, column: 'expected' }, 5)?.column).toBe('expected');
    expect(moveBy('ArrowDown', { row: 4, column: 'to' }, 5)?.row).toBe(4);
    expect(moveBy('Home', at, 5, true)).toEqual({ row: 0, column: 'number' });
    expect(moveBy('End', at, 5, true)).toEqual({ row: 4, column: 'expected' });
  });

  it('tabs from field to field past Lifted, and out of the sheet at both ends', () => {
    expect(
      ['number', 'from', 'to', 'position', 'lifted', 'typed', 'expected'].map((column) =>
        tabFrom(column as 'from', false),
      ),
    ).toEqual(['from', 'to', 'position', 'typed', 'typed', null, null]);
    expect(
      ['expected', 'typed', 'lifted', 'position', 'to', 'from'].map((column) =>
        tabFrom(column as 'from', true),
      ),
    ).toEqual(['typed', 'position', 'position', 'to', 'from', null]);
  });

  it('goes on to the next empty cell, then to one that was passed over', () => {
    const wanted = ['from', 'to', 'position', 'typed'] as const;
    expect(nextEmpty({ ...EMPTY, from: 'V' }, wanted, 'from')).toBe('to');
    expect(nextEmpty({ ...EMPTY, from: 'V', to: 'P' }, wanted, 'position')).toBe('typed');
    expect(nextEmpty({ ...EMPTY, typed: '1k', to: 'P', position: 'ohms' }, wanted, 'typed')).toBe(
      'from',
    );
    expect(
      nextEmpty({ from: 'V', to: 'P', position: 'x', lifted: '', typed: '1' }, wanted, 'typed'),
    ).toBeNull();
  });
});

describe('completing a name', () => {
  const from = candidatesFor('from', board);
  const names = (text: string) => matching('from', text, from).map(({ name }) => name);

  it('offers what begins so in any case, points that a lead reaches before others, parts last', () => {
    expect(names('r')).toEqual(['RT1', 'RV1', 'R1', 'R2', 'R3', 'RV9']);
    expect(names('')).toEqual(['V', 'COM', 'P', 'Q', 'IN', ...board.parts.map(({ ref }) => ref)]);
    expect(matching('to', 'r', candidatesFor('to', board))).toEqual([]);
  });

  it('takes an exact name before one that only begins so', () => {
    const two = [
      { name: 'R12', about: '' },
      { name: 'R1', about: '' },
    ];
    expect(settled('from', 'r1', two)).toBe('R1');
    expect(settled('from', 'r', two)).toBe('R12');
    expect(settled('from', 'tp5', two)).toBe('tp5');
    expect(settled('from', '  ', two)).toBe('');
  });

  it('completes the last of several lifted parts', () => {
    const refs = candidatesFor('lifted', board);
    expect(settled('lifted', 'rt1 r', refs)).toBe('rt1, RT1');
    expect(settled('lifted', 'RT1, r2', refs)).toBe('RT1, R2');
    expect(settled('lifted', 'RT1, ', refs)).toBe('RT1');
    expect(taking('lifted', 'RT1, R', 'R3')).toBe('RT1, R3');
    expect(liftedOf(' RT1,R2 ; R3 ')).toEqual(['RT1', 'R2', 'R3']);
  });

  it('never changes a reading', () => {
    expect(settled('typed', ' 1k2 ', candidatesFor('typed', board))).toBe('1k2');
  });

  it('knows where a letter begins a name', () => {
    expect(beginsWith('to', 'c', board)).toBe(true);
    expect(beginsWith('to', 'm', board)).toBe(false);
    expect(beginsWith('typed', 'm', board)).toBe(false);
  });

  it('writes pasted names as the board has them', () => {
    expect(
      named({ from: 'com', to: 'nowhere', position: 'OHMS', lifted: '', typed: '1k' }, board),
    ).toEqual({
      from: 'COM',
      to: 'nowhere',
      position: 'ohms',
      lifted: '',
      typed: '1k',
    });
  });
});

describe('pasting', () => {
  const rows = (text: string) => {
    const pasted = readPasted(text);
    return pasted.kind === 'rows' ? pasted.rows : pasted;
  };
  const row = { ...EMPTY, from: 'V', to: 'P', position: 'volts', typed: 'OL' };

  it('reads tabs from a spreadsheet, and leaves headings out', () => {
    expect(rows('From\tTo\tSwitch\tReading\r\nV\tP\tvolts\tOL\r\nV\tQ\tvolts\t9.97M\r\n')).toEqual([
      row,
      { ...row, to: 'Q', typed: '9.97M' },
    ]);
  });

  it('reads CSV with commas or semicolons, with quoted cells', () => {
    expect(rows('V,P,volts,OL\nV,Q,volts,"1,6k"')).toEqual([
      row,
      { ...row, to: 'Q', typed: '1,6k' },
    ]);
    expect(rows('V;P;volts;1,6k\nV;Q;volts;OL')).toEqual([
      { ...row, typed: '1,6k' },
      { ...row, to: 'Q' },
    ]);
    expect(rows('V\tP\t"a ""b""\tc"\tOL\nV\tP\tvolts\tOL')).toEqual([
      { ...row, position: 'a "b"\tc' },
      row,
    ]);
    expect(rows('V,P,volts,OL')).toEqual([row]);
  });

  it('takes two, three and five columns for what they can be', () => {
    expect(rows('RT1\tOL\nRT2\t1k')).toEqual([
      { ...EMPTY, from: 'RT1', typed: 'OL' },
      { ...EMPTY, from: 'RT2', typed: '1k' },
    ]);
    expect(rows('V\tP\tOL')).toEqual([{ ...row, position: '' }]);
    expect(rows('V\tP\tvolts\tR1, R2\tOL')).toEqual([{ ...row, lifted: 'R1, R2' }]);
  });

  it('takes lines of one value as a column', () => {
    expect(readPasted('OL\n1k2\n0R8\n')).toEqual({ kind: 'column', values: ['OL', '1k2', '0R8'] });
    expect(readPasted('1,6k\n2,2M')).toEqual({ kind: 'column', values: ['1,6k', '2,2M'] });
  });

  it.each(['1k2', ' 1,600 ', 'V', '1.600.000', 'some words, no reading'])(
    'takes %j as text of the cell',
    (text) => {
      expect(readPasted(text)).toEqual({ kind: 'cell', text: text.trim() });
    },
  );

  it('cuts what no cell holds', () => {
    const [first] = rows(`V\tP\tvolts\t${'9'.repeat(500)}`) as (typeof row)[];
    expect(first?.typed).toHaveLength(40);
  });

  it('survives an empty clipboard and a quote that never ends', () => {
    expect(readPasted('')).toEqual({ kind: 'cell', text: '' });
    expect(readPasted('"V\tP\nrest').kind).toBe('cell');
  });
});

describe('a row', () => {
  const cells = { from: 'V', to: 'P', position: 'volts', lifted: 'R1 R2', typed: '1k2' };
  const row = { ...savedRow(saved(1)), cells };

  it('is sent as points, or as a part when From is none and To is empty', () => {
    expect(bodyOf(row, 'as-found', board)).toEqual({
      from: 'V',
      to: 'P',
      part: null,
      position: 'volts',
      lifted: ['R1', 'R2'],
      typed: '1k2',
      phase: 'as-found',
      place: 1,
    });
    expect(pointsOf({ ...EMPTY, from: 'RT1' }, board)).toMatchObject({ from: null, part: 'RT1' });
    expect(pointsOf({ ...EMPTY, from: 'V' }, board)).toMatchObject({ from: 'V', part: null });
  });

  it.each([
    [{ from: '' }, 'from'],
    [{ to: '' }, 'to'],
    [{ to: 'V' }, 'to'],
    [{ typed: '' }, 'typed'],
    [{ typed: '1,600' }, 'typed'],
  ])('is not sent with %o', (more, field) => {
    expect(missingOf({ ...cells, ...more }, board)?.field).toBe(field);
    expect(bodyOf({ ...row, cells: { ...cells, ...more } }, 'as-found', board)).toBeNull();
  });

  it('knows whether it says something else than what is saved', () => {
    expect(isChanged(savedRow(saved(1)))).toBe(false);
    expect(isChanged(row)).toBe(true);
    expect(cellsOf(saved(1, { part: 'RT1', from: null, to: null }))).toMatchObject({
      from: 'RT1',
      to: '',
    });
  });

  it('is followed by one that copies From and the switch position, but no part', () => {
    expect(entryAfter([row], 'n1')).toMatchObject({
      place: 2,
      cells: { ...EMPTY, from: 'V', position: 'volts' },
    });
    const straight = { ...row, cells: { ...cells, from: 'RT1', to: '' } };
    expect(entryAfter([straight], 'n1').cells).toEqual({ ...EMPTY, position: 'volts' });
  });

  it('is offered again after the repair, once', () => {
    const found = [savedRow(saved(1)), savedRow(saved(2, { to: 'Q' }))];
    expect(offeredRows(found, []).map(({ cells: c }) => [c.from, c.to, c.typed])).toEqual([
      ['V', 'P', ''],
      ['V', 'Q', ''],
    ]);
    expect(offeredRows(found, [savedRow(saved(9, { typed: '1k1' }))])).toHaveLength(1);
  });
});
