/** A meter's stated accuracy: +-(percent of reading + counts of the last digit). */
export interface Accuracy {
  readonly percent: number;
  readonly counts: number;
}

/** A plain hand-held meter on ohms, assumed when the technician's own is not known (bench assumption). */
export const DEFAULT_ACCURACY: Accuracy = { percent: 0.8, counts: 3 };
export const DEFAULT_DISPLAY_COUNTS = 4000;
/** Where that meter shows OL, in ohms. */
export const DEFAULT_OVER_RANGE_OHMS = 60e6;

/**
 * The weight of the last digit, in the value's unit, of an autoranging meter whose ranges are `counts` x a
 * power of ten: 1600 on a 4000-count meter is shown as 1.600 k, so 1.
 *
 * @throws RangeError when the value is negative or not finite.
 */
export function autorangeResolution(value: number, counts = DEFAULT_DISPLAY_COUNTS): number {
  if (!Number.isFinite(value) || value < 0) {
    throw new RangeError(`${value} given, a finite value of zero or more is needed`);
  }
  const lowest = 0.1;
  if (value < counts * lowest) return lowest;
  return Number(`1e${Math.floor(Math.log10(value / counts)) + 1}`);
}

/** The limit +-a of a reading's error by the stated accuracy, in the reading's unit. */
export function accuracyLimit(value: number, accuracy: Accuracy, resolution: number): number {
  return (Math.abs(value) * accuracy.percent) / 100 + accuracy.counts * resolution;
}

/**
 * The standard uncertainty of a reading, in its unit: no distribution is given with a meter's accuracy, so
 * a rectangular one, a/sqrt(3) (JCGM 100:2008, 4.3.7).
 */
export function accuracyUncertainty(value: number, accuracy: Accuracy, resolution: number): number {
  return accuracyLimit(value, accuracy, resolution) / Math.sqrt(3);
}
