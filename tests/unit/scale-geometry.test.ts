import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  FULL,
  OHMS,
  OL_AT,
  dialPoint,
  linearGraduations,
  logGraduations,
  ohmmeterDeflection,
  placeLinear,
  placeLog,
  planAccuracy,
  planReading,
} from '@/islands/shared/scale-geometry';

const ohms = fc.double({ min: 0, max: 1e12, noNaN: true });

describe('a place on a linear scale', () => {
  it('puts the ends on the end stops and the middle halfway', () => {
    expect(placeLinear(0, 0, 1)).toBe(FULL.from);
    expect(placeLinear(1, 0, 1)).toBe(FULL.to);
    expect(placeLinear(0.5, 0, 1)).toBe(50);
  });

  it('holds what lies outside at the end stop', () => {
    expect(placeLinear(-3, 0, 1)).toBe(FULL.from);
    expect(placeLinear(7, 0, 1)).toBe(FULL.to);
  });

  it.each([NaN, Infinity, -Infinity])('refuses %s', (value) => {
    expect(() => placeLinear(value, 0, 1)).toThrow(RangeError);
    expect(() => placeLinear(0.5, 0, value)).toThrow(RangeError);
  });

  it('refuses a scale without length', () => {
    expect(() => placeLinear(1, 1, 1)).toThrow(RangeError);
  });
});

describe('a place on the ohms scale', () => {
  it('gives every decade the same length', () => {
    const places = [1, 10, 100, 1e3, 1e4].map((r) => placeLog(r, 1, 1e4));
    const steps = places.slice(1).map((at, i) => at - places[i]!);
    for (const step of steps) expect(step).toBeCloseTo((OHMS.to - OHMS.from) / 4, 1);
  });

  it('stays between the end stops and never runs backwards', () => {
    fc.assert(
      fc.property(ohms, ohms, (a, b) => {
        const [low, high] = a < b ? [a, b] : [b, a];
        const from = placeLog(low, 0.1, 1e8);
        const to = placeLog(high, 0.1, 1e8);
        expect(from).toBeGreaterThanOrEqual(OHMS.from);
        expect(to).toBeLessThanOrEqual(OHMS.to);
        expect(from).toBeLessThanOrEqual(to);
      }),
    );
  });

  it('takes 0 Ω at the left end stop, and refuses what is no resistance', () => {
    expect(placeLog(0, 0.1, 1e8)).toBe(OHMS.from);
    for (const wrong of [-1, NaN, Infinity])
      expect(() => placeLog(wrong, 0.1, 1e8)).toThrow(RangeError);
    expect(() => placeLog(5, 0, 10)).toThrow(RangeError);
    expect(() => placeLog(5, 10, 1)).toThrow(RangeError);
  });
});

describe('graduations', () => {
  it('run from stop to stop with the long ones at the ends and middle', () => {
    const marks = linearGraduations(10, 5);
    expect(marks).toHaveLength(11);
    expect(marks.filter(({ rank }) => rank === 0).map(({ at }) => at)).toEqual([2, 50, 98]);
  });

  it('mark 1, 2 and 5 of each decade on the ohms scale, both ends included', () => {
    const marks = logGraduations(0.1, 1000);
    expect(marks).toHaveLength(4 * 3 + 1);
    expect(marks[0]).toEqual({ at: OHMS.from, rank: 0 });
    expect(marks.at(-1)).toEqual({ at: OHMS.to, rank: 0 });
    expect(new Set(marks.map(({ at }) => at)).size).toBe(marks.length);
  });
});

