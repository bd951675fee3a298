import type { Mode } from './kinds';

/** A span of resistance in ohms, both ends included, `0 < low < high`. */
export interface OhmsRange {
  readonly low: number;
  readonly high: number;
}

/** An open part still reads the board's surface: the range ends here, in ohms (bench assumption). */
export const OPEN_CEILING_OHMS = 1e10;
export const OPEN_FLOOR_OHMS = 1e8;
/** A drift of a part with a wide tolerance begins here, as a fraction; no meter tells one below the other. */
const DRIFT = 0.2;
const CLOSEST = 0.001;

/**
 * The resistances that a part in this mode can show, in ohms, given its healthy value.
 *
 * Open from 100 Mohm, short 0.01 to 10 ohm, leaky 1 kohm to 10 Mohm, drifted high x1.2 to x30, drifted low
 * the same downwards (bench assumptions). A part of closer tolerance is drifted as soon as it leaves it: a
 * 1 % divider resistor that is 5 % high spoils every range. Where the healthy value itself reaches into a range, the range
 * gives way: a short of a 0.1 ohm fuse lies below half of it, a leak of a 20 kohm part below half of it, an
 * open 1 Gohm part above ten times it.
 *
 * @param nominalOhms the healthy value, or the healthy floor of a part that has none.
 * @param tolerance of the healthy value, as a fraction.
 * @throws RangeError when the healthy value is not a positive finite number.
 */
export function modeRange(mode: Mode, nominalOhms: number, tolerance = Infinity): OhmsRange {
  if (!Number.isFinite(nominalOhms) || nominalOhms <= 0) {
    throw new RangeError(`nominal ${nominalOhms} given, a positive number of ohms is needed`);
  }
  switch (mode) {
    case 'open': {
      const low = Math.max(OPEN_FLOOR_OHMS, nominalOhms * 10);
      return { low, high: Math.max(OPEN_CEILING_OHMS, low * 100) };
    }
    case 'short':
      return below(0.01, 10, nominalOhms);
    case 'leaky':
      return below(1e3, 1e7, nominalOhms);
    case 'drifted-high':
      return { low: nominalOhms * leastDrift(tolerance), high: nominalOhms * 30 };
    case 'drifted-low':
      return { low: nominalOhms / 30, high: nominalOhms / leastDrift(tolerance) };
  }
}

/** The factor from which a part has drifted. */
function leastDrift(tolerance: number): number {
  return 1 + Math.min(DRIFT, Math.max(CLOSEST, tolerance));
}

/** The range, its top held to half the healthy value and its bottom to a hundredth of that top. */
function below(low: number, high: number, nominalOhms: number): OhmsRange {
  const top = Math.min(high, nominalOhms / 2);
  return { low: Math.min(low, top / 100), high: top };
}
