/** Money as people type it, and the greatest sum that is kept. */

/** The greatest sum, in minor units: 99,999.99. */
export const MOST_MINOR = 9_999_999;

/**
 * A sum in minor units (two decimals) from text such as `72.48`, `72,48`, `72` or `€ 72.48`; null when it is not
 * a plain sum. Group separators are refused, since `1,234` could be two sums. The greatest is 99,999.99.
 */
export function parseMoney(text: string): number | null {
  const match = /^[€£$]?\s*(\d{1,5})(?:[.,](\d{2}))?$/.exec(text.trim());
  if (!match) return null;
  return Number(match[1]) * 100 + Number(match[2] ?? 0);
}

/** A sum as digits alone, two decimals: `72.48` of 7248 minor units. */
export const writeMoney = (minor: number): string => (minor / 100).toFixed(2);