describe('a reading against its expectation', () => {
  const plan = (
    measured: number | 'OL',
    low?: number,
    high?: number | 'OL',
    predicted?: number | 'OL',
  ) => planReading(measured, { low, high, predicted }, 0.1, 1e8);

  it('fits inside its band, on the limits too', () => {
    for (const value of [950, 1000, 1050])
      expect(plan(value, 950, 1050, 1000).verdict).toBe('fits');
  });

  it('lies above or below outside it', () => {
    expect(plan(949.9, 950, 1050).verdict).toBe('below');
    expect(plan(1050.1, 950, 1050).verdict).toBe('above');
  });

  it('puts OL beyond the end stop, above any finite band', () => {
    const { needle, verdict } = plan('OL', 950, 1050);
    expect(needle).toBe(OL_AT);
    expect(needle).toBeGreaterThan(OHMS.to);
    expect(verdict).toBe('above');
  });

  it('fits OL where OL is expected, and calls a finite reading there too low', () => {
    expect(plan('OL', undefined, undefined, 'OL').verdict).toBe('fits');
    expect(plan('OL', 5e7, undefined, 'OL').verdict).toBe('fits');
    expect(plan('OL', undefined, 'OL', 'OL').verdict).toBe('fits');
    expect(plan(1200, undefined, 'OL', 'OL').verdict).toBe('below');
    expect(plan(6e7, 5e7, 'OL').verdict).toBe('fits');
  });

  it('judges nothing when nothing is expected', () => {
    expect(plan(4700)).toMatchObject({ band: null, predicted: null, verdict: 'unknown' });
  });

  it('keeps the prediction inside its band', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.2, max: 5e7, noNaN: true }),
        fc.double({ min: 0.001, max: 0.5, noNaN: true }),
        (r, t) => {
          const { band, predicted } = plan(r, r * (1 - t), r * (1 + t), r);
          expect(predicted).toBeGreaterThanOrEqual(band!.from);
          expect(predicted).toBeLessThanOrEqual(band!.to);
        },
      ),
    );
  });
});

describe('an error against its limits', () => {
  it('stands in the middle at zero, with limits and guard bands either side alike', () => {
    const { needle, zero, limits, accepted } = planAccuracy(0, 0.5, 0.1);
    expect([needle, zero]).toEqual([50, 50]);
    expect(limits.from + limits.to).toBeCloseTo(100, 1);
    expect(accepted.from).toBeGreaterThan(limits.from);
    expect(accepted.to).toBeLessThan(limits.to);
    // Acceptance limit = limit − guard (ILAC-G8:09/2019): a fifth of the half band is given up here.
    expect((accepted.to - 50) / (limits.to - 50)).toBeCloseTo(0.8, 2);
  });

  it('leaves nothing to accept when the guard is wider than the limit', () => {
    const { accepted } = planAccuracy(0, 0.5, 0.7);
    expect(accepted.from).toBe(accepted.to);
  });

  it('says when the needle is at its stop', () => {
    expect(planAccuracy(0.79, 0.5).beyond).toBe(false);
    expect(planAccuracy(-0.81, 0.5)).toMatchObject({ beyond: true, needle: FULL.from });
  });

  it.each([
    [0, 0, 0],
    [1, -0.1, 0],
    [1, 0, -0.1],
    [NaN, 0, 0],
  ])('refuses limit %s, guard %s, uncertainty %s', (limit, guard, uncertainty) => {
    expect(() => planAccuracy(0, limit, guard, uncertainty)).toThrow(RangeError);
  });
});

describe('a moving-coil ohmmeter', () => {
  it('deflects fully with its leads shorted, by half at its own resistance, not at all when open', () => {
    expect(ohmmeterDeflection(0, 20)).toBe(1);
    expect(ohmmeterDeflection(20, 20)).toBe(0.5);
    expect(ohmmeterDeflection(Infinity, 20)).toBe(0);
  });
});

describe("a point of a meter's face", () => {
  it('stands upright at half deflection and alike on either side', () => {
    expect(dialPoint(0.5, 200)).toEqual({ x: 0, y: -200 });
    const left = dialPoint(0.2, 200);
    const right = dialPoint(0.8, 200);
    expect(left.x).toBeCloseTo(-right.x, 10);
    expect(left.y).toBe(right.y);
    expect(Math.hypot(left.x, left.y)).toBeCloseTo(200, 1);
  });
});
