import {
  autorangeResolution,
  DEFAULT_ACCURACY,
  DEFAULT_OVER_RANGE_OHMS,
} from '@/domain/quantities/accuracy';
import { LEAD_OHMS, MISPROBE, MISPROBE_DENSITY, MISPROBE_OL } from './assumptions';
import type { Reading } from './types';

/**
 * A reading as the likelihood takes it. Values are compared as ln(R + floor): a logarithm at any usual
 * resistance, and linear where counts and leads are all that shows.
 */
export interface Observation {
  readonly over: boolean;
  /** ln(value + floor); for OL ln(over range + floor). */
  readonly y: number;
  /** Ω */
  readonly floor: number;
  /** Variance of y by the meter alone (accuracy, resolution, leads). */
  readonly variance: number;
  /** Weight of a misprobe showing this: chance times density of y, or times the chance of OL. */
  readonly misprobe: number;
}

/**
 * Standard uncertainty from the accuracy limit as a rectangular distribution, a/√3, half a count of
 * resolution either side, r/√12 (JCGM 100:2008, 4.3.7), and the leads.
 */
export function observe(reading: Reading): Observation {
  const accuracy = reading.accuracy ?? DEFAULT_ACCURACY;
  const overRange = reading.overRange ?? DEFAULT_OVER_RANGE_OHMS;
  const over = reading.value === 'OL';
  const value = reading.value === 'OL' ? overRange : reading.value;
  const resolution = over ? value / 4000 : (reading.resolution ?? autorangeResolution(value));
  // A value noted with fewer digits than the meter shows is rounded; the meter's counts are not coarser for it.
  const digit =
    reading.accuracy === undefined ? Math.min(resolution, autorangeResolution(value)) : resolution;
  const leads = Math.min(LEAD_OHMS, 2 * digit);
  const floor = accuracy.counts * digit + resolution + leads;
  const limit = (accuracy.percent / 100) * value + accuracy.counts * digit;
  const squared = (limit * limit + leads * leads) / 3 + (resolution * resolution) / 12;
  return {
    over,
    y: Math.log(value + floor),
    floor,
    variance: squared / (value + floor) ** 2,
    misprobe: MISPROBE * (over ? MISPROBE_OL : MISPROBE_DENSITY),
  };
}
