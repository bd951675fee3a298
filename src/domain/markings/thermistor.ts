import type { Decoder } from './reading';
import { threeDigitCode } from './resistor-digits';

const AT_25 = 'Common practice: resistance at 25 °C in the three-digit code';
const PTC = `${AT_25}; PTC codes differ between makers, compare with the data sheet`;
const LETTERS = 'FGHJKM';
const DISC = /^(\d{1,3}(?:\.\d)?)D-(\d{1,2})$/;

/**
 * NTC markings: the three-digit code (`103` is 10 kΩ at 25 °C) and the inrush disc (`10D-9`: 10 Ω at 25 °C,
 * 9 mm). Common practice; makers differ.
 */
export const ntcCode: Decoder = (text) => {
  const upper = text.toUpperCase();
  const [, ohms, disc] = DISC.exec(upper) ?? [];
  if (ohms === undefined || Number(ohms) === 0) return threeDigitCode('ntc', AT_25, LETTERS)(upper);
  return [
    {
      kind: 'ntc',
      value: Number(ohms),
      unit: 'Ω',
      tolerance: null,
      source: 'Common practice: inrush NTC, ohms at 25 °C and disc',
      ratings: { discMillimetres: Number(disc), celsius: 25 },
    },
  ];
};

/** PTC markings follow no standard: read as the three-digit code, only when a PTC is asked for. */
export const ptcCode: Decoder = (text) => threeDigitCode('ptc', PTC, LETTERS)(text.toUpperCase());
