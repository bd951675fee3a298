import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { checkPart } from '@/domain/parts/check';
import type { PartCheckInput, PartVerdict } from '@/domain/parts/check-types';
import { modesOf } from '@/domain/parts/failure-shares';
import { PART_KINDS } from '@/domain/parts/kinds';

function judge(input: PartCheckInput): PartVerdict {
  const answer = checkPart(input);
  if (!answer.ok) throw new Error(`${answer.path}: ${answer.reason}`);
  return answer;
}
const out = { inCircuit: false };
const inside = { inCircuit: true };
const r4k7 = { kind: 'resistor', ohms: 4700, tolerance: 0.05 } as const;

describe('out of circuit', () => {
  test('a resistor within tolerance fits', () => {
    expect(judge({ ...r4k7, value: 4700, ...out })).toMatchObject({ verdict: 'fits' });
    // 4.960 k is 5.5 % high: the meter's +-(0.8 % + 3 counts) brings it inside.
    expect(judge({ ...r4k7, value: 4960, ...out }).verdict).toBe('fits');
    // A sharper meter does not.
    const sharp = { accuracy: { percent: 0.05, counts: 1 }, resolution: 0.1 };
    expect(judge({ ...r4k7, value: 4960, ...sharp, ...out })).toMatchObject({
      verdict: 'suspect',
      mode: 'drifted-high',
    });
  });

  test.each([
    [{ ...r4k7, value: 'OL' }, 'open', 0.85],
    [{ ...r4k7, value: 9000 }, 'drifted-high', 0.85],
    [{ ...r4k7, value: 3000 }, 'drifted-low', 0.7],
    [{ ...r4k7, value: 0.2 }, 'short', 0.6],
    [{ kind: 'ptc', ohms: 1100, tolerance: 0.2, value: 'OL' }, 'open', 0.97],
    [{ kind: 'ptc', value: 'OL' }, 'open', 0.97],
    [{ kind: 'mov', marking: '561K', value: 0.4 }, 'short', 0.97],
    [{ kind: 'mov', value: 200_000 }, 'leaky', 0.93],
    [{ kind: 'fuse', marking: 'F 11A 1000V', value: 'OL' }, 'open', 0.97],
    [{ kind: 'clamp', value: 0.5 }, 'short', 0.95],
    [{ kind: 'clamp', value: 200_000 }, 'leaky', 0.5],
    [{ kind: 'gdt', value: 0.2 }, 'short', 0.85],
    [{ kind: 'shunt', value: 'OL' }, 'open', 0.9],
    [{ kind: 'capacitor', marking: '104K', value: 200_000 }, 'leaky', 0.7],
    [{ kind: 'contact', value: 'OL', position: 'ohms' }, 'open', 0.95],
    [{ kind: 'contact', value: 5, position: 'ohms' }, 'drifted-high', 0.9],
    [{ kind: 'contact', value: 0.3, position: 'open' }, 'short', 0.95],
  ] as const)('%j is a suspect', (input, mode, least) => {
    const verdict = judge({ ...input, ...out });
    expect(verdict).toMatchObject({ verdict: 'suspect', mode });
    expect(verdict.probability).toBeGreaterThan(least);
    expect(verdict.probability).toBeLessThan(1);
  });

  test.each([
    { kind: 'mov', marking: '561K', value: 'OL' },
    { kind: 'diode', value: 'OL' },
    { kind: 'ptc', value: 1100 },
    { kind: 'contact', value: 0.1 },
    { kind: 'contact', value: 'OL', position: 'open' },
    { kind: 'inductor', value: 2 },
    { kind: 'shunt', value: 0.2 },
    { kind: 'shunt', ohms: 0.01, value: 0.0101, resolution: 0.0001 },
    { kind: 'ntc', marking: '103', value: 11_000 },
    { kind: 'resistor', marking: 'brown-black-red-gold', value: 1010 },
    { kind: 'resistor', marking: '4.7k', value: 4700 },
    { kind: 'resistor', marking: '000', value: 0.1 },
  ] as const)('%j fits', (input) => {
    const verdict = judge({ ...input, ...out });
    expect(verdict.verdict).toBe('fits');
    expect(verdict.probability).toBeLessThan(0.1);
    expect(verdict.mode).toBeUndefined();
    expect(verdict.next).toBeUndefined();
  });

  test('through the jacks an 11 A fuse is good below 0.5 Ω and a 440 mA fuse below 12 Ω', () => {
    // Limits read in a maker's manual; they include shunt and leads.
    expect(judge({ kind: 'fuse', marking: 'F 11A 1000V', value: 0.4, ...out }).verdict).toBe(
      'fits',
    );
    expect(judge({ kind: 'fuse', marking: 'F 11A 1000V', value: 3, ...out }).verdict).toBe(
      'suspect',
    );
    expect(judge({ kind: 'fuse', marking: 'FF440mA', value: 10, ...out }).verdict).toBe('fits');
    expect(judge({ kind: 'fuse', marking: 'FF440mA', value: 40, ...out }).verdict).toBe('suspect');
  });

  test('what the ohms range cannot see is said', () => {
    const reasons = judge({ kind: 'mov', marking: '561K', value: 'OL', ...out }).reasons.join(' ');
    expect(reasons).toContain('An open varistor reads the same');
    expect(reasons).toContain('560 V at 1 mA cannot be seen on the ohms range');
  });

  test('a warm PTC gets its five minutes, a junction its other polarity', () => {
    expect(judge({ kind: 'ptc', ohms: 1100, value: 2200, ...out }).next).toContain('5 minutes');
    expect(judge({ kind: 'diode', value: 100_000, ...out })).toMatchObject({
      verdict: 'inconclusive',
      next: 'Swap the leads and measure again: only the higher of the two readings counts.',
    });
  });

  test('a trimmer is judged end to end, and the wiper is said', () => {
    const verdict = judge({ kind: 'trimmer', marking: '103', value: 5000, ...out });
    expect(verdict.reasons.join(' ')).toContain('from the wiper any lower value is right');
    expect(verdict.next).toBe('Measure it again from end to end.');
  });

  test('over range on a part above the range judges nothing', () => {
    expect(judge({ kind: 'resistor', ohms: 100e6, value: 'OL', ...out }).verdict).toBe(
      'inconclusive',
    );
    const wide = { overRange: 2e9 };
    expect(judge({ kind: 'resistor', ohms: 100e6, value: 'OL', ...wide, ...out })).toMatchObject({
      verdict: 'suspect',
      mode: 'open',
    });
  });

  test('without a value only an open and a short are told', () => {
    expect(judge({ kind: 'resistor', value: 4700, ...out })).toMatchObject({
      verdict: 'inconclusive',
      next: 'Give the part’s ohms or its marking.',
    });
    expect(judge({ kind: 'resistor', value: 'OL', ...out })).toMatchObject({ mode: 'open' });
  });
});

