import type { PartKind } from '../parts/kinds';

export type MarkingUnit = 'Ω' | 'F' | 'H' | 'V' | 'V rms' | 'A';

/** One thing that a printed marking may mean. */
export interface MarkingReading {
  /** The kind of part that the marking would belong to. */
  readonly kind: PartKind;
  /** In the SI unit named by `unit`: a MOV's is its voltage at 1 mA DC, a fuse's its rated current. */
  readonly value: number;
  readonly unit: MarkingUnit;
  /**
   * As a fraction (0.05 is +-5 %); `null` when none is marked, or when it is not symmetric: then
   * `ratings.toleranceLow` and `ratings.toleranceHigh` hold both ends (-0.2 and 0.8).
   */
  readonly tolerance: number | null;
  /** The standard or practice that says so; "from memory" and "common practice" where that is all. */
  readonly source: string;
  /** What else the marking says. Volts, amps, joules, watts and millimetres, as the name tells. */
  readonly ratings?: Readonly<Record<string, number | string>>;
}

/** A decoder answers every reading it sees in a tidied text, and none when it sees nothing. */
export type Decoder = (text: string) => MarkingReading[];

/** `digits x 10^exponent`, rounded once. */
export function scaled(digits: string, exponent: number): number {
  return Number(`${digits}e${exponent}`);
}

/** Two significant digits and the number of zeros after them: `473` is 47 x 10^3; `null` for a leading zero. */
export function threeDigits(code: string, exponent = 0): number | null {
  const match = /^([1-9]\d)(\d)$/.exec(code);
  return match ? scaled(match[1] ?? '', Number(match[2]) + exponent) : null;
}
