import { describe, expect, it } from 'vitest';
import { diagnose } from '@/domain/diagnosis/diagnose';
import { predict, predictUnder } from '@/domain/diagnosis/predict';
import type { DiagnosisAnswer, Reading } from '@/domain/diagnosis/types';
import type { ForcedPart, Network } from '@/domain/network/types';
import { apiExample } from '../fixtures/networks/api-example';
import { testNetworks } from '../fixtures/networks/all';

const handheld = testNetworks[1]!;

/** Exact readings of the network with these faults at all its probes. */
function readingsOf(
  { network, probes }: typeof handheld,
  faults: readonly ForcedPart[],
): Reading[] {
  const values = predictUnder(network, faults, probes);
  return probes.map((probe, i) => ({ ...probe, value: values[i]! }));
}
const standing = (answer: DiagnosisAnswer, ref: string) =>
  answer.parts.find((part) => part.ref === ref)!.standing;

describe('the answer to the API example', () => {
  const answer = diagnose(apiExample);

  it('ranks the open PTC first and accounts for every part in order', () => {
    expect(answer.hypotheses[0]!.faults).toEqual([{ ref: 'RT1', mode: 'open' }]);
    expect(answer.hypotheses.length).toBeLessThanOrEqual(20);
    expect(answer.parts.map((part) => part.ref)).toEqual(['RT1', 'RV1', 'R1', 'S1']);
    expect(standing(answer, 'RT1')).toBe('suspect');
    expect(standing(answer, 'R1')).toBe('untouched');
  });

  it('rules out a shorted varistor alone: it would have read the PTC', () => {
    const short = answer.hypotheses.find(
      (h) => h.faults.length === 1 && h.faults[0]!.ref === 'RV1' && h.faults[0]!.mode === 'short',
    );
    expect(short?.probability ?? 0).toBeLessThan(1e-3);
  });

  it('sums to one and proposes to measure across the PTC', () => {
    const all = diagnose({ ...apiExample, limit: 200 });
    const sum = all.healthy + all.hypotheses.reduce((total, h) => total + h.probability, 0);
    expect(sum).toBeCloseTo(1, 3);
    expect([answer.next[0]!.from, answer.next[0]!.to].sort()).toEqual(['N1', 'VIN']);
    expect(answer.next.length).toBeLessThanOrEqual(5);
    expect(answer.reasons.length).toBeGreaterThan(0);
  });
});

