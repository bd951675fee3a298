import fc from 'fast-check';
import { expect, test } from 'vitest';
import { E_SERIES, isPreferred, nearestPreferred, seriesValues } from '@/domain/markings/preferred';

test('E24 is the list of IEC 60063, which the formula does not give', () => {
  const list = '10 11 12 13 15 16 18 20 22 24 27 30 33 36 39 43 47 51 56 62 68 75 82 91'; // IEC 60063 [T]
  expect(seriesValues(24).join(' ')).toBe(list);
  const formula = Array.from({ length: 24 }, (_, i) => Math.round(10 * 10 ** (i / 24)));
  const different = seriesValues(24).filter((value, i) => value !== formula[i]);
  expect(different).toEqual([27, 30, 33, 36, 39, 43, 47, 82]); // [C]
});

test('E3, E6 and E12 are every eighth, fourth and second of E24', () => {
  expect(seriesValues(3)).toEqual([10, 22, 47]);
  expect(seriesValues(6)).toEqual([10, 15, 22, 33, 47, 68]);
  expect(seriesValues(12)).toEqual([10, 12, 15, 18, 22, 27, 33, 39, 47, 56, 68, 82]);
});

test('E48, E96 and E192 follow the formula but for 920', () => {
  const formula = (n: number) =>
    Array.from({ length: n }, (_, i) => Math.round(100 * 10 ** (i / n)));
  expect(seriesValues(48)).toEqual(formula(48)); // [C]
  expect(seriesValues(96)).toEqual(formula(96)); // [C]
  expect(seriesValues(192).filter((value, i) => value !== formula(192)[i])).toEqual([920]); // [C]
  // Codes of EIA-96, which count through E96 [C].
  const e96 = seriesValues(96);
  const at = (code: number) => e96[code - 1];
  expect([1, 12, 24, 25, 36, 48, 49, 60, 68, 72, 73, 84, 96].map(at)).toEqual([
    100, 130, 174, 178, 232, 309, 316, 412, 499, 549, 562, 732, 976,
  ]);
});

test('nearest preferred values', () => {
  expect(nearestPreferred(4700, 12)).toEqual({ below: 4700, above: 4700, nearest: 4700 });
  expect(nearestPreferred(5000, 12)).toEqual({ below: 4700, above: 5600, nearest: 4700 });
  expect(nearestPreferred(9.5, 6)).toEqual({ below: 6.8, above: 10, nearest: 10 });
  expect(nearestPreferred(0.00012, 96).nearest).toBe(0.000121);
  expect(isPreferred(0.47, 3)).toBe(true);
  expect(isPreferred(0.48, 24)).toBe(false);
  for (const wrong of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) {
    expect(() => nearestPreferred(wrong, 24)).toThrow(RangeError);
  }
});

test('the nearest lies between its neighbours, and a preferred value is its own', () => {
  const decades = fc.double({ min: -12, max: 12, noNaN: true });
  fc.assert(
    fc.property(decades, fc.constantFrom(...E_SERIES), (decade, series) => {
      const value = 10 ** decade;
      const { below, above, nearest } = nearestPreferred(value, series);
      expect(below).toBeLessThanOrEqual(value * (1 + 1e-8));
      expect(above).toBeGreaterThanOrEqual(value * (1 - 1e-8));
      expect([below, above]).toContain(nearest);
      expect(isPreferred(nearest, series)).toBe(true);
    }),
  );
});
