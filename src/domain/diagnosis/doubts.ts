import type { Network } from '@/domain/network/types';
import type { Leader } from './leaders';
import { predictUnder } from './predict';
import type { DoubtfulReading, Reading } from './types';
import { faultNames, measured, place, predicted } from './words';

/** A reading is doubtful when it is a misprobe with more than this chance, over the leading hypotheses. */
const DOUBTFUL = 0.5;

/** Readings that no likely hypothesis explains beside the others: worth measuring again. */
export function doubtsOf(
  network: Network,
  readings: readonly Reading[],
  leaders: readonly Leader[],
): DoubtfulReading[] {
  const weight = leaders.reduce((sum, leader) => sum + leader.probability, 0);
  return readings.flatMap((reading, index) => {
    const doubt = leaders.reduce((sum, l) => sum + l.probability * l.doubt[index]!, 0);
    if (weight === 0 || doubt / weight <= DOUBTFUL) return [];
    const best = leaders.find((leader) => leader.doubt[index]! > DOUBTFUL) ?? leaders[0]!;
    const [shown] = predictUnder(network, best.forced, [reading]);
    const again = `Measure ${place(reading)} again: ${measured(reading)}`;
    const make = `it ${predicted(shown!)}`;
    const reason =
      readings.length > 1
        ? `${again} fits no likely fault beside the other readings, which make ${make}.`
        : `${again} fits no likely fault; ${best.faults.length > 0 ? faultNames(best.faults) : 'a healthy network'} would make ${make}.`;
    return [{ reading: index, reason }];
  });
}
