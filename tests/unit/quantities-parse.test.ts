import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readDecimal } from '@/domain/quantities/decimal';
import { LONGEST_RESISTANCE, parseResistance } from '@/domain/quantities/parse';

const value = (ohms: number, resolution: number) => ({ ok: true, kind: 'value', ohms, resolution });

describe('parseResistance reads trade notation', () => {
  test.each([
    ['1k6', 1600, 100],
    ['1K6', 1600, 100],
    ['1.6k', 1600, 100],
    ['1,6k', 1600, 100],
    ['1.60k', 1600, 10],
    ['1.600 kΩ', 1600, 1],
    ['1 k', 1000, 1000],
    ['4M7', 4.7e6, 1e5],
    ['4m7', 0.0047, 1e-4],
    ['4.99M', 4.99e6, 1e4],
    ['0R33', 0.33, 0.01],
    ['0R8', 0.8, 0.1],
    ['R47', 0.47, 0.01],
    ['K47', 470, 10],
    ['470', 470, 1],
    ['470R', 470, 1],
    ['470 R', 470, 1],
    ['470Ω', 470, 1],
    ['470 \u2126', 470, 1],
    ['470 ohms', 470, 1],
    ['2.2 MΩ', 2.2e6, 1e5],
    ['2.2\u00a0MΩ', 2.2e6, 1e5],
    ['2.2\u202fM Ω', 2.2e6, 1e5],
    ['2,20 M\u2126', 2.2e6, 1e4],
    ['2.2meg', 2.2e6, 1e5],
    ['1G', 1e9, 1e9],
    ['12m', 0.012, 0.001],
    ['12 mΩ', 0.012, 0.001],
    ['500µ', 0.0005, 1e-6],
    ['500\u03bcΩ', 0.0005, 1e-6],
    ['500uΩ', 0.0005, 1e-6],
    ['1e6', 1e6, 1e6],
    ['1.5e3', 1500, 100],
    ['1E+6', 1e6, 1e6],
    ['0', 0, 1],
    ['0.0', 0, 0.1],
    ['00.2', 0.2, 0.1],
    ['.47', 0.47, 0.01],
    ['470.', 470, 1],
    ['1.600', 1.6, 0.001],
    ['0,600', 0.6, 0.001],
    ['1234,567', 1234.567, 0.001],
    ['1 600', 1600, 1],
    ['12 345 678', 12345678, 1],
    ['1,600.5', 1600.5, 0.1],
    ['1.600,5', 1600.5, 0.1],
    ['  1k6  ', 1600, 100],
    ['+1k6', 1600, 100],
  ])('%s', (text, ohms, resolution) => {
    expect(parseResistance(text)).toEqual(value(ohms, resolution));
  });
});

describe('parseResistance reads over range', () => {
  test.each(['OL', 'ol', '0L', 'O.L', '0.L', '.OL', 'OL.', 'O.L MΩ', '0L M', '∞', '∞ Ω', ' OL '])(
    '%s',
    (text) => expect(parseResistance(text)).toEqual({ ok: true, kind: 'over-range' }),
  );
  test.each([
    ['>60M', 60e6],
    ['> 60 MΩ', 60e6],
    ['≥4M', 4e6],
    ['>1G', 1e9],
  ])('%s with its bound', (text, above) =>
    expect(parseResistance(text)).toEqual({ ok: true, kind: 'over-range', above }),
  );
});

describe('parseResistance refuses two readings and names both', () => {
  test.each([
    ['1,600', ['1.600', '1600']],
    ['1,600k', ['1.600k', '1600k']],
    ['1,600 kΩ', ['1.600k', '1600k']],
    ['1.600.000', ['1600.000', '1600000']],
    ['1,600,000', ['1600.000', '1600000']],
    ['4E7', ['4R7', '4e7']],
    ['1.', ['1', 'OL']],
    ['>1,600k', ['>1.600k', '>1600k']],
    ['>1.', ['>1', 'OL']],
  ])('%s', (text, could) => {
    const read = parseResistance(text);
    expect(read).toMatchObject({ ok: false, could });
    // Each stands in the sentence once, as it would be typed.
    const said = read.ok ? [] : read.reason.split(' given: ')[1]?.split(/ or |[;,] /);
    if (could[1] !== 'OL' && text !== '4E7') expect(said?.slice(0, 2)).toEqual(could);
    for (const one of could) expect(parseResistance(one).ok, one).toBe(true);
  });
});

