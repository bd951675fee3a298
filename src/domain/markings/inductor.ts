import type { Decoder } from './reading';
import { scaled, threeDigits } from './reading';
import { RESISTOR_LETTERS, letterNote, resistorTolerance } from './tolerance-letters';

const CODE = new RegExp(`^(?:(\\d{3})|(\\d{0,2})([RN])(\\d{1,2}))(${RESISTOR_LETTERS})?$`);
const WITH_UNIT = /^(\d+(?:\.\d+)?|\.\d+) ?([nuµm]?)H$/i;
const PREFIXES: Readonly<Record<string, number>> = { n: -9, u: -6, µ: -6, m: -3 };

/**
 * Inductor markings: three digits in microhenries (`101` is 100 µH), `R` or `N` as the decimal point of
 * micro- or nanohenries (`4R7`), or a value with its unit. Common practice of makers; no standard is quoted.
 */
export const inductorCode: Decoder = (text) => {
  const unit = WITH_UNIT.exec(text.replace(',', '.'));
  if (unit) {
    const value = scaled(unit[1] ?? '', PREFIXES[(unit[2] ?? '').toLowerCase()] ?? 0);
    if (value === 0) return [];
    const source = 'Value printed with its unit';
    return [{ kind: 'inductor', value, unit: 'H', tolerance: null, source }];
  }
  const match = CODE.exec(text);
  if (!match) return [];
  const [, digits = '', whole = '', mark = '', fraction = '', letter] = match;
  const value =
    mark === ''
      ? threeDigits(digits, -6)
      : scaled(whole + fraction, (mark === 'N' ? -9 : -6) - fraction.length);
  if (value === null || value === 0) return [];
  const tolerance = letter ? resistorTolerance(letter) : null;
  const source = `Common practice: inductance code in ${mark === 'N' ? 'nano' : 'micro'}henries`;
  return [
    {
      kind: 'inductor',
      value,
      unit: 'H',
      tolerance: tolerance?.fraction ?? null,
      source: source + letterNote(tolerance),
    },
  ];
};
