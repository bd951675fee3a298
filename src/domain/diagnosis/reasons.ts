import { healthyOhms } from '@/domain/network/healthy';
import type { Network, NetworkPart, Ohms } from '@/domain/network/types';
import { defaultTolerance, healthyFloor } from '@/domain/parts/defaults';
import { predict, predictUnder } from './predict';
import type { Leader } from './leaders';
import { observe } from './meter';
import type { DiagnosisInput, PartStanding, Prediction, Reading } from './types';
import { expected, faultNames, list, measured, place, predicted } from './words';

/** Readings quoted for the leading hypothesis. */
const QUOTED = 3;
/** A reading that the hypothesis itself misses by more standard deviations is no witness for it. */
const FITTING = 4;
/** 95 % band left to a fitted prediction by the other parts' tolerances, as a fraction. */
const LEFT_BAND = 0.02;
/** Standard deviations from which a reading speaks against the healthy network. */
const TELLING = 2;

/**
 * Why the answer is what it is, in sentences a technician would accept: the readings that speak for the
 * leading hypothesis with their predictions, what is proven whatever else is wrong, what is cleared, what no
 * reading touches, and what cannot be told apart.
 */
export function reasonsOf(
  input: DiagnosisInput,
  leaders: readonly Leader[],
  parts: readonly PartStanding[],
  groups: readonly (readonly string[])[],
): string[] {
  const { network, readings } = input;
  if (readings.length === 0)
    return ['No reading yet: the odds are those of the part kinds and the incident alone.'];
  const healthy = predict(network, readings);
  const lead = leaders[0]!;
  const said = [
    ...leading(network, readings, lead, healthy),
    ...proven(network, readings),
    ...alikeSentences(groups),
    ...seenSentences(input, lead),
    ...standingSentences(parts),
  ];
  return said;
}

/** How far a reading lies from a prediction, in standard deviations; OL against a value counts as far. */
function distance(reading: Reading, ohms: Ohms, band: number): number {
  if (reading.value === 'OL') return ohms === 'OL' ? 0 : 99;
  if (ohms === 'OL') return 99;
  const seen = observe(reading);
  const deviation = Math.sqrt(seen.variance + (band / 2) ** 2);
  return Math.abs(seen.y - Math.log(ohms + seen.floor)) / deviation;
}

function leading(
  network: Network,
  readings: readonly Reading[],
  lead: Leader,
  healthy: readonly Prediction[],
): string[] {
  const faults = lead.forced;
  const against = readings.map((reading, r) =>
    distance(reading, healthy[r]!.ohms, healthy[r]!.band),
  );
  if (faults.length === 0) {
    const odd = against.filter((far) => far > TELLING).length;
    return odd === 0
      ? ['Every reading fits the healthy network within tolerance: look outside it.']
      : [
          `${odd} of ${readings.length} readings fit the healthy network badly, and no fault explains them better.`,
        ];
  }
  const under = predictUnder(network, faults, readings);
  const names = faultNames(lead.faults);
  const telling = readings
    .map((reading, r) => ({ reading, r, left: distance(reading, under[r]!, LEFT_BAND) }))
    .map((one) => ({ ...one, gain: against[one.r]! - one.left }))
    .filter(({ gain, left }) => gain > TELLING && left < FITTING)
    .sort((a, b) => b.gain - a.gain)
    .slice(0, QUOTED);
  if (telling.length === 0)
    return [
      `${names}: no reading contradicts it, and it is the likeliest failure by kind and incident.`,
    ];
  return telling.map(({ reading, r }) => {
    const shows = predicted(under[r]!);
    return (
      `${place(reading)} reads ${measured(reading)}, a healthy network shows ` +
      `${expected(healthy[r]!)}; with ${names} it shows ${shows}.`
    );
  });
}

/** Rayleigh's monotonicity law: across a part, a reading above its tolerance needs no network to be believed. */
function proven(network: Network, readings: readonly Reading[]): string[] {
  return network.parts.flatMap((part) => {
    const above = readings.find((reading) => isAbove(part, reading, network));
    if (above === undefined) return [];
    return [
      `${part.ref} reads ${measured(above)} across itself, above its ${predicted(healthyOhms(part))} and ` +
        `tolerance: other paths can only lower a reading, so it is open or drifted high.`,
    ];
  });
}

function isAbove(part: NetworkPart, reading: Reading, network: Network): boolean {
  if (healthyFloor(part.kind) !== null || (reading.lifted ?? []).includes(part.ref)) return false;
  const across = [reading.from, reading.to].every((net) => part.nets.includes(net));
  if (!across || reading.from === reading.to) return false;
  const position = reading.position ?? network.positions[0];
  if (part.kind === 'contact' && !(part.closed ?? []).includes(position ?? '')) return false;
  const top = healthyOhms(part) * (1 + (part.tolerance ?? defaultTolerance(part.kind)));
  if (reading.value === 'OL') return top < (reading.overRange ?? 60e6);
  const seen = observe(reading);
  return seen.y - 3 * Math.sqrt(seen.variance) > Math.log(top + seen.floor);
}

function alikeSentences(groups: readonly (readonly string[])[]): string[] {
  return groups.map(
    (group) => `These readings cannot tell ${list(group)} apart: measure between them.`,
  );
}

function seenSentences(input: DiagnosisInput, lead: Leader): string[] {
  return lead.forced.flatMap(({ ref, mode }) => {
    const times = (input.seen ?? [])
      .filter((one) => one.ref === ref && one.mode === mode)
      .reduce((sum, one) => sum + one.times, 0);
    if (times === 0 || mode === undefined) return [];
    return [
      `${faultNames([{ ref, mode }])}: seen ${times === 1 ? 'once' : `${times} times`} on this board.`,
    ];
  });
}

function standingSentences(parts: readonly PartStanding[]): string[] {
  const named = (standing: string): string[] =>
    parts.filter((part) => part.standing === standing).map((part) => part.ref);
  const [cleared, untouched] = [named('cleared'), named('untouched')];
  return [
    ...(cleared.length > 0 ? [`Cleared by the readings: ${list(cleared)}.`] : []),
    ...(untouched.length > 0 ? [`No reading tells of ${list(untouched)} yet.`] : []),
  ];
}