describe('in circuit, by Rayleigh’s monotonicity law', () => {
  test('a reading above tolerance proves the part open or drifted high', () => {
    for (const [value, mode] of [
      [9000, 'drifted-high'],
      ['OL', 'open'],
    ] as const) {
      const verdict = judge({ ...r4k7, value, ...inside });
      expect(verdict).toMatchObject({ verdict: 'suspect', mode });
      expect(verdict.reasons.join(' ')).toContain(
        'one above tolerance proves the part open or drifted high',
      );
    }
  });

  test('a reading below tolerance proves nothing until a lead is lifted', () => {
    for (const input of [
      { ...r4k7, value: 3000 },
      { ...r4k7, value: 0.2 },
      { kind: 'mov', value: 200_000 },
      { kind: 'mov', value: 30e6 },
      { kind: 'clamp', value: 2000 },
      { kind: 'capacitor', value: 3e6 },
    ] as const) {
      const verdict = judge({ ...input, ...inside });
      expect(verdict).toMatchObject({
        verdict: 'inconclusive',
        next: 'Lift one lead and measure again.',
      });
      expect(verdict.mode).toBeUndefined();
      expect(verdict.reasons.join(' ')).toContain(
        'one below tolerance proves nothing until a lead is lifted',
      );
    }
  });

  test('about 0 Ω across a varistor is strong, though not proof', () => {
    for (const kind of ['mov', 'gdt', 'clamp'] as const) {
      const verdict = judge({ kind, value: 0.2, ...inside });
      expect(verdict).toMatchObject({
        verdict: 'suspect',
        mode: 'short',
        next: 'Lift one lead and measure again.',
      });
      expect(verdict.reasons.join(' ')).toContain(
        'strong, though not proof until a lead is lifted',
      );
      expect(verdict.probability).toBeLessThan(judge({ kind, value: 0.2, ...out }).probability);
    }
  });

  test('a reading within tolerance fits', () => {
    expect(judge({ ...r4k7, value: 4650, ...inside }).verdict).toBe('fits');
    expect(judge({ kind: 'fuse', value: 0.4, ...inside }).verdict).toBe('fits');
    expect(judge({ kind: 'mov', value: 'OL', ...inside }).verdict).toBe('fits');
  });

  test('the measured value and the position stand beside the needed value', () => {
    const [first] = judge({
      ...r4k7,
      value: 9000,
      resolution: 10,
      position: 'volts',
      ...inside,
    }).reasons;
    expect(first).toBe(
      'Measured 9.00 kΩ in circuit at position volts; 4.7 kΩ ±5 % needed (4.465 kΩ to 4.935 kΩ).',
    );
  });
});

