import type { Decimal } from './decimal';
import { readDecimal } from './decimal';
import { TYPED_PREFIXES } from './prefixes';

export type ResistanceReading =
  /** `resolution` is the weight of the last typed digit, in ohms. */
  | { ok: true; kind: 'value'; ohms: number; resolution: number }
  /** Over range; `above` is the stated bound in ohms, when one was typed (`>60M`). */
  | { ok: true; kind: 'over-range'; above?: number }
  /** `could` lists unambiguous ways to type what the text may have meant. */
  | { ok: false; reason: string; could?: string[] };

/** Longest text accepted, in characters. */
export const LONGEST_RESISTANCE = 40;
/** No reading of a bench instrument lies beyond these, in ohms. */
export const GREATEST_OHMS = 1e15;
export const LEAST_OHMS = 1e-9;

const PREFIX = Object.keys(TYPED_PREFIXES)
  .sort((a, b) => b.length - a.length)
  .join('|');
const UNIT = '(?:Ω|ohms?|Ohms?|OHMS?)';
const OVER_RANGE = new RegExp(
  `^(?:\\.?[oO0]\\.?[lL]\\.?(?: ?(?:${PREFIX})?${UNIT}?)?|∞ ?(?:(?:${PREFIX})?${UNIT})?)$`,
);
const INFIX = new RegExp(`^(\\d*)(R|r|${PREFIX})(\\d+) ?${UNIT}?$`);
const SUFFIX = new RegExp(
  `^([\\d., ]*[\\d.,])(?:[eE]([+-]?\\d+))? ?(?:(${PREFIX})? ?${UNIT}?|R|r)$`,
);
const EITHER_E = /^(\d+)E(\d+)$/;

/**
 * Reads a resistance as a technician types it or a meter shows it: `1k6 1k6 Ω 1.6k 1,6k 4M7 0R33 R47 470 470R
 * 470Ω 2.2 MΩ 12m 1e6 OL 0L O.L >60M ∞`. Case tells milli (`m`) from mega (`M`).
 *
 * A text with two readings (`1,600`, `1.600.000`, `4E7`) is refused with both. At most 40 characters, 1 nΩ
 * to 1 PΩ, or zero. Never throws; never answers a number that is not finite.
 */
export function parseResistance(text: string): ResistanceReading {
  if (text.length > LONGEST_RESISTANCE) {
    return refuse(`${text.length} characters given, at most ${LONGEST_RESISTANCE} are read`);
  }
  const clean = tidy(text);
  if (clean === '') return refuse('nothing given, a resistance such as 1k6 or OL is needed');
  if (OVER_RANGE.test(clean)) return { ok: true, kind: 'over-range' };
  if (/^[>≥]/.test(clean)) return parseBound(clean.slice(1).trimStart());
  if (/^[<≤]/.test(clean)) {
    return refuse(`"${clean}" given, type what the meter shows (0 when it shows 0)`);
  }
  if (/^[-−–]/.test(clean)) return refuse(`"${clean}" given, a resistance is never negative`);
  return parseValue(clean);
}

/** One kind of space, one ohm sign (U+2126 to U+03A9), one micro sign (U+03BC to U+00B5). */
function tidy(text: string): string {
  return text
    .replace(/\s+/gu, ' ')
    .replaceAll('\u2126', '\u03a9')
    .replaceAll('\u03bc', '\u00b5')
    .replace(/^\+/, '')
    .trim();
}

function parseBound(text: string): ResistanceReading {
  const bound = parseValue(text);
  if (!bound.ok) {
    if (!bound.could) return bound;
    const could = bound.could.map((one) => (one === 'OL' ? one : `>${one}`));
    return { ...bound, reason: ambiguous(`>${text}`, could), could };
  }
  if (bound.kind === 'over-range') return bound;
  if (bound.ohms === 0) return refuse('">0" given, the top of the range is needed, such as >60M');
  return { ok: true, kind: 'over-range', above: bound.ohms };
}

function parseValue(text: string): ResistanceReading {
  const infix = INFIX.exec(text);
  if (infix) {
    const [, whole = '', mark = '', fraction = ''] = infix;
    return toOhms(text, { digits: whole + fraction, exponent: -fraction.length }, mark, 0);
  }
  const either = EITHER_E.exec(text);
  if (either) {
    const [, whole = '', rest = ''] = either;
    return {
      ok: false,
      reason: `"${text}" given: ${whole}R${rest} with E for ohms, or ${whole}e${rest} with E for the power of ten; type one of them`,
      could: [`${whole}R${rest}`, `${whole}e${rest}`],
    };
  }
  const suffix = SUFFIX.exec(text);
  if (!suffix)
    return refuse(`"${text}" given, a resistance such as 1k6, 4M7, 0R33 or OL is needed`);
  const [, number = '', power = '0', prefix = ''] = suffix;
  const decimal = readDecimal(number.trim());
  if (decimal.ok) return toOhms(text, decimal, prefix, Number(power));
  const tail = `${power === '0' ? '' : `e${power}`}${prefix}`;
  if (!decimal.could || tail === '') return decimal;
  const could = decimal.could.map((one) => (one === 'OL' ? one : one + tail));
  return { ...decimal, reason: ambiguous(text, could), could };
}

const ambiguous = (text: string, could: readonly string[]) =>
  `"${text}" given: ${could.join(' or ')}; type one of them`;

function toOhms(text: string, decimal: Decimal, prefix: string, power: number): ResistanceReading {
  const exponent = decimal.exponent + (TYPED_PREFIXES[prefix] ?? 0) + power;
  const ohms = Number(`${decimal.digits}e${exponent}`);
  const resolution = Number(`1e${exponent}`);
  if (!Number.isFinite(ohms) || ohms > GREATEST_OHMS || resolution > GREATEST_OHMS) {
    return refuse(`"${text}" given, no more than 1 PΩ is read; over range is typed OL`);
  }
  if ((ohms !== 0 && ohms < LEAST_OHMS) || resolution < 1e-15) {
    return refuse(`"${text}" given, no less than 1 nΩ is read`);
  }
  return { ok: true, kind: 'value', ohms, resolution };
}

function refuse(reason: string): ResistanceReading {
  return { ok: false, reason };
}
