import { circuitAt, netNumbers } from '@/domain/network/circuit';
import { prepare } from '@/domain/network/drive';
import { healthySpread } from '@/domain/network/healthy';
import { resistanceBetween } from '@/domain/network/resistance';
import { sensitivities } from '@/domain/network/sensitivity';
import { pairTransfer } from '@/domain/network/transfer';
import type { ForcedPart, Network, Ohms } from '@/domain/network/types';
import { DEFAULT_OVER_RANGE_OHMS } from '@/domain/quantities/accuracy';
import { observe } from './meter';
import type { Prediction, Reading } from './types';

/** Coverage factor of a 95 % band. */
const COVERAGE = 2;

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
  return readings.map((reading) => {
    const ohms = shown(resistanceBetween(network, reading), reading.overRange);
    if (ohms === 'OL') return { ohms, band: 0 };
    const circuit = circuitAt(network, reading.position, reading.lifted);
    const numbers = netNumbers(network);
    const pair = pairTransfer(
      prepare(circuit),
      numbers.get(reading.from)!,
      numbers.get(reading.to)!,
    );
    let variance = 0;
    sensitivities(circuit, pair).forEach((share, k) => (variance += (share * spreads[k]!) ** 2));
    const meter = observe({ ...reading, value: ohms });
    const meterVariance = meter.variance * ((ohms + meter.floor) / Math.max(ohms, 1e-9)) ** 2;
    return { ohms, band: COVERAGE * Math.sqrt(variance + meterVariance) };
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
  return readings.map((reading) =>
    shown(resistanceBetween(network, reading, faults), reading.overRange),
  );
}
