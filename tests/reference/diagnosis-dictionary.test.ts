import { describe, expect, it } from 'vitest';
import { diagnose } from '@/domain/diagnosis/diagnose';
import { predictUnder } from '@/domain/diagnosis/predict';
import type { ForcedPart, Network } from '@/domain/network/types';

/** PTC 1.1 kΩ in series, then 10 MΩ beside a varistor that insulates perfectly. Values computed. */
const input: Network = {
  positions: ['volts'],
  parts: [
    { ref: 'RT1', kind: 'ptc', nets: ['IN', 'A'], ohms: 1100, tolerance: 0.2 },
    { ref: 'R1', kind: 'resistor', nets: ['A', 'COM'], ohms: 1e7, tolerance: 0.01 },
    { ref: 'RV1', kind: 'mov', nets: ['A', 'COM'], ohms: 1e15 },
  ],
};
const shows = (...faults: ForcedPart[]) =>
  predictUnder(input, faults, [{ from: 'IN', to: 'COM', position: 'volts' }])[0]!;

describe('fault dictionary of an input: PTC in series, 10 MΩ beside a varistor', () => {
  it('shows the published figures', () => {
    expect(shows()).toBeCloseTo(10.0011e6, -3);
    expect(shows({ ref: 'RT1', ohms: 'OL' })).toBe('OL');
    expect(shows({ ref: 'RT1', ohms: 0 })).toBeCloseTo(10e6, -2);
    expect(shows({ ref: 'RV1', ohms: 0 })).toBeCloseTo(1100, 1);
    expect(shows({ ref: 'RV1', ohms: 1e6 })).toBeCloseTo(910.19e3, -1);
    expect(shows({ ref: 'RV1', ohms: 1e5 })).toBeCloseTo(100.11e3, -1);
  });

  it('cannot tell a healthy input from a shorted PTC, and says so', () => {
    const [healthy, short] = [Number(shows()), Number(shows({ ref: 'RT1', ohms: 0 }))];
    expect((healthy - short) / healthy).toBeCloseTo(0.00011, 5);
    const readings = [{ from: 'IN', to: 'COM', position: 'volts', value: 10e6 }];
    const answer = diagnose({ network: input, readings, next: false });
    const ptc = answer.parts.find((part) => part.ref === 'RT1')!;
    const before = diagnose({ network: input, readings: [], next: false });
    // The reading leaves the odds of short against healthy as they were.
    const odds = (one: typeof answer): number =>
      one.hypotheses.find(
        (h) => h.faults.length === 1 && h.faults[0]!.ref === 'RT1' && h.faults[0]!.mode === 'short',
      )!.probability / one.healthy;
    expect(odds(answer) / odds(before)).toBeCloseTo(1, 2);
    expect(ptc.modes.open).toBeLessThan(1e-3);
  });

  it.each([
    ['RT1', 'open', 'OL' as const],
    ['RV1', 'short', 1103],
    ['RV1', 'leaky', 910e3],
    ['RV1', 'leaky', 100.1e3],
  ])('names %s %s first', (ref, mode, value) => {
    const readings = [{ from: 'IN', to: 'COM', position: 'volts', value }];
    const { hypotheses } = diagnose({ network: input, readings, next: false });
    expect(hypotheses[0]!.faults).toEqual([{ ref, mode }]);
  });
});
