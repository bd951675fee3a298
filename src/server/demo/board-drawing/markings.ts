/** What is printed or banded on a part, from its value: the same codes the shop's decoder reads. */
import { COLOURS } from '@/domain/markings/colours';

const named = (fits: (colour: (typeof COLOURS)[string]) => boolean): string =>
  Object.entries(COLOURS).find(([, colour]) => fits(colour))?.[0] ?? 'none';

/** The first `figures` digits of a value and the power of ten they are multiplied by. */
function figuresOf(ohms: number, figures: number): { digits: number[]; power: number } {
  const [mantissa = '', exponent = '0'] = ohms.toExponential(figures - 1).split('e');
  const digits = [...mantissa.replace('.', '')].map(Number);
  return { digits, power: Number(exponent) - figures + 1 };
}

/**
 * Names of the bands of a resistor: two or three figures, multiplier, tolerance (IEC 60062). Three figures from 2 % down.
 */
export function bandsOf(ohms: number, tolerance: number): string[] {
  const { digits, power } = figuresOf(ohms, tolerance <= 0.02 ? 3 : 2);
  return [
    ...digits.map((digit) => named((c) => c.digit === digit)),
    named((c) => c.multiplier === power),
    named((c) => (c.tolerances ?? []).some((t) => t.fraction === tolerance)),
  ].filter((band) => band !== 'none');
}

/** The digits on a surface-mount part: two or three figures and the zeros after them (`4994` is 4.99 MΩ). */
export function digitsOf(ohms: number, figures: 2 | 3): string {
  const { digits, power } = figuresOf(ohms, figures);
  if (power < 0) return String(Number(ohms.toPrecision(figures))).replace('.', 'R');
  return `${digits.join('')}${power}`;
}

/** Paints of the bands. */
export const BAND_PAINTS: Readonly<Record<string, string>> = {
  black: '#1b1a1a',
  brown: '#6e3a1c',
  red: '#c4271f',
  orange: '#dd6a1a',
  yellow: '#e3c02c',
  green: '#2f7d43',
  blue: '#25459c',
  violet: '#6a3a8c',
  grey: '#80807d',
  white: '#ecebe4',
  gold: '#b48a3c',
  silver: '#b3b6b8',
};
