import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { LONGEST_MARKING, decodeMarking } from '@/domain/markings/decode';
import { PART_KINDS } from '@/domain/parts/kinds';

const kinds = (text: string) => [...new Set(decodeMarking(text).map((one) => one.kind))];

describe('a marking with more than one reading gives all of them', () => {
  test('103 on a resistor, a capacitor, an NTC, a trimmer, an inductor', () => {
    expect(decodeMarking('103').map(({ kind, value, unit }) => `${kind} ${value} ${unit}`)).toEqual(
      ['resistor 10000 Ω', 'capacitor 1e-8 F', 'ntc 10000 Ω', 'trimmer 10000 Ω', 'inductor 0.01 H'],
    );
  });

  test('561 is 560 V on a varistor and 560 Ω on a resistor', () => {
    const readings = decodeMarking('561');
    expect(readings.find((one) => one.kind === 'mov')).toMatchObject({ value: 560, unit: 'V' });
    expect(readings.find((one) => one.kind === 'resistor')).toMatchObject({
      value: 560,
      unit: 'Ω',
    });
  });

  test('a kind asked for keeps the others out', () => {
    for (const kind of PART_KINDS) {
      for (const text of ['103', '561K', '4R7', 'T2A', '5V6', 'R005', '10D-9']) {
        expect(decodeMarking(text, kind).every((one) => one.kind === kind)).toBe(true);
      }
    }
  });

  test('loose readings appear only when their kind is asked for', () => {
    expect(kinds('1K1')).toEqual(['resistor']);
    expect(decodeMarking('1K1', 'ptc')).toMatchObject([{ value: 1100, unit: 'Ω' }]);
    expect(decodeMarking('10K', 'trimmer')).toMatchObject([{ value: 10_000 }]);
  });
});

test('thermistors and zeners by common practice', () => {
  expect(decodeMarking('10D-9')).toMatchObject([
    { kind: 'ntc', value: 10, ratings: { discMillimetres: 9, celsius: 25 } },
  ]);
  expect(decodeMarking('103J', 'ntc')).toMatchObject([{ value: 10_000, tolerance: 0.05 }]);
  expect(decodeMarking('5V6')).toMatchObject([{ kind: 'zener', value: 5.6, tolerance: null }]);
  expect(decodeMarking('C5V6')).toMatchObject([{ kind: 'zener', value: 5.6, tolerance: 0.05 }]);
});

test('ohm and micro signs of either code point, and any space, are one', () => {
  expect(decodeMarking('4.7k\u2126', 'resistor')).toEqual(decodeMarking('4.7k\u03a9', 'resistor'));
  expect(decodeMarking('4.7k\u2126', 'resistor')).toMatchObject([{ value: 4700 }]);
  expect(decodeMarking('\u03bc47', 'capacitor')).toEqual(decodeMarking('\u00b547', 'capacitor'));
  expect(decodeMarking(' 104K\u00a0X7R ')).toEqual(decodeMarking('104K X7R'));
});

test('kinds without a marking standard, and text that says nothing, have no reading', () => {
  for (const kind of ['diode', 'gdt', 'contact', 'clamp', 'ic-pin'] as const) {
    expect(decodeMarking('103', kind)).toEqual([]);
  }
  for (const text of ['', ' ', 'hello', '%', '5%', '-', '−1', 'ΩΩ', '__proto__-red-red']) {
    expect(decodeMarking(text)).toEqual([]);
  }
  expect(decodeMarking(`103${' '.repeat(LONGEST_MARKING)}`)).toEqual([]);
});

test('any text is answered, with finite values and a named source', () => {
  const likely = fc.stringMatching(/^[0-9RKMGTJFHDSXLVAWnpuµm.,% x-]{0,12}$/);
  fc.assert(
    fc.property(
      fc.oneof(likely, fc.string({ unit: 'binary', maxLength: 100 })),
      fc.option(fc.constantFrom(...PART_KINDS), { nil: undefined }),
      (text, kind) => {
        for (const one of decodeMarking(text, kind)) {
          expect(Number.isFinite(one.value) && one.value >= 0, text).toBe(true);
          expect(one.tolerance === null || (one.tolerance > 0 && one.tolerance <= 1)).toBe(true);
          expect(one.source.length).toBeGreaterThan(8);
          for (const rating of Object.values(one.ratings ?? {})) {
            expect(typeof rating === 'string' || Number.isFinite(rating), text).toBe(true);
          }
        }
      },
    ),
    { numRuns: 8000 },
  );
});