describe('markings', () => {
  test('a marking with two values is refused with both, one that rests on memory steps back', () => {
    expect(checkPart({ kind: 'resistor', marking: '01H', value: 1000, ...out })).toMatchObject({
      ok: false,
      path: 'marking',
      reason: '"01H" given, it may be 1 kΩ or 1 GΩ: the part\'s ohms are needed',
    });
    expect(judge({ kind: 'resistor', marking: '22R', value: 22, ...out }).verdict).toBe('fits');
  });

  test('an unreadable one is refused where the value depends on it, and said elsewhere', () => {
    expect(checkPart({ kind: 'resistor', marking: 'hello', value: 1, ...out })).toMatchObject({
      ok: false,
      path: 'marking',
    });
    const verdict = judge({ kind: 'mov', marking: 'hello', value: 'OL', ...out });
    expect(verdict.reasons.join(' ')).toContain('marking could not be read');
  });

  test('given ohms and tolerance come before the marking’s', () => {
    const both = { kind: 'resistor', marking: '103', ohms: 4700, tolerance: 0.01, ...out } as const;
    expect(judge({ ...both, value: 4700 }).verdict).toBe('fits');
    expect(judge({ ...both, value: 10_000 }).verdict).toBe('suspect');
    const marked = { kind: 'resistor', marking: '4K7K', ...out } as const;
    expect(judge({ ...marked, value: 5100 }).verdict).toBe('fits');
    expect(judge({ ...marked, tolerance: 0.01, value: 5100 }).verdict).toBe('suspect');
  });
});

test('numbers that cannot be judged are refused by field', () => {
  const good: PartCheckInput = { kind: 'resistor', ohms: 100, value: 100, inCircuit: false };
  for (const [path, wrong] of [
    ['value', { value: Number.NaN }],
    ['value', { value: -1 }],
    ['value', { value: Number.POSITIVE_INFINITY }],
    ['ohms', { ohms: 0 }],
    ['ohms', { ohms: Number.NaN }],
    ['tolerance', { tolerance: 1 }],
    ['tolerance', { tolerance: Number.NaN }],
    ['resolution', { resolution: 0 }],
    ['overRange', { overRange: -1 }],
    ['accuracy', { accuracy: { percent: -1, counts: 0 } }],
    ['accuracy', { accuracy: { percent: 0, counts: Number.NaN } }],
  ] as const) {
    expect(checkPart({ ...good, ...wrong })).toMatchObject({ ok: false, path });
  }
});

describe('properties', () => {
  const decade = fc.double({ min: -3, max: 12, noNaN: true }).map((x) => 10 ** x);
  const anyPart = fc.record({
    kind: fc.constantFrom(...PART_KINDS),
    ohms: fc.option(decade, { nil: undefined }),
    tolerance: fc.option(fc.double({ min: 1e-4, max: 0.9, noNaN: true }), { nil: undefined }),
    marking: fc.option(fc.constantFrom('103', '561K', '4R7', 'T2A', '0', 'hello', ''), {
      nil: undefined,
    }),
    value: fc.oneof(decade, fc.constant('OL' as const), fc.constant(0)),
    inCircuit: fc.boolean(),
    position: fc.constantFrom(undefined, 'ohms', 'open'),
  });

  test('a verdict is always a probability, a mode the kind has, and at least one sentence', () => {
    fc.assert(
      fc.property(anyPart, (input) => {
        const answer = checkPart(input);
        if (!answer.ok) {
          expect(answer.path).toBe('marking');
          return;
        }
        expect(answer.probability >= 0 && answer.probability <= 1).toBe(true);
        expect(answer.reasons.every((one) => /^[A-Z].*\.$/u.test(one))).toBe(true);
        expect(answer.mode !== undefined).toBe(answer.verdict === 'suspect');
        if (answer.mode) expect(modesOf(input.kind)).toContain(answer.mode);
      }),
      { numRuns: 4000 },
    );
  });

  test('in circuit, below tolerance, nobody is convicted unless it is as good as a short', () => {
    fc.assert(
      fc.property(decade, fc.double({ min: 0.01, max: 0.9, noNaN: true }), (ohms, share) => {
        const verdict = judge({ kind: 'resistor', ohms, value: ohms * share, inCircuit: true });
        if (ohms * share > 10) expect(verdict.verdict).not.toBe('suspect');
      }),
    );
  });

  test('a sound resistor is seldom called a suspect, a drifted one seldom fits', () => {
    const ohms = fc.integer({ min: 10, max: 1_000_000 });
    fc.assert(
      fc.property(ohms, fc.double({ min: -0.05, max: 0.05, noNaN: true }), (nominal, off) => {
        const part = {
          kind: 'resistor',
          ohms: nominal,
          tolerance: 0.05,
          inCircuit: false,
        } as const;
        expect(judge({ ...part, value: nominal * (1 + off) }).verdict).toBe('fits');
        expect(judge({ ...part, value: nominal * (1.3 + Math.abs(off)) }).verdict).toBe('suspect');
      }),
    );
  });
});
