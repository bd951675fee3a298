import type { Decoder } from './reading';
import { scaled } from './reading';

const TOLERANCES: Readonly<Record<string, number>> = { A: 0.01, B: 0.02, C: 0.05, D: 0.1 };

/**
 * Zener voltages with V in the place of the decimal point: `5V6` is 5.6 V, `C5V6` the same at +-5 %.
 * Common practice; the tolerance letters (Pro Electron) from memory.
 */
export const zenerCode: Decoder = (text) => {
  const match = /^([A-D])?(\d{1,3})V(\d{1,2})$/.exec(text.toUpperCase());
  const [, letter, whole = '', fraction = ''] = match ?? [];
  const value = scaled(whole + fraction, -fraction.length);
  if (!match || value === 0) return [];
  return [
    {
      kind: 'zener',
      value,
      unit: 'V',
      tolerance: letter ? (TOLERANCES[letter] ?? null) : null,
      source: `Common practice: V as the decimal point${letter ? '; tolerance letter (Pro Electron) from memory' : ''}`,
    },
  ];
};
