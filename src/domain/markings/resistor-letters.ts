import type { PartKind } from '../parts/kinds';
import type { Decoder, MarkingReading } from './reading';
import { scaled } from './reading';
import { RESISTOR_LETTERS, letterNote, resistorTolerance } from './tolerance-letters';

const MULTIPLIERS: Readonly<Record<string, number>> = { R: 0, K: 3, M: 6, G: 9, T: 12 };

const LETTER_CODE = new RegExp(`^(\\d{0,3})([RKMGT])(\\d{0,3})(${RESISTOR_LETTERS})?$`);
const MILLI_CODE = /^(\d{0,3})([mL])(\d{0,3})$/;
const PLAIN = new RegExp(
  `^(\\d+(?:\\.\\d+)?|\\.\\d+) ?([kKM]?)(?:Ω|OHMS?) ?(${RESISTOR_LETTERS})?$`,
  'i',
);

/**
 * Letter codes with the letter in the place of the decimal point (`R47`, `4K7`, `47K3`, `4M7J`), and values
 * printed with their unit (`0.22Ω J`). Source: IEC 60062:2016. `m` or `L` for milliohms on current shunts is
 * common practice.
 */
export function letterCode(kind: PartKind): Decoder {
  return (text) => [...byLetter(kind, text), ...byMilli(kind, text), ...byUnit(kind, text)];
}

function byLetter(kind: PartKind, text: string): MarkingReading[] {
  const match = LETTER_CODE.exec(text.replace(/[rk]/g, (c) => c.toUpperCase()));
  const [, whole = '', mark = '', fraction = '', letter] = match ?? [];
  const digits = whole + fraction;
  if (!match || digits === '' || digits.length > 4) return [];
  const value = scaled(digits, (MULTIPLIERS[mark] ?? 0) - fraction.length);
  return [reading(kind, value, letter, 'IEC 60062:2016, letter code')];
}

function byMilli(kind: PartKind, text: string): MarkingReading[] {
  const match = MILLI_CODE.exec(text);
  const [, whole = '', , fraction = ''] = match ?? [];
  const digits = whole + fraction;
  if (!match || digits === '' || digits.length > 4 || Number(digits) === 0) return [];
  const source = 'Common practice: m or L as the decimal point of milliohms';
  return [reading(kind, scaled(digits, -3 - fraction.length), undefined, source)];
}

function byUnit(kind: PartKind, text: string): MarkingReading[] {
  const match = PLAIN.exec(text.replace(',', '.'));
  if (!match) return [];
  const [, number = '', prefix = '', letter] = match;
  const value = scaled(number, prefix === '' ? 0 : prefix === 'M' ? 6 : 3);
  return [reading(kind, value, letter?.toUpperCase(), 'Value printed with its unit')];
}

function reading(
  kind: PartKind,
  value: number,
  letter: string | undefined,
  source: string,
): MarkingReading {
  const tolerance = letter ? resistorTolerance(letter) : null;
  return {
    kind,
    value,
    unit: 'Ω',
    tolerance: tolerance?.fraction ?? null,
    source: source + letterNote(tolerance),
  };
}
