import { describe, expect, it } from 'vitest';
import { mutualInformation } from '@/domain/diagnosis/information';

/** Outcomes far apart or equal: the reading then answers a plain question. */
const outcomes = (shown: number[], weight: number[], hypothesis = shown.map((_, i) => i)) => ({
  count: shown.length,
  shown,
  weight,
  hypothesis,
  doubt: shown.map(() => 0.01),
});
const FAR = [1, 5, 9];

describe('expected information of a reading', () => {
  // Entropies computed from the shares .59, .36, .05 of a film resistor (MIL-HDBK-338B).
  const shares = [0.59, 0.36, 0.05];

  it('is the whole entropy when every outcome differs', () => {
    expect(mutualInformation(outcomes(FAR, shares)).bits).toBeCloseTo(1.1958, 4);
  });

  it.each([
    ['open from the rest', [1, 5, 5], 0.9765],
    ['drift from the rest', [1, 5, 1], 0.9427],
    ['short from the rest', [1, 1, 5], 0.2864],
    ['open, as OL, from the rest', [Infinity, 5, 5], 0.9765],
  ])('is that of one question: %s', (_, shown, bits) => {
    expect(mutualInformation(outcomes(shown, shares)).bits).toBeCloseTo(bits, 4);
  });

  it('is one bit for a half split of eight equal parts, and nothing when all show the same', () => {
    const even = new Array<number>(8).fill(1 / 8);
    const half = mutualInformation(outcomes([1, 1, 1, 1, 7, 7, 7, 7], even));
    expect(half.bits).toBeCloseTo(1, 9);
    expect(mutualInformation(outcomes(new Array<number>(8).fill(3), even)).bits).toBe(0);
  });

  it('does not count a scatter that belongs to one hypothesis', () => {
    const scattered = outcomes([1, 5, 9, 1], [0.2, 0.2, 0.1, 0.5], [0, 0, 0, 1]);
    // H(h) − H(h|y): y = 1 leaves .2 against .5, the others leave nothing open.
    const entropy = (p: number) => -p * Math.log2(p) - (1 - p) * Math.log2(1 - p);
    expect(mutualInformation(scattered).bits).toBeCloseTo(1 - 0.7 * entropy(0.2 / 0.7), 3);
  });

  it('shrinks as outcomes come closer than the meter can tell', () => {
    const at = (apart: number) => mutualInformation(outcomes([1, 1 + apart], [0.5, 0.5])).bits;
    expect(at(1)).toBeCloseTo(1, 6);
    // Two equal normals d standard deviations apart: .486 bit at d = 2 (computed by quadrature).
    expect(at(0.02)).toBeCloseTo(0.486, 2);
    expect(at(0.001)).toBe(0);
  });
});
