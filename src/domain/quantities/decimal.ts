/** A number as it was typed: `digits x 10^exponent`, the exponent being the weight of the last digit. */
export interface Decimal {
  readonly digits: string;
  readonly exponent: number;
}

export type DecimalReading =
  | ({ ok: true } & Decimal)
  /** `could` lists unambiguous ways to type the readings the text may have had. */
  | { ok: false; reason: string; could?: [string, string] };

const GROUPED = /^\d{1,3}(?: \d{3})+$/;

/**
 * Reads digits with at most one decimal mark, point or comma, and groups of three set off by spaces or by
 * the other mark. A comma before exactly three digits, or one mark used twice, has two readings and is
 * refused with both. `text` holds digits, marks and spaces only; anything else is refused.
 */
export function readDecimal(text: string): DecimalReading {
  if (!/^[\d., ]+$/.test(text) || !/\d/.test(text)) return unreadable(text);
  if (text.includes(' ')) {
    const [whole = '', ...rest] = text.split(/(?=[.,])/);
    if (!GROUPED.test(whole) || rest.some((part) => part.includes(' '))) return unreadable(text);
    return readDecimal(text.replaceAll(' ', ''));
  }
  const marks = [...text].filter((c) => c === '.' || c === ',');
  if (marks.length === 0) return { ok: true, digits: text, exponent: 0 };
  const last = Math.max(text.lastIndexOf('.'), text.lastIndexOf(','));
  const whole = text.slice(0, last);
  const fraction = text.slice(last + 1);
  if (marks.length === 1) return readOneMark(text, whole, fraction);
  if (!/^\d{1,3}([.,])\d{3}(?:\1\d{3})*$/.test(whole)) return unreadable(text);
  const plain = whole.replace(/[.,]/g, '');
  if (whole.includes(text[last] ?? '')) {
    if (fraction.length !== 3) return unreadable(text);
    return twoReadings(text, `${plain}.${fraction}`, plain + fraction);
  }
  return { ok: true, digits: plain + fraction, exponent: -fraction.length };
}

function readOneMark(text: string, whole: string, fraction: string): DecimalReading {
  if (text === '1.') {
    return {
      ok: false,
      reason: '"1." given: 1, or over range on a meter that shows it as a lone 1; type which',
      could: ['1', 'OL'],
    };
  }
  const mayGroup = text.includes(',') && fraction.length === 3 && /^[1-9]\d{0,2}$/.test(whole);
  if (mayGroup) return twoReadings(text, `${whole}.${fraction}`, whole + fraction);
  return { ok: true, digits: whole + fraction, exponent: -fraction.length };
}

function twoReadings(text: string, first: string, second: string): DecimalReading {
  return {
    ok: false,
    reason: `"${text}" given: ${first} or ${second}; type one of them`,
    could: [first, second],
  };
}

function unreadable(text: string): DecimalReading {
  return { ok: false, reason: `"${text}" given, a number such as 1600, 1.6 or 1k6 is needed` };
}
