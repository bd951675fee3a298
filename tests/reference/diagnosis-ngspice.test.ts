import { describe, expect, it } from 'vitest';
import { violations } from '@/domain/network/validate';
import { predictUnder } from '@/domain/diagnosis/predict';
import type { ForcedPart, Network, Probe } from '@/domain/network/types';
import { apiExample } from '../fixtures/networks/api-example';
import { testNetworks } from '../fixtures/networks/all';
import { netlist } from './network-spice';
import { spiceOhms } from './ngspice';
import { pick, seeded } from './seeded';
import { drawFaults } from './tickets';

const TOLERANCE = 1e-6;
/** No meter's range: every finite resistance is compared. */
const EVERYTHING = 1e18;

/** Healthy, drawn single and double faults, and the extremes: a part gone, and one shorted to 10 mΩ. */
function faultSets(random: () => number, network: Network): ForcedPart[][] {
  const extreme = (ohms: ForcedPart['ohms']): ForcedPart[] => [
    { ref: pick(random, network.parts).ref, ohms },
  ];
  return [
    [],
    drawFaults(random, network, 'mains-on-ohms', 1),
    drawFaults(random, network, 'mains-on-ohms', 2),
    drawFaults(random, network, 'dropped', 2),
    extreme('OL'),
    extreme(0.01),
  ];
}

function compare(
  network: Network,
  probes: readonly Probe[],
  sets: readonly ForcedPart[][],
): number {
  const wide = probes.map((probe) => ({ ...probe, overRange: EVERYTHING }));
  const spice = spiceOhms(
    sets.flatMap((faults) => probes.map((probe) => netlist(network, probe, faults))),
  );
  const ours = sets.flatMap((faults) => predictUnder(network, faults, wide));
  let worst = 0;
  ours.forEach((value, i) => {
    if (value === 'OL' || !Number.isFinite(spice[i]!))
      expect(value).toBe(Number.isFinite(spice[i]!) ? spice[i] : 'OL');
    else worst = Math.max(worst, Math.abs(value - spice[i]!) / spice[i]!);
  });
  expect(ours.length).toBe(sets.length * probes.length);
  return worst;
}

describe('predicted values against ngspice', () => {
  it.each(testNetworks)('agree on $name, healthy and with faults', ({ network, probes }) => {
    expect(violations(network)).toEqual([]);
    expect(network.parts.length).toBeGreaterThanOrEqual(8);
    expect(network.parts.length).toBeLessThanOrEqual(40);
    const random = seeded(network.parts.length * 100 + probes.length);
    const lifted = { ...probes[0]!, lifted: [pick(random, network.parts).ref] };
    const sets = faultSets(random, network);
    expect(compare(network, [...probes, lifted], sets)).toBeLessThanOrEqual(TOLERANCE);
  });

  it('agree on the example of the API under every mode of every part', () => {
    const { network, readings } = apiExample;
    const sets: ForcedPart[][] = [[]];
    for (const { ref } of network.parts)
      for (const ohms of ['OL' as const, 1e8, 1e4, 1, 0.01]) sets.push([{ ref, ohms }]);
    const probes: Probe[] = [
      ...readings,
      { from: 'VIN', to: 'COM', position: 'volts' },
      { from: 'VIN', to: 'OHM', position: 'ohms' },
      { from: 'N2', to: 'COM', position: 'ohms' },
    ];
    expect(compare(network, probes, sets)).toBeLessThanOrEqual(TOLERANCE);
  });

  it('covers twenty networks', () => {
    expect(new Set(testNetworks.map((one) => one.name)).size).toBe(20);
  });
});
