/**
 * Where things stand on a printed scale. Everything is in per cent of the drawing's width, 0 at its left edge, so a
 * scale stretches without its strokes or print changing. Pure; the React widgets only draw what this says.
 */

/** The part of the drawing between the end stops, in per cent of its width. */
export interface Span {
  readonly from: number;
  readonly to: number;
}

export const FULL: Span = { from: 2, to: 98 };

/** A reading's scale stops short of the right edge: OL stands beyond the end stop. */
export const OHMS: Span = { from: 2, to: 88 };
export const OL_AT = 96;

export interface Graduation {
  readonly at: number;
  /** 0 the numbered ones, 1 the halves, 2 the rest. */
  readonly rank: 0 | 1 | 2;
}

/** Two decimals are finer than a tenth of a pixel on any screen, and keep the markup short. */
const round = (percent: number) => Math.round(percent * 100) / 100;

const between = (share: number, { from, to }: Span) => round(from + share * (to - from));

const clamp = (share: number) => Math.min(1, Math.max(0, share));

/**
 * The place of `value` on a linear scale from `min` to `max`; values outside stand at the end stop.
 *
 * @throws RangeError when a number is not finite or the scale has no length.
 */
export function placeLinear(value: number, min: number, max: number, span: Span = FULL): number {
  if (![value, min, max].every(Number.isFinite) || min >= max) {
    throw new RangeError(
      `Scale given ${value} on ${min} to ${max}; finite, rising limits are needed.`,
    );
  }
  return between(clamp((value - min) / (max - min)), span);
}

/**
 * The place of `ohms` on a logarithmic scale; 0 Ω and whatever is below `min` stand at the left end stop.
 *
 * @throws RangeError when `ohms` is negative or not finite, or the limits are not positive and rising.
 */
export function placeLog(ohms: number, min: number, max: number, span: Span = OHMS): number {
  if (!Number.isFinite(ohms) || ohms < 0 || !Number.isFinite(max) || !(min > 0 && min < max)) {
    throw new RangeError(
      `Scale given ${ohms} Ω on ${min} to ${max} Ω; positive, rising limits are needed.`,
    );
  }
  return between(clamp(Math.log(Math.max(ohms, min) / min) / Math.log(max / min)), span);
}

/** `parts` equal steps; every `major`-th from the first is long, the ones halfway between are middling. */
export function linearGraduations(parts: number, major: number, span: Span = FULL): Graduation[] {
  return Array.from({ length: parts + 1 }, (_, i) => ({
    at: between(i / parts, span),
    rank: i % major === 0 ? 0 : (i * 2) % major === 0 ? 1 : 2,
  }));
}

/** Decades long, fives middling, twos short; `max` and `min` in Ω, decades of ten. */
export function logGraduations(min: number, max: number, span: Span = OHMS): Graduation[] {
  const first = Math.floor(Math.log10(min));
  const last = Math.ceil(Math.log10(max));
  const marks = [
    { digit: 1, rank: 0 },
    { digit: 2, rank: 2 },
    { digit: 5, rank: 1 },
  ] as const;
  return Array.from({ length: last - first + 1 }, (_, i) => first + i)
    .flatMap((decade) => marks.map(({ digit, rank }) => ({ ohms: digit * 10 ** decade, rank })))
    .filter(({ ohms }) => ohms >= min * (1 - 1e-9) && ohms <= max * (1 + 1e-9))
    .map(({ ohms, rank }) => ({ at: placeLog(ohms, min, max, span), rank }));
}

export interface ReadingPlan {
  readonly needle: number;
  readonly predicted: number | null;
  /** Where the tolerance band lies, null when nothing is expected. */
  readonly band: Span | null;
  /** How the reading lies to its band; `unknown` without one. */
  readonly verdict: 'fits' | 'above' | 'below' | 'unknown';
}

/**
 * A reading against what the healthy network would give.
 *
 * @param measured Ω, or `OL` for over range.
 * @param expected predicted value and the limits of what still fits, Ω; a limit may be `OL`, and so may the prediction.
 */
export function planReading(
  measured: number | 'OL',
  expected: {
    predicted?: number | 'OL' | undefined;
    low?: number | undefined;
    high?: number | 'OL' | undefined;
  },
  min: number,
  max: number,
): ReadingPlan {
  const place = (ohms: number | 'OL') => (ohms === 'OL' ? OL_AT : placeLog(ohms, min, max));
  const needle = place(measured);
  const predicted = expected.predicted === undefined ? null : place(expected.predicted);
  const { low } = expected;
  const high = expected.high ?? (expected.predicted === 'OL' ? 'OL' : undefined);
  if (low === undefined && high === undefined) {
    return { needle, predicted, band: null, verdict: 'unknown' };
  }
  const floor = low ?? (high === 'OL' ? max : 0);
  const top = high ?? 'OL';
  const size = (ohms: number | 'OL') => (ohms === 'OL' ? Infinity : ohms);
  return {
    needle,
    predicted,
    band: { from: place(floor), to: place(top) },
    verdict: size(measured) < floor ? 'below' : size(measured) > size(top) ? 'above' : 'fits',
  };
}

export interface AccuracyPlan {
  readonly needle: number;
  readonly zero: number;
  /** From lower to upper limit. */
  readonly limits: Span;
  /** The limits drawn in by the guard band on either side; empty (from = to) when the guard eats them up. */
  readonly accepted: Span;
  /** Error ± uncertainty. */
  readonly sector: Span;
  /** True when the error lies beyond what the scale can show, so the needle stands at its stop. */
  readonly beyond: boolean;
}

/** How far past the limits an accuracy scale reaches. */
export const ACCURACY_REACH = 1.6;

/**
 * An error against its limits ±`limit`, with guard bands `guard` (ILAC-G8:09/2019: acceptance limit = limit − guard)
 * and expanded uncertainty; all four in the same unit.
 *
 * @throws RangeError when the limit is not positive, or a width is negative.
 */
export function planAccuracy(
  error: number,
  limit: number,
  guard = 0,
  uncertainty = 0,
): AccuracyPlan {
  if (!(limit > 0) || !(guard >= 0) || !(uncertainty >= 0)) {
    throw new RangeError(
      `Limit ${limit}, guard ${guard}, uncertainty ${uncertainty}; a positive limit is needed.`,
    );
  }
  const end = limit * ACCURACY_REACH;
  const place = (value: number) => placeLinear(value, -end, end);
  const accepted = Math.max(0, limit - guard);
  return {
    needle: place(error),
    zero: place(0),
    limits: { from: place(-limit), to: place(limit) },
    accepted: { from: place(-accepted), to: place(accepted) },
    sector: { from: place(error - uncertainty), to: place(error + uncertainty) },
    beyond: Math.abs(error) > end,
  };
}

/**
 * Deflection of a moving-coil ohmmeter, 0 (open leads) to 1 (leads shorted): `mid / (mid + ohms)`, `mid` being the
 * reading at half scale, which equals the meter's own resistance (common practice of the trade).
 */
export function ohmmeterDeflection(ohms: number, mid: number): number {
  return mid / (mid + ohms);
}

/** Half the sweep of a moving-coil needle, degrees either side of upright. */
const SWEEP = 48;

/** A point of a meter's face, `radius` from the pivot at (0, 0), y down; deflection 0 at the left, 1 at the right. */
export function dialPoint(deflection: number, radius: number): { x: number; y: number } {
  const angle = ((deflection - 0.5) * 2 * SWEEP * Math.PI) / 180;
  return { x: round(radius * Math.sin(angle)), y: round(-radius * Math.cos(angle)) };
}
