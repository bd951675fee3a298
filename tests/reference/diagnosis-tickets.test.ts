import { describe, expect, it } from 'vitest';
import { diagnose } from '@/domain/diagnosis/diagnose';
import type { Incident } from '@/domain/parts/kinds';
import { testNetworks } from '../fixtures/networks/all';
import { pick, seeded } from './seeded';
import { drawFaults, takeReadings } from './tickets';
import { canBeToldApart } from './told-apart';

const INCIDENTS: readonly Incident[] = [
  'unknown',
  'mains-on-ohms',
  'overvoltage-on-volts',
  'dropped',
];
const PER_NETWORK = { 1: 8, 2: 4 } as const;

interface Score {
  tickets: number;
  first: number;
  three: number;
}

/** Simulated tickets of every network with so many faults that the readings can tell. */
function simulate(faultCount: 1 | 2, seed: number): Score {
  const score = { tickets: 0, first: 0, three: 0 };
  testNetworks.forEach(({ network, probes }, at) => {
    const random = seeded(seed * 1000 + at);
    let kept = 0;
    for (let tries = 0; kept < PER_NETWORK[faultCount] && tries < 80; tries++) {
      const incident = pick(random, INCIDENTS);
      const faults = drawFaults(random, network, incident, faultCount);
      if (!canBeToldApart(network, faults, probes)) continue;
      kept++;
      const readings = takeReadings(random, network, faults, probes);
      const { hypotheses } = diagnose({ network, readings, incident, next: false, limit: 3 });
      const key = (list: readonly { ref: string; mode?: string | undefined }[]): string =>
        list
          .map(({ ref, mode }) => `${ref} ${mode}`)
          .sort()
          .join(' + ');
      const rank = hypotheses.findIndex((one) => key(one.faults) === key(faults));
      score.tickets++;
      if (rank === 0) score.first++;
      if (rank >= 0) score.three++;
    }
  });
  return score;
}

describe('simulated tickets with tolerance and meter error', () => {
  it('rank a single fault that can be told in the first three in at least 90 %', () => {
    const score = simulate(1, 7);
    expect(score.tickets).toBeGreaterThan(120);
    expect(score.three / score.tickets).toBeGreaterThanOrEqual(0.9);
    expect(score.first / score.tickets).toBeGreaterThanOrEqual(0.8);
  });

  it('rank two faults that can be told in the first three in at least 90 %', () => {
    const score = simulate(2, 8);
    expect(score.tickets).toBeGreaterThan(50);
    expect(score.three / score.tickets).toBeGreaterThanOrEqual(0.9);
  });
});
