import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { diagnose } from '@/domain/diagnosis/diagnose';
import type { DiagnosisInput, Fault, Reading } from '@/domain/diagnosis/types';
import type { Network } from '@/domain/network/types';
import { INCIDENTS } from '@/domain/parts/kinds';
import { testNetworks } from '../fixtures/networks/all';
import { enumerate } from './brute-force';

const small: Network = {
  positions: ['volts', 'ohms'],
  parts: [
    { ref: 'RT1', kind: 'ptc', nets: ['IN', 'A'], ohms: 1100, tolerance: 0.2 },
    { ref: 'RV1', kind: 'mov', nets: ['A', 'COM'] },
    { ref: 'R1', kind: 'resistor', nets: ['A', 'COM'], ohms: 1e6, tolerance: 0.01 },
    { ref: 'S1', kind: 'contact', nets: ['A', 'OHM'], closed: ['ohms'] },
  ],
};
const name = (faults: readonly Fault[]): string =>
  faults
    .map(({ ref, mode }) => `${ref} ${mode}`)
    .sort()
    .join(' + ');
const at = (from: string, to: string, position: string, value: Reading['value']): Reading => ({
  from,
  to,
  position,
  value,
});

const cases: { what: string; readings: Reading[] }[] = [
  { what: 'no reading at all', readings: [] },
  {
    what: 'a healthy input',
    readings: [at('IN', 'COM', 'volts', 1.001e6), at('A', 'COM', 'volts', 9.98e5)],
  },
  {
    what: 'an open PTC',
    readings: [at('IN', 'COM', 'volts', 'OL'), at('A', 'COM', 'volts', 9.98e5)],
  },
  {
    what: 'a leaky varistor',
    readings: [at('IN', 'COM', 'volts', 3.34e5), at('IN', 'A', 'volts', 1090)],
  },
  {
    what: 'a drifted divider',
    readings: [at('IN', 'COM', 'volts', 1.9e6), at('A', 'COM', 'volts', 1.89e6)],
  },
  {
    what: 'two faults at once',
    readings: [at('IN', 'A', 'volts', 'OL'), at('A', 'COM', 'ohms', 52.1)],
  },
  {
    what: 'a misprobe among sound readings',
    readings: [
      at('IN', 'COM', 'volts', 1.001e6),
      at('IN', 'A', 'volts', 1110),
      at('OHM', 'COM', 'ohms', 330),
    ],
  },
];

/** A rough meter, so that the slow way's even cut resolves what it shows. */
const ROUGH = { percent: 15, counts: 3 };

describe('posterior against brute-force enumeration', () => {
  it.each(cases)('agrees for $what, pairs included', ({ readings }) => {
    const rough = readings.map((reading) => ({ ...reading, accuracy: ROUGH }));
    const input: DiagnosisInput = { network: small, readings: rough, incident: 'mains-on-ohms' };
    const slow = enumerate(input, 2);
    const fast = diagnose({ ...input, next: false, limit: 200 });
    const fastOf = new Map(fast.hypotheses.map((h) => [name(h.faults), h.probability]));
    fastOf.set('', fast.healthy);
    for (const { faults, probability } of slow) {
      const ours = fastOf.get(name(faults)) ?? 0;
      expect(Math.abs(ours - probability), name(faults)).toBeLessThan(0.01 + 0.1 * probability);
    }
  });

  it.each(cases)('agrees for $what among single faults, with a usual meter', ({ readings }) => {
    const input: DiagnosisInput = { network: small, readings, incident: 'unknown' };
    const slow = enumerate(input, 1);
    const fast = diagnose({ ...input, next: false, limit: 200 });
    const singles = fast.hypotheses.filter((h) => h.faults.length === 1);
    const total = fast.healthy + singles.reduce((sum, h) => sum + h.probability, 0);
    for (const { faults, probability } of slow) {
      const found = singles.find((h) => name(h.faults) === name(faults))?.probability ?? 0;
      const ours = (faults.length === 0 ? fast.healthy : found) / total;
      expect(Math.abs(ours - probability), name(faults)).toBeLessThan(0.01 + 0.1 * probability);
    }
  });
});

describe('posterior', () => {
  const value = fc.oneof(
    fc.constant('OL' as const),
    fc.constant(0),
    fc.double({ min: 1e-3, max: 5.9e7, noNaN: true }),
  );

  it('is a probability whatever the readings say', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...testNetworks),
        fc.array(fc.tuple(fc.nat(), fc.nat(), fc.nat(), value, fc.nat()), { maxLength: 8 }),
        fc.constantFrom(...INCIDENTS),
        ({ network }, drawn, incident) => {
          const nets = [...new Set(network.parts.flatMap((part) => part.nets))];
          const readings = drawn.map(([from, to, position, shown, lifted]) => ({
            from: nets[from % nets.length]!,
            to: nets[(from + 1 + (to % (nets.length - 1))) % nets.length]!,
            position: network.positions[position % network.positions.length]!,
            value: shown,
            lifted: lifted % 3 === 0 ? [network.parts[lifted % network.parts.length]!.ref] : [],
          }));
          const answer = diagnose({ network, readings, incident, limit: 200 });
          const chances = [
            answer.healthy,
            ...answer.hypotheses.map((h) => h.probability),
            ...answer.parts.flatMap((p) => [p.fault, ...Object.values(p.modes)]),
          ];
          const sum = answer.healthy + answer.hypotheses.reduce((s, h) => s + h.probability, 0);
          return (
            chances.every((p) => p >= 0 && p <= 1 + 1e-9) &&
            sum <= 1 + 1e-9 &&
            answer.entropy >= 0 &&
            Number.isFinite(answer.entropy) &&
            answer.next.every(({ bits, cost }) => bits >= 0 && Number.isFinite(bits) && cost >= 1)
          );
        },
      ),
      { numRuns: 60 },
    );
  });

  it('does not change with the order of the readings or the direction of the leads', () => {
    const { network, probes } = testNetworks[1]!;
    const readings = probes.map((probe, i) => ({
      ...probe,
      value: i === 2 ? ('OL' as const) : 1e6 / (i + 1),
    }));
    const turned = [...readings].reverse().map((r) => ({ ...r, from: r.to, to: r.from }));
    const [one, other] = [readings, turned].map((r) =>
      diagnose({ network, readings: r, next: false }),
    );
    expect(other!.healthy).toBeCloseTo(one!.healthy, 6);
    one!.parts.forEach((part, i) => expect(other!.parts[i]!.fault).toBeCloseTo(part.fault, 6));
  });
});
