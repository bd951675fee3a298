import { describe, expect, it } from 'vitest';
import { judgeSheet } from '@/domain/bench/judge-sheet';
import { modeWords, writeMeasured, writePoints } from '@/domain/bench/sentences';
import { apart, fitFaults } from '@/domain/bench/suspect-fit';
import { summaryOf } from '@/domain/bench/summary';
import { drawnNetwork } from '@/domain/bench/points';
import type { SheetReading } from '@/domain/bench/types';
import { board, taken } from '../fixtures/bench-board';

const judge = (sheet: SheetReading[]) =>
  judgeSheet(board.positions, board.parts, sheet, 'mains-on-ohms');
const saidOf = (sheet: SheetReading[], ref: string) =>
  judge(sheet).said.find((one) => one.ref === ref);

const open = taken(1, { from: 'V', to: 'P' });
const chain = taken(2, { from: 'V', to: 'COM', value: 1e7, resolution: 1e4 });

describe('the sentence of a part', () => {
  it('quotes the reading that tells most for a suspect, measured beside healthy', () => {
    expect(saidOf([chain, open], 'RT1')).toEqual({
      ref: 'RT1',
      words: 'V to P reads OL; healthy it would be 1.1 kΩ.',
      reading: 1,
    });
  });

  it('names the part that the leads stood on, and what was lifted', () => {
    expect(saidOf([taken(4, { part: 'RT1' })], 'RT1')?.words).toBe(
      'RT1 reads OL; healthy it would be 1.1 kΩ.',
    );
    expect(writePoints({ ...open, lifted: ['R1', 'R2'] })).toBe('V to P (R1, R2 lifted)');
  });

  it('says what a leak or a drift would have to be', () => {
    const leaky = taken(5, { from: 'P', to: 'COM', value: 22_000, resolution: 100 });
    const words = saidOf([leaky, taken(6, { from: 'V', to: 'P', value: 1100 })], 'RV1')?.words;
    expect(words).toMatch(
      /^P to COM reads 22\.0 kΩ; healthy it would be .* A leak of about 22 kΩ through RV1 explains that\.$/,
    );
  });

  it('quotes, for the second of two faults, what the first alone would show', () => {
    // With RT1 gone the meter still sees the 10 MΩ chain from V to COM; OL there takes the chain as well.
    const both = [
      open,
      taken(3, { from: 'V', to: 'COM' }),
      taken(8, { from: 'Q', to: 'COM', value: 1e6 }),
    ];
    expect(judge(both).diagnosis?.hypotheses[0]?.faults).toEqual([
      { ref: 'RT1', mode: 'open' },
      { ref: 'R1', mode: 'open' },
    ]);
    expect(saidOf(both, 'R1')?.words).toMatch(/^V to COM reads OL; /);
    expect(saidOf(both, 'RT1')?.words).toMatch(/^V to P reads OL; /);
  });

  it('says for a cleared part what its fault would have shown', () => {
    const fits = [
      taken(1, { from: 'V', to: 'P', value: 1105, resolution: 1 }),
      taken(2, { from: 'P', to: 'COM', position: 'ohms', value: 9990, resolution: 10 }),
    ];
    const cleared = judge(fits);
    expect(cleared.diagnosis?.parts.find(({ ref }) => ref === 'R3')?.standing).toBe('cleared');
    expect(cleared.said.find(({ ref }) => ref === 'R3')?.words).toMatch(
      /^P to COM reads 9\.99 kΩ; with R3 open it would be \S+ MΩ\.$/,
    );
  });

  it('quotes a few per cent where the tolerances leave less', () => {
    const low = taken(2, { from: 'Q', to: 'COM', value: 955_000, resolution: 1000 });
    const judged = judge([low]);
    const [first] = judged.diagnosis?.hypotheses[0]?.faults ?? [];
    expect(first?.ref).toMatch(/^(R1|R2|RV1)$/);
    expect(saidOf([low], first?.ref ?? '')?.words).toMatch(
      /^Q to COM reads 955 kΩ; healthy it would be \S+ [kM]Ω\./,
    );
  });

  it('is missing for parts of which no reading tells', () => {
    const judged = judge([taken(2, { from: 'Q', to: 'COM', value: 9e5 })]);
    const untouched = judged.diagnosis?.parts.filter(({ standing }) => standing === 'untouched');
    expect(untouched?.length).toBeGreaterThan(0);
    for (const { ref } of untouched ?? []) expect(judged.said.map((s) => s.ref)).not.toContain(ref);
  });

  it('keeps the digits that the meter showed', () => {
    expect(writeMeasured(taken(1, { value: 1600, resolution: 1 }))).toBe('1.600 kΩ');
    expect(writeMeasured(open)).toBe('OL');
  });
});

