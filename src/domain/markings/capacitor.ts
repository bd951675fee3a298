import { capacitorExtra, voltCode } from './capacitor-extras';
import type { Decoder, MarkingReading } from './reading';
import { scaled } from './reading';
import { CAPACITOR_LETTERS, capacitorTolerances, letterNote } from './tolerance-letters';

interface Value {
  readonly farads: number;
  readonly letter: string | undefined;
  readonly source: string;
}

const PREFIXES: Readonly<Record<string, number>> = { P: -12, N: -9, U: -6, µ: -6 };

/**
 * Capacitor markings: three digits in picofarads (`104K`), letter codes (`4n7`, `µ47`), values with their
 * unit (`0.1µF`), plain microfarads below one (`.047`) and plain picofarads (`22`), with tolerance letter,
 * dielectric (`X7R`), voltage (`2A104K`, `630V`) and safety class (`X2`) beside them. Source: IEC 60062:2016;
 * dielectric and voltage codes from memory; plain numbers common practice.
 */
export const capacitorCode: Decoder = (text) => {
  const ratings: Record<string, number | string> = {};
  const values: string[] = [];
  for (const word of text.split(' ')) {
    const extra = values.length > 0 || text.includes(' ') ? capacitorExtra(word) : null;
    if (extra) Object.assign(ratings, extra);
    else values.push(word);
  }
  const [word = '', spare] = values;
  if (spare !== undefined) return [];
  const coded = /^([0-3][A-Z])(\d{3}[A-Z]?)$/.exec(word.toUpperCase());
  const volts = voltCode(coded?.[1] ?? '');
  if (coded && volts) Object.assign(ratings, volts);
  const value = readValue(coded && volts ? (coded[2] ?? '') : word);
  return value ? withTolerances(value, ratings) : [];
};

function readValue(word: string): Value | null {
  const upper = word.replaceAll(',', '.').toUpperCase().replaceAll('\u039c', 'µ');
  return threeDigits(upper) ?? withUnit(upper) ?? letterCode(upper) ?? plain(upper);
}

function threeDigits(text: string): Value | null {
  const [, figures = '', power = '', letter] =
    new RegExp(`^([1-9]\\d)([0-689])(${CAPACITOR_LETTERS})?$`).exec(text) ?? [];
  if (figures === '') return null;
  const exponent = power === '9' ? -1 : power === '8' ? -2 : Number(power);
  const note = exponent < 0 ? '; 8 and 9 as hundredths and tenths from memory' : '';
  const source = `IEC 60062:2016, three digits in picofarads${note}`;
  return { farads: scaled(figures, exponent - 12), letter, source };
}

function letterCode(text: string): Value | null {
  const [, whole = '', mark = '', fraction = '', letter] =
    new RegExp(`^(\\d{0,3})([PNUµ])(\\d{0,3})(${CAPACITOR_LETTERS})?$`).exec(text) ?? [];
  const digits = whole + fraction;
  if (digits === '' || digits.length > 4 || Number(digits) === 0) return null;
  const farads = scaled(digits, (PREFIXES[mark] ?? 0) - fraction.length);
  return { farads, letter, source: 'IEC 60062:2016, letter code' };
}

function withUnit(text: string): Value | null {
  const [, number = '', prefix = '', letter] =
    new RegExp(`^(\\d{0,6}\\.?\\d{1,6})(P|N|U|µ|M)F(${CAPACITOR_LETTERS})?$`).exec(text) ?? [];
  if (number === '' || Number(number) === 0) return null;
  // MF on old capacitors is microfarad, as MFD.
  const farads = scaled(number, PREFIXES[prefix] ?? -6);
  return { farads, letter, source: 'Value printed with its unit' };
}

function plain(text: string): Value | null {
  const [, micro, pico, letter] =
    new RegExp(`^(?:(0?\\.\\d{1,5})|([1-9]\\d?))([BCDFGJKM])?$`).exec(text) ?? [];
  if (micro !== undefined && Number(micro) > 0) {
    const source = 'Common practice: a plain decimal below one is in microfarads';
    return { farads: scaled(micro, -6), letter, source };
  }
  if (pico === undefined) return null;
  const source = 'Common practice: one or two plain digits are picofarads';
  return { farads: scaled(pico, -12), letter, source };
}

function withTolerances(value: Value, extra: Record<string, number | string>): MarkingReading[] {
  const letters = value.letter ? capacitorTolerances(value.letter, value.farads) : [null];
  return letters.map((tolerance) => {
    const ratings = { ...extra };
    if (tolerance?.low !== undefined) ratings['toleranceLow'] = tolerance.low;
    if (tolerance?.high !== undefined) ratings['toleranceHigh'] = tolerance.high;
    if (tolerance?.farads !== undefined) ratings['toleranceFarads'] = tolerance.farads;
    const fromMemory = Object.keys(extra).length > 0 ? '; codes beside the value from memory' : '';
    return {
      kind: 'capacitor',
      value: value.farads,
      unit: 'F',
      tolerance: tolerance?.fraction ?? null,
      source: value.source + letterNote(tolerance) + fromMemory,
      ...(Object.keys(ratings).length > 0 ? { ratings } : {}),
    };
  });
}
