import { circuitAt, netNumbers } from '@/domain/network/circuit';
import type { Prepared } from '@/domain/network/drive';
import { prepare } from '@/domain/network/drive';
import { healthySpread } from '@/domain/network/healthy';
import { ohmmeter } from '@/domain/network/resistance';
import { sensitivities } from '@/domain/network/sensitivity';
import { pairTransfer } from '@/domain/network/transfer';
import type { ForcedPart, Network, Ohms } from '@/domain/network/types';
import { DEFAULT_OVER_RANGE_OHMS } from '@/domain/quantities/accuracy';
import { observe } from './meter';
import type { Prediction, Reading } from './types';

/** Coverage factor of a 95 % band. */
const COVERAGE = 2;
/** Keeps a band relative to nothing finite, Ω. */
const LEAST_SHOWN = 1e-9;

/** What a meter with this range shows for an ideal resistance. */
function shown(ohms: Ohms, overRange: number | undefined): Ohms {
  return ohms === 'OL' || ohms > (overRange ?? DEFAULT_OVER_RANGE_OHMS) ? 'OL' : ohms;
}

/**
 * What the healthy network shows at each reading's points (the values of the readings are not used): Ω or
 * OL, and the half-width of the 95 % band of part tolerances and meter as a fraction.
 * @throws RangeError when a net of a reading is not in the network.
 */
export function predict(network: Network, readings: readonly Reading[]): Prediction[] {
  const spreads = network.parts.map(healthySpread);
  const numbers = netNumbers(network);
  const meter = ohmmeter(network);
  const ready = new Map<string, Prepared>();
  let first: Prepared | undefined;
  return readings.map((reading) => {
    const ohms = shown(meter(reading), reading.overRange);
    if (ohms === 'OL') return { ohms, band: 0 };
    const key = JSON.stringify([reading.position, reading.lifted]);
    const known = ready.get(key);
    const prepared = known ?? prepare(circuitAt(network, reading.position, reading.lifted), first);
    if (known === undefined) ready.set(key, prepared);
    first ??= prepared;
    const pair = pairTransfer(prepared, numbers.get(reading.from)!, numbers.get(reading.to)!);
    let variance = 0;
    sensitivities(prepared.circuit, pair).forEach(
      (share, k) => (variance += (share * spreads[k]!) ** 2),
    );
    const seen = observe({ ...reading, value: ohms });
    const own = seen.variance * ((ohms + seen.floor) / Math.max(ohms, LEAST_SHOWN)) ** 2;
    return { ohms, band: COVERAGE * Math.sqrt(variance + own) };
  });
}

/**
 * What the network shows at each reading's points with some parts at other resistances, Ω or OL by the
 * reading's own range; `Infinity` as over range keeps every finite value.
 * @throws RangeError when a net of a reading is not in the network.
 */
export function predictUnder(
  network: Network,
  faults: readonly ForcedPart[],
  readings: readonly Omit<Reading, 'value'>[],
): Ohms[] {
  const meter = ohmmeter(network, faults);
  return readings.map((reading) => shown(meter(reading), reading.overRange));
}
