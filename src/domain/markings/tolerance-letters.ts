/** Tolerance letters of IEC 60062, and what each says on a resistor and on a capacitor. */

export interface Tolerance {
  /** Symmetric tolerance as a fraction, or `null`: then `low` and `high` hold. */
  readonly fraction: number | null;
  readonly low?: number;
  readonly high?: number;
  /** Absolute tolerance in farads, for capacitors under 10 pF. */
  readonly farads?: number;
  /** Not read in a copy of the standard. */
  readonly fromMemory?: boolean;
}

const SYMMETRIC: Readonly<Record<string, Tolerance>> = {
  B: { fraction: 0.001 },
  C: { fraction: 0.0025 },
  D: { fraction: 0.005 },
  F: { fraction: 0.01 },
  G: { fraction: 0.02 },
  H: { fraction: 0.03 },
  J: { fraction: 0.05 },
  K: { fraction: 0.1 },
  M: { fraction: 0.2 },
  N: { fraction: 0.3 },
  E: { fraction: 0.00005, fromMemory: true },
  L: { fraction: 0.0001, fromMemory: true },
  P: { fraction: 0.0002, fromMemory: true },
  W: { fraction: 0.0005, fromMemory: true },
};

const ASYMMETRIC: Readonly<Record<string, Tolerance>> = {
  P: { fraction: null, low: 0, high: 1 },
  S: { fraction: null, low: -0.2, high: 0.5 },
  T: { fraction: null, low: -0.1, high: 0.5 },
  Z: { fraction: null, low: -0.2, high: 0.8 },
};

const PICOFARADS: Readonly<Record<string, Tolerance>> = {
  B: { fraction: null, farads: 0.1e-12 },
  C: { fraction: null, farads: 0.25e-12 },
  D: { fraction: null, farads: 0.5e-12 },
  F: { fraction: null, farads: 1e-12, fromMemory: true },
  G: { fraction: null, farads: 2e-12, fromMemory: true },
};

/** The letters used on resistors, as a regular-expression class. */
export const RESISTOR_LETTERS = '[BCDEFGHJKLMNPW]';
/** The letters used on capacitors. */
export const CAPACITOR_LETTERS = '[BCDFGHJKMNPSTZ]';

/** What a letter says on a resistor, inductor or thermistor; `null` for a letter that says nothing there. */
export function resistorTolerance(letter: string): Tolerance | null {
  return SYMMETRIC[letter] ?? null;
}

/**
 * What a letter may say on a capacitor of this value in farads. Under 10 pF the letters B C D F G are
 * absolute, above it relative; at exactly 10 pF both are in use.
 */
export function capacitorTolerances(letter: string, farads: number): Tolerance[] {
  const asymmetric = ASYMMETRIC[letter];
  if (asymmetric) return [asymmetric];
  const absolute = PICOFARADS[letter];
  const relative = SYMMETRIC[letter];
  const answers: Tolerance[] = [];
  if (absolute?.farads !== undefined && absolute.farads < farads && farads < 10.001e-12) {
    answers.push({ ...absolute, fraction: absolute.farads / farads });
  }
  if (relative && (farads > 9.999e-12 || !absolute)) answers.push(relative);
  return answers;
}

/** The clause to add to a source when the letter's meaning is from memory. */
export function letterNote(tolerance: Tolerance | null): string {
  return tolerance?.fromMemory ? '; tolerance letter from memory' : '';
}
