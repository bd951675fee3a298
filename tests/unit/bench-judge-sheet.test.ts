import { describe, expect, it } from 'vitest';
import { outlookOn, writeExpected } from '@/domain/bench/expected';
import { judgeSheet } from '@/domain/bench/judge-sheet';
import { placePoints } from '@/domain/bench/points';
import type { Incident } from '@/domain/parts/kinds';
import { board, taken } from '../fixtures/bench-board';

const judge = (sheet: ReturnType<typeof taken>[], incident: Incident = 'mains-on-ohms') =>
  judgeSheet(board.positions, board.parts, sheet, incident);

describe('a sheet judged over its network', () => {
  it('accuses the part that a reading shows open, and says what was expected by reading', () => {
    const judged = judge([
      taken(7, { from: 'V', to: 'P' }),
      taken(9, { from: 'V', to: 'COM', value: 1e7 }),
    ]);
    expect(judged.diagnosis?.hypotheses[0]?.faults).toEqual([{ ref: 'RT1', mode: 'open' }]);
    expect(judged.expected.map(({ reading }) => reading)).toEqual([7, 9]);
    // RT1 alone: at volts the contact is open and the varistor insulates.
    expect(judged.expected[0]?.ohms).toBeCloseTo(1100, -1);
    expect(judged.expected[1]?.ohms).toBeCloseTo(1e7, -6);
    expect(judged.unused).toEqual([]);
  });

  it('takes a reading on a drawn part as one between its nets', () => {
    const points = judge([taken(1, { from: 'V', to: 'P' })]);
    const part = judge([taken(1, { part: 'RT1' })]);
    expect(part.diagnosis).toEqual(points.diagnosis);
    expect(part.expected).toEqual(points.expected);
  });

  it('takes nothing but the part itself when a lead of it is lifted and the leads stand on it', () => {
    // R3 alone is 10 kΩ; at ohms RT1 and the divider stand beside it.
    const placed = placePoints(board, {
      ...taken(1, {}),
      part: 'R3',
      position: 'ohms',
      lifted: ['R3'],
    });
    expect(placed).toMatchObject({ kind: 'network', probe: { from: 'IN', to: 'COM' } });
    const outlook = outlookOn(board);
    const at = { from: null, to: null, part: 'R3', position: 'ohms' };
    const alone = outlook({ ...at, lifted: ['R3'] }).expected;
    const inCircuit = outlook({ ...at, lifted: [] }).expected;
    expect(alone?.ohms).toBeCloseTo(10_000, 6);
    // 10 kΩ beside RT1 and the 10 MΩ chain.
    expect(inCircuit?.ohms).toBeCloseTo(1 / (1 / 10_000 + 1 / (0.05 + 1100 + 1e7)), -1);
  });

  it('judges on a network as it stands at the switch position', () => {
    const at = (position: string) =>
      outlookOn(board)({ from: 'P', to: 'COM', part: null, position, lifted: [] }).expected?.ohms;
    expect(at('ohms')).toBeCloseTo(9990, -1);
    expect(Number(at('volts'))).toBeGreaterThan(9e6);
  });

  it.each([
    [{ from: 'V', to: 'X' }, 'X is no net of the board’s network.'],
    [{ from: 'V', to: 'V' }, 'Both points are the same net.'],
    [{ from: 'V' }, 'Two points or a part are needed.'],
    [{ from: 'V', to: 'P', position: 'amps' }, 'amps is no switch position of this board.'],
    [{ part: 'R9' }, 'R9 is not in the board file: add it there, or name two points.'],
    [
      { from: 'V', to: 'P', lifted: ['R9'] },
      'R9 is lifted but not in the board file: correct its reference.',
    ],
  ])('lists %o as not used, with the reason', (points, reason) => {
    const judged = judge([taken(3, points), taken(4, { from: 'V', to: 'P', value: 1100 })]);
    expect(judged.unused).toEqual([{ reading: 3, reason }]);
    expect(judged.expected.map(({ reading }) => reading)).toEqual([4]);
  });

  it('says that the network is not sound rather than computing with it', () => {
    const parts = [...board.parts, { ...board.parts[0]! }];
    const judged = judgeSheet(board.positions, parts, [taken(1, { from: 'V', to: 'P' })], 'none');
    expect(judged.diagnosis).toBeNull();
    expect(judged.unused[0]?.reason).toBe(
      'The board’s network is not sound: RT1 is already parts[0].',
    );
  });

  it('says nothing at all of an empty sheet', () => {
    expect(judge([])).toEqual({ diagnosis: null, expected: [], alone: [], unused: [], said: [] });
  });
});

// Rayleigh's monotonicity law: a parallel path can only lower a reading (Doyle and Snell 1984).
describe('a part that no network holds', () => {
  it('is proven open or high by a reading above its tolerance in circuit', () => {
    const [verdict] = judge([taken(1, { part: 'NT1' })]).alone;
    expect(verdict).toMatchObject({ ref: 'NT1', verdict: 'suspect', mode: 'open', reading: 1 });
    expect(verdict?.reasons.join(' ')).toContain('proves the part open or drifted high');
  });

  it('is not settled by one below it until a lead is lifted', () => {
    const low = { part: 'RV9', value: 4700 } as const;
    const [inCircuit] = judge([taken(1, low)]).alone;
    expect(inCircuit).toMatchObject({ verdict: 'inconclusive', mode: null });
    expect(inCircuit?.next).toBe('Lift one lead and measure again.');
    const [lifted] = judge([taken(1, { ...low, lifted: ['RV9'] })]).alone;
    expect(lifted).toMatchObject({ verdict: 'suspect', mode: 'leaky' });
  });

  it('leaves the network undisturbed', () => {
    const judged = judge([taken(1, { part: 'NT1', value: 10_000 })]);
    expect(judged.diagnosis).toBeNull();
    expect(judged.alone[0]?.verdict).toBe('fits');
  });
});

describe('what is expected before anything is measured', () => {
  const outlook = outlookOn(board);
  const points = (more: object) => ({
    from: null,
    to: null,
    part: null,
    position: null,
    lifted: [],
    ...more,
  });

  it('is the healthy network with its band, or over range', () => {
    const { expected } = outlook(points({ from: 'V', to: 'P' }));
    expect(expected?.ohms).toBeCloseTo(1100, -1);
    expect(expected?.low).toBeGreaterThan(800);
    expect(expected?.high).toBeLessThan(1500);
    const isolated = outlook(points({ from: 'P', to: 'COM', lifted: ['RT1'] })).expected;
    expect(isolated).toEqual({ ohms: 'OL', low: 60e6, high: 'OL' });
  });

  it('is the part’s own value or its floor where no network holds it', () => {
    // 10 kΩ ±5 %, and 5 K either side of 25 °C, as the part is judged.
    const ntc = outlook(points({ part: 'NT1' })).expected;
    expect(ntc?.ohms).toBe(10_000);
    expect(ntc?.low).toBeCloseTo(7600, 6);
    expect(Number(ntc?.high)).toBeCloseTo(13_125, 6);
    expect(outlook(points({ part: 'RV9' })).expected).toEqual({
      ohms: 'OL',
      low: 50e6,
      high: 'OL',
    });
  });

  it('says why it cannot be told', () => {
    expect(outlook(points({ from: 'V', to: 'X' }))).toEqual({
      expected: null,
      unusable: 'X is no net of the board’s network.',
    });
  });

  it('is written with the three digits that tolerances leave', () => {
    expect(writeExpected(9_986.4)).toBe('9.99 kΩ');
    expect(writeExpected('OL')).toBe('OL');
  });
});
