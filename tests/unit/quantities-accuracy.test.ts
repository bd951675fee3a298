import { expect, test } from 'vitest';
import {
  accuracyLimit,
  accuracyUncertainty,
  autorangeResolution,
} from '@/domain/quantities/accuracy';

test('a stated accuracy gives the limit and the rectangular standard uncertainty', () => {
  // Limits read in makers' manuals; uncertainties computed, a/sqrt(3) as JCGM 100:2008.
  expect(accuracyLimit(32, { percent: 2.5, counts: 3 }, 0.01)).toBeCloseTo(0.83, 12);
  expect(accuracyUncertainty(32, { percent: 2.5, counts: 3 }, 0.01)).toBeCloseTo(0.479, 3);
  expect(accuracyLimit(2, { percent: 0.08, counts: 2 }, 0.001)).toBeCloseTo(0.0036, 12);
  expect(accuracyUncertainty(2, { percent: 0.08, counts: 2 }, 0.001)).toBeCloseTo(0.00208, 5);
  expect(accuracyLimit(-32, { percent: 2.5, counts: 3 }, 0.01)).toBeCloseTo(0.83, 12);
});

test('an autoranging 4000-count meter changes range at 400, 4 k, 40 k', () => {
  expect(
    [0, 0.3, 399.9, 400, 1600, 3999, 4000, 10e6, 40e6].map((x) => autorangeResolution(x)),
  ).toEqual([0.1, 0.1, 0.1, 1, 1, 1, 10, 10_000, 100_000]);
  expect(autorangeResolution(5999, 6000)).toBe(1);
  expect(() => autorangeResolution(Number.NaN)).toThrow(RangeError);
});