describe('parseResistance refuses with a reason and no reading', () => {
  test.each([
    '',
    '   ',
    'k',
    'R',
    'abc',
    '-5',
    '−5',
    '<1',
    '1k6k',
    '1k6R',
    '1 60',
    '1,60,0',
    '1,600.500,2',
    '1..6',
    '4 M 7',
    '1e',
    '1e999',
    '1e-99',
    '5V',
    '10²',
    'NaN',
    'Infinity',
    '>',
    '>0',
    '>OL',
    '1p',
    '1k6\u0000',
    '٤٧٠',
  ])('%j', (text) => {
    const read = parseResistance(text);
    expect(read.ok).toBe(false);
    if (!read.ok) {
      expect(read.reason.length).toBeGreaterThan(10);
      expect(read.could).toBeUndefined();
    }
  });

  test('a text longer than the limit, however valid', () => {
    expect(parseResistance('1'.padEnd(LONGEST_RESISTANCE, '0')).ok).toBe(false);
    expect(parseResistance(`${' '.repeat(LONGEST_RESISTANCE)}1`)).toMatchObject({
      ok: false,
      reason: '41 characters given, at most 40 are read',
    });
  });
});

describe('properties', () => {
  const typed = fc.stringMatching(/^[0-9.,kKMmRrEeΩ OL>µ∞+-]{0,14}$/);

  test('any text is answered, with finite numbers and readings that can themselves be typed', () => {
    fc.assert(
      fc.property(fc.oneof(typed, fc.string({ unit: 'binary', maxLength: 60 })), (text) => {
        const read = parseResistance(text);
        if (read.ok && read.kind === 'value') {
          expect(Number.isFinite(read.ohms) && read.ohms >= 0).toBe(true);
          expect(Number.isFinite(read.resolution) && read.resolution > 0).toBe(true);
        }
        if (read.ok && read.kind === 'over-range' && read.above !== undefined) {
          expect(Number.isFinite(read.above) && read.above > 0).toBe(true);
        }
        if (!read.ok && read.could) {
          expect(new Set(read.could).size).toBe(2);
          // 1,600e99 could be two numbers, neither of them one that is read.
          const small = !/e/i.test(text);
          if (small) for (const one of read.could) expect(parseResistance(one).ok, one).toBe(true);
        }
      }),
      { numRuns: 5000 },
    );
  });

  test('a value is a whole number of its resolution', () => {
    fc.assert(
      fc.property(typed, (text) => {
        const read = parseResistance(text);
        if (!read.ok || read.kind !== 'value') return;
        const steps = read.ohms / read.resolution;
        expect(Math.abs(steps - Math.round(steps))).toBeLessThanOrEqual(1e-9 * Math.max(1, steps));
      }),
      { numRuns: 5000 },
    );
  });

  test('point, comma, prefix and infix forms of one number agree', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 999 }), fc.integer({ min: 0, max: 99 }), (a, b) => {
        const two = String(b).padStart(2, '0');
        const expected = value(Number(`${a}${two}e1`), 10);
        for (const text of [`${a}k${two}`, `${a}.${two}k`, `${a},${two} kΩ`, `${a}.${two}e3`]) {
          expect(parseResistance(text)).toEqual(expected);
        }
      }),
    );
  });

  test('readDecimal never gives digits that were not typed', () => {
    fc.assert(
      fc.property(fc.stringMatching(/^[0-9., ]{0,12}$/), (text) => {
        const read = readDecimal(text);
        if (read.ok) expect(read.digits).toBe(text.replace(/[^0-9]/g, ''));
      }),
      { numRuns: 2000 },
    );
  });
});
