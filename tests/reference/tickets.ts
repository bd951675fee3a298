import { conductsAt, faultActs } from '@/domain/network/circuit';
import { healthyOhms, healthySpread } from '@/domain/network/healthy';
import type { ForcedPart, Network, Ohms, Probe } from '@/domain/network/types';
import { autorangeResolution } from '@/domain/quantities/accuracy';
import type { Incident } from '@/domain/parts/kinds';
import { partModes } from '@/domain/diagnosis/modes';
import { predictUnder } from '@/domain/diagnosis/predict';
import { priorsOf } from '@/domain/diagnosis/priors';
import type { Reading } from '@/domain/diagnosis/types';
import { logUniform, normal } from './seeded';

/** A simulated instrument on the bench: what failed, and what the meter showed. */
export interface SimulatedTicket {
  readonly network: Network;
  readonly incident: Incident;
  /** Empty for a healthy one. */
  readonly faults: readonly ForcedPart[];
  readonly readings: readonly Reading[];
}

/** What is wrong, drawn from the priors of the diagnosis: so many faults, or any number the priors give. */
export function drawFaults(
  random: () => number,
  network: Network,
  incident: Incident,
  count?: number,
): ForcedPart[] {
  const modes = partModes(network);
  const priors = priorsOf(network, modes, incident);
  const hypotheses: { modes: number[]; odds: number }[] = [];
  if (count === undefined || count === 0) hypotheses.push({ modes: [], odds: priors.healthy });
  modes.forEach((one, j) => {
    if (count === undefined || count === 1) hypotheses.push({ modes: [j], odds: priors.odds[j]! });
    if (count !== undefined && count !== 2) return;
    modes.slice(0, j).forEach((other, k) => {
      if (one.part === other.part) return;
      const shared = priors.shared[one.part * network.parts.length + other.part]!;
      hypotheses.push({ modes: [j, k], odds: priors.odds[j]! * priors.odds[k]! * shared });
    });
  });
  let left = random() * hypotheses.reduce((sum, h) => sum + h.odds, 0);
  const drawn = hypotheses.find((h) => (left -= h.odds) < 0) ?? hypotheses.at(-1)!;
  return drawn.modes.map((m) => {
    const { part, mode, low, high } = modes[m]!;
    const ohms = logUniform(random, Math.exp(low), Math.exp(high));
    return { ref: network.parts[part]!.ref, mode, ohms };
  });
}

/** A real specimen of the network: every part at a value inside its tolerance. */
export function specimen(random: () => number, network: Network): ForcedPart[] {
  return network.parts.map((part) => {
    const spread = healthySpread(part);
    const wide = spread > 0.5;
    const away = wide ? spread * normal(random) : Math.sqrt(3) * spread * (2 * random() - 1);
    return { ref: part.ref, ohms: healthyOhms(part) * Math.exp(away) };
  });
}

/** What a meter of ±(0.8 % + 3 counts), 4000 counts, shows of a true resistance. */
export function meterShows(random: () => number, ohms: Ohms): Ohms {
  if (ohms === 'OL') return 'OL';
  const resolution = autorangeResolution(ohms);
  const limit = 0.008 * ohms + 3 * resolution;
  const shown = Math.max(0, ohms + limit * (2 * random() - 1));
  if (shown > 60e6) return 'OL';
  return Number((Math.round(shown / resolution) * resolution).toPrecision(6));
}

/** Takes the readings of an instrument with these faults: tolerances, meter errors and rounding drawn. */
export function takeReadings(
  random: () => number,
  network: Network,
  faults: readonly ForcedPart[],
  probes: readonly Probe[],
): Reading[] {
  const real = specimen(random, network);
  const refs = new Set(faults.map((fault) => fault.ref));
  return probes.map((probe) => {
    const position = probe.position ?? network.positions[0];
    // A fault that does not act here (a worn contact that is open) leaves the specimen's own value.
    const acting = faults.filter(({ ref, mode }) => {
      const part = network.parts.find((one) => one.ref === ref)!;
      return faultActs(part, conductsAt(part, position), mode);
    });
    const names = new Set(acting.map((fault) => fault.ref));
    const sound = real.filter((part) => !names.has(part.ref) || !refs.has(part.ref));
    const [ohms] = predictUnder(network, [...sound, ...acting], [{ ...probe, overRange: 1e18 }]);
    return { ...probe, value: meterShows(random, ohms!) };
  });
}
