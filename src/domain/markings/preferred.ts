/** The E series of IEC 60063 and the preferred values nearest to any value. */

export const E_SERIES = [3, 6, 12, 24, 48, 96, 192] as const;
export type ESeries = (typeof E_SERIES)[number];

// E24 does not follow the formula (27 to 47, and 82); IEC 60063 lists it.
const E24 = [
  10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30, 33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91,
];

/** `round(100 x 10^(i/n))`, which gives E48, E96 and E192 but for 920 in E192 (the formula gives 919). */
function byFormula(count: number): number[] {
  const values = Array.from({ length: count }, (_, i) => Math.round(100 * 10 ** (i / count)));
  return values.map((value) => (value === 919 ? 920 : value));
}

/**
 * The significant figures of a series within one decade: two-digit up to E24 (10 to 91), three-digit from
 * E48 on (100 to 988). Source: IEC 60063.
 */
export function seriesValues(series: ESeries): number[] {
  if (series <= 24) return E24.filter((_, i) => i % (24 / series) === 0);
  return byFormula(series);
}

export interface PreferredValues {
  readonly below: number;
  readonly above: number;
  /** The one whose ratio to the value is nearer to 1. */
  readonly nearest: number;
}

/**
 * The preferred values on either side of a value, in its unit; all three are equal when it is one of them.
 *
 * @throws RangeError unless the value is finite and between 1e-15 and 1e15.
 */
export function nearestPreferred(value: number, series: ESeries): PreferredValues {
  if (!Number.isFinite(value) || value < 1e-15 || value > 1e15) {
    throw new RangeError(`${value} given, a value between 1e-15 and 1e15 is needed`);
  }
  const figures = seriesValues(series);
  const width = series <= 24 ? 1 : 2;
  const decade = Number(value.toExponential().split('e')[1]) - width;
  const candidates = [decade - 1, decade, decade + 1].flatMap((power) =>
    figures.map((figure) => Number(`${figure}e${power}`)),
  );
  const same = candidates.find((one) => Math.abs(one / value - 1) < 1e-9);
  if (same !== undefined) return { below: same, above: same, nearest: same };
  const below = Math.max(...candidates.filter((one) => one < value));
  const above = Math.min(...candidates.filter((one) => one > value));
  return { below, above, nearest: value / below <= above / value ? below : above };
}

/** Whether the value is in the series, within rounding. @throws RangeError as {@link nearestPreferred}. */
export function isPreferred(value: number, series: ESeries): boolean {
  const { below, above } = nearestPreferred(value, series);
  return below === above;
}