describe('the words of a mode', () => {
  it('name one mode when it stands out, two when it does not, none without any', () => {
    expect(modeWords({ modes: { open: 0.9, 'drifted-high': 0.02 }, fault: 0.92 })).toEqual({
      mode: 'open',
      words: 'open',
    });
    expect(modeWords({ modes: { short: 0.3, leaky: 0.4 }, fault: 0.7 }).words).toBe(
      'leaky or short',
    );
    expect(modeWords({ modes: {}, fault: 0 })).toEqual({ mode: null, words: '' });
  });
});

describe('how a fault is fitted', () => {
  const network = drawnNetwork(board.positions, board.parts);

  it('takes an open as over range and a leak as near as nine tries get', () => {
    expect(
      fitFaults(network, [{ ref: 'RT1', mode: 'open' }], [{ from: 'V', to: 'P', value: 'OL' }]),
    ).toEqual([{ ref: 'RT1', mode: 'open', ohms: 'OL' }]);
    const [leak] = fitFaults(
      network,
      [{ ref: 'RV1', mode: 'leaky' }],
      [{ from: 'P', to: 'COM', position: 'volts', value: 22_000 }],
    );
    // A step of the nine tries over four decades of a leak is a factor of 3.2.
    expect(Number(leak?.ohms)).toBeGreaterThan(22_000 / 1.9);
    expect(Number(leak?.ohms)).toBeLessThan(22_000 * 1.9);
  });

  it('measures distance in factors of e, over range being far from any value', () => {
    expect(apart('OL', 'OL')).toBe(0);
    expect(apart('OL', 1e7)).toBe(6);
    expect(apart(1000, 1000 * Math.E)).toBeCloseTo(1, 3);
    expect(apart(0, 0.1)).toBeLessThan(0.2);
  });
});

describe('the summary', () => {
  it('names suspects with their probability, and counts what is cleared', () => {
    const words = summaryOf(judge([open, chain]));
    expect(words).toMatch(/^Suspects: RT1 open (0\.9\d|1\.00)\b.*parts? cleared\.$/);
  });

  it('says to look elsewhere when the network is likelier sound', () => {
    const judged = judge([open]);
    const healthy = { ...judged, diagnosis: { ...judged.diagnosis!, healthy: 0.93, parts: [] } };
    expect(summaryOf(healthy)).toBe('The readings fit the healthy network (0.93): look elsewhere.');
  });

  it('names parts judged alone, and readings to take again', () => {
    const judged = judge([taken(1, { part: 'NT1' })]);
    expect(summaryOf(judged)).toMatch(/^Suspects: NT1 open 0\.9\d\.$/);
    const doubted = judge([open]);
    const diagnosis = { ...doubted.diagnosis!, parts: [], doubtful: [{ reading: 0, reason: '' }] };
    expect(summaryOf({ ...doubted, diagnosis })).toBe(
      'No suspects yet. 1 reading to measure again.',
    );
  });

  it('says so when there is none', () => {
    expect(summaryOf(judge([]))).toBe('No suspects yet.');
  });
});
