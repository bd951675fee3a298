import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  formatAmps,
  formatFarads,
  formatOhms,
  formatTrade,
  formatVolts,
  formatWatts,
} from '@/domain/quantities/format';
import { parseResistance } from '@/domain/quantities/parse';

describe('formatOhms keeps the digits that the meter had', () => {
  test.each([
    [1600, 1, '1.600 kΩ'],
    [1600, 100, '1.6 kΩ'],
    [999.6, 1, '1.000 kΩ'],
    [470, 10, '0.47 kΩ'],
    [0.8, 0.1, '0.8 Ω'],
    [0.012, 0.001, '12 mΩ'],
    [0, 0.1, '0.0 Ω'],
    [4.99e6, 1e4, '4.99 MΩ'],
    [60e6, 1e6, '60 MΩ'],
    [1e9, 1e7, '1.00 GΩ'],
  ])('%d Ω known to %d Ω is %s', (ohms, resolution, text) => {
    expect(formatOhms(ohms, resolution)).toBe(text);
  });

  test('four digits at most, without trailing zeros, when the resolution is not known', () => {
    expect(formatOhms(1600)).toBe('1.6 kΩ');
    expect(formatOhms(10_001_100)).toBe('10 MΩ');
    expect(formatOhms(910_190)).toBe('910.2 kΩ');
    expect(formatOhms(999_960)).toBe('1 MΩ');
    expect(formatOhms(0)).toBe('0 Ω');
    expect(formatOhms(0.33)).toBe('330 mΩ');
  });
});

test('other units take the same prefixes', () => {
  expect(formatVolts(-0.65)).toBe('\u2212650 mV');
  expect(formatVolts(560)).toBe('560 V');
  expect(formatVolts(10.06, 0.01)).toBe('10.06 V');
  expect(formatAmps(0.00067)).toBe('670 µA');
  expect(formatFarads(22e-12)).toBe('22 pF');
  expect(formatFarads(1e-7)).toBe('100 nF');
  expect(formatWatts(217)).toBe('217 W');
});

describe('formatTrade', () => {
  test.each([
    [1600, '1k6'],
    [4.7e6, '4M7'],
    [0.33, '0R33'],
    [0.8, '0R8'],
    [470, '470R'],
    [47_300, '47k3'],
    [10_000, '10k'],
    [1e6, '1M'],
    [2.2e9, '2G2'],
    [0, '0R'],
    [0.012, '0R012'],
    [0.0005, '0m5'],
  ])('%d Ω is %s', (ohms, text) => expect(formatTrade(ohms)).toBe(text));

  test('a number that is not finite, or negative, is a mistake of the caller', () => {
    expect(() => formatTrade(Number.NaN)).toThrow(RangeError);
    expect(() => formatTrade(-1)).toThrow(RangeError);
    expect(() => formatOhms(Number.POSITIVE_INFINITY)).toThrow(RangeError);
    expect(() => formatOhms(1, 0)).toThrow(RangeError);
  });
});

describe('round trips', () => {
  const reading = fc
    .tuple(fc.integer({ min: 0, max: 59_999 }), fc.integer({ min: -6, max: 9 }))
    .map(([digits, power]) => ({
      ohms: Number(`${digits}e${power}`),
      resolution: Number(`1e${power}`),
    }));

  test('what is printed with a resolution parses back to the same value and resolution', () => {
    fc.assert(
      fc.property(reading, ({ ohms, resolution }) => {
        expect(parseResistance(formatOhms(ohms, resolution))).toEqual({
          ok: true,
          kind: 'value',
          ohms,
          resolution,
        });
      }),
      { numRuns: 3000 },
    );
  });

  const spread = fc
    .double({ min: -6, max: 12, noNaN: true })
    .map((decades) => 10 ** decades)
    .filter((ohms) => ohms <= 9e11);

  test('trade notation parses back within its six digits, plain engineering within its four', () => {
    fc.assert(
      fc.property(spread, (ohms) => {
        for (const [text, part] of [
          [formatTrade(ohms), 5.1e-6],
          [formatOhms(ohms), 5.1e-4],
        ] as const) {
          const back = parseResistance(text);
          if (!back.ok || back.kind !== 'value') throw new Error(`${text} was not read`);
          expect(Math.abs(back.ohms / ohms - 1), text).toBeLessThan(part);
        }
      }),
      { numRuns: 3000 },
    );
  });
});