describe('what the answer says', () => {
  it('looks elsewhere when every reading fits', () => {
    const answer = diagnose({ network: handheld.network, readings: readingsOf(handheld, []) });
    const before = diagnose({ network: handheld.network, readings: [], next: false });
    expect(answer.healthy).toBeGreaterThan(1.2 * before.healthy);
    expect(answer.reasons.join(' ')).toContain('fits the healthy network');
    expect(answer.doubtful).toEqual([]);
  });

  it('names the reading, the healthy value and the predicted one', () => {
    const readings = readingsOf(handheld, [{ ref: 'RT1', ohms: 'OL' }]);
    const answer = diagnose({ network: handheld.network, readings, incident: 'mains-on-ohms' });
    const text = answer.reasons.join('\n');
    expect(standing(answer, 'RT1')).toBe('suspect');
    expect(text).toMatch(
      /VIN to PROT at ohms reads OL, a healthy network shows 1\.1 kΩ ±\d+ %; with RT1 open it shows OL\./,
    );
    expect(text).toContain('other paths can only lower a reading');
  });

  it('clears what the readings speak for and leaves the rest untouched', () => {
    const readings = readingsOf(handheld, [{ ref: 'RT1', ohms: 'OL' }]).slice(0, 4);
    const answer = diagnose({ network: handheld.network, readings, incident: 'mains-on-ohms' });
    expect(standing(answer, 'R1')).toBe('cleared');
    expect(standing(answer, 'U1')).toBe('untouched');
  });

  it('reports equal resistors of one chain as a group, never as a winner', () => {
    const chain: Network = {
      positions: ['volts'],
      parts: ['R1', 'R2', 'R3'].map((ref, i) => ({
        ref,
        kind: 'resistor' as const,
        nets: [`N${i}`, `N${i + 1}`] as [string, string],
        ohms: 3.3e6,
        tolerance: 0.01,
      })),
    };
    const readings: Reading[] = [{ from: 'N0', to: 'N3', position: 'volts', value: 'OL' }];
    const answer = diagnose({ network: chain, readings });
    expect(answer.groups).toEqual([['R1', 'R2', 'R3']]);
    const [one, two, three] = answer.hypotheses.map((h) => h.probability);
    expect(two).toBeCloseTo(one!, 9);
    expect(three).toBeCloseTo(one!, 9);
    const inner = [...readings, { from: 'N0', to: 'N1', position: 'volts', value: 3.3e6 }];
    expect(diagnose({ network: chain, readings: inner }).groups).toEqual([['R2', 'R3']]);
  });

  it('asks to measure again what fits nothing, and still finds the fault', () => {
    const readings = readingsOf(handheld, [
      { ref: 'RV2', ohms: 2e5 },
      { ref: 'RV1', ohms: 1 },
    ]);
    const wrong = readings.findIndex((r) => r.from === 'DIV' && r.to === 'TAP');
    readings[wrong] = { ...readings[wrong]!, value: 147 };
    const answer = diagnose({ network: handheld.network, readings });
    expect(answer.doubtful.map((one) => one.reading)).toEqual([wrong]);
    expect(answer.doubtful[0]!.reason).toMatch(/^Measure DIV to TAP at volts again: 147\.0 Ω/);
    expect(answer.hypotheses[0]!.faults.map((f) => f.ref).sort()).toEqual(['RV1', 'RV2']);
  });

  it.each([
    [
      ['RT1', 'OL'],
      ['RV2', 1],
      ['R1', 'OL'],
    ],
    [
      ['RT1', 'OL'],
      ['RV2', 1],
      ['S1', 'OL'],
    ],
  ] as const)('finds three faults at once, %j with %j and %j', (...three) => {
    const readings = readingsOf(
      handheld,
      three.map(([ref, ohms]) => ({ ref, ohms })),
    );
    const answer = diagnose({ network: handheld.network, readings, incident: 'mains-on-ohms' });
    const refs = answer.hypotheses[0]!.faults.map((f) => f.ref).sort();
    expect(refs).toEqual(three.map(([ref]) => ref).sort());
    for (const [ref] of three) expect(standing(answer, ref), ref).toBe('suspect');
    const all = diagnose({ network: handheld.network, readings, limit: 200, next: false });
    const sum = all.healthy + all.hypotheses.reduce((total, h) => total + h.probability, 0);
    expect(sum).toBeGreaterThan(0.95);
    expect(sum).toBeLessThan(1 + 1e-9);
  });

  describe('a part of close tolerance', () => {
    const divider: Network = {
      positions: ['volts'],
      parts: [
        { ref: 'R1', kind: 'resistor', nets: ['V', 'N'], ohms: 4.99e6, tolerance: 0.01 },
        { ref: 'R2', kind: 'resistor', nets: ['N', 'Q'], ohms: 4.99e6, tolerance: 0.01 },
        { ref: 'R3', kind: 'resistor', nets: ['Q', 'COM'], ohms: 1.11e6, tolerance: 0.01 },
      ],
    };
    const at = (value: number, resolution: number): Reading[] => [
      { from: 'V', to: 'N', value: 4.99e6, resolution: 1e4 },
      { from: 'N', to: 'Q', value, resolution },
    ];

    // IEC 60062 letter F: ±1 %. Beyond it and the meter's ±(0.8 % + 3 counts) the part has drifted.
    it.each([5.3e6, 5.6e6, 5.9e6])('has drifted as soon as it leaves it: %d Ω', (value) => {
      const answer = diagnose({ network: divider, readings: at(value, 1e4) });
      expect(answer.hypotheses[0]!.faults).toEqual([{ ref: 'R2', mode: 'drifted-high' }]);
      expect(standing(answer, 'R2')).toBe('suspect');
      expect(standing(answer, 'R1')).toBe('cleared');
      expect(answer.doubtful).toEqual([]);
    });

    it('is accused also when its value was noted with few digits', () => {
      const answer = diagnose({ network: divider, readings: at(10e6, 1e6) });
      expect(answer.hypotheses[0]!.faults).toEqual([{ ref: 'R2', mode: 'drifted-high' }]);
      expect(answer.hypotheses[0]!.probability).toBeGreaterThan(0.7);
    });
  });

  it('does not accuse what no reading made likelier', () => {
    const readings = readingsOf(handheld, [{ ref: 'RT1', ohms: 'OL' }]).slice(0, 4);
    const answer = diagnose({ network: handheld.network, readings, incident: 'mains-on-ohms' });
    const before = diagnose({ network: handheld.network, readings: [], incident: 'mains-on-ohms' });
    for (const part of answer.parts.filter((p) => p.standing === 'suspect')) {
      const was = before.parts.find((p) => p.ref === part.ref)!.fault;
      expect(part.fault, part.ref).toBeGreaterThan(Math.min(0.5, was));
    }
  });

  it('lets confirmed faults of the board weigh in, and says how often', () => {
    const readings: Reading[] = [{ from: 'VIN', to: 'COM', position: 'volts', value: 'OL' }];
    const seen = [{ ref: 'S1', mode: 'open' as const, times: 7 }];
    const [without, withSeen] = [
      diagnose({ network: handheld.network, readings, next: false }),
      diagnose({ network: handheld.network, readings, seen, next: false }),
    ];
    const open = (answer: DiagnosisAnswer) =>
      answer.parts.find((part) => part.ref === 'S1')!.modes.open!;
    expect(open(withSeen)).toBeGreaterThan(open(without));
    expect(withSeen.hypotheses[0]!.faults).toEqual([{ ref: 'S1', mode: 'open' }]);
    expect(withSeen.reasons).toContain('S1 open: seen 7 times on this board.');
  });

  it('honours a lifted lead: the part is gone for that reading', () => {
    const base = { from: 'VIN', to: 'PROT', position: 'ohms', value: 1100 };
    const [inCircuit, lifted] = predict(handheld.network, [base, { ...base, lifted: ['RT1'] }]);
    expect(inCircuit!.ohms).toBe(1100);
    expect(inCircuit!.band).toBeGreaterThan(0.2);
    expect(inCircuit!.band).toBeLessThan(0.3);
    expect(lifted).toEqual({ ohms: 'OL', band: 0 });
  });

  it('refuses a net that is not there', () => {
    const readings = [{ from: 'VIN', to: 'NOWHERE', value: 1 }];
    expect(() => diagnose({ network: handheld.network, readings })).toThrow(/net NOWHERE given/);
    expect(() => predict(handheld.network, readings)).toThrow(RangeError);
  });

  it('leaves the next reading out when asked', () => {
    expect(diagnose({ ...apiExample, next: false }).next).toEqual([]);
  });
});
