import type { PartKind } from '../parts/kinds';
import { colourBands } from './bands';
import { capacitorCode } from './capacitor';
import { eia96 } from './eia96';
import { fuseMarking } from './fuse';
import { inductorCode } from './inductor';
import type { Decoder, MarkingReading } from './reading';
import { fourDigitCode, threeDigitCode, zeroOhm } from './resistor-digits';
import { letterCode } from './resistor-letters';
import { ntcCode, ptcCode } from './thermistor';
import { varistorCode } from './varistor';
import { zenerCode } from './zener';

/** Longest text read, in characters. */
export const LONGEST_MARKING = 80;

const SMD = 'IEC 60062:2016, three digits';
const WIPER = 'Common practice: trimmers carry the three-digit code of resistors';

const upper =
  (decoder: Decoder): Decoder =>
  (text) =>
    decoder(text.toUpperCase());

/** Decoders that are tried for a kind, in the order in which their readings are answered. */
const DECODERS: ReadonlyArray<readonly [PartKind, Decoder]> = [
  ['resistor', withWatts(letterCode('resistor'))],
  ['resistor', zeroOhm],
  ['resistor', upper(threeDigitCode('resistor', SMD, 'FGJ'))],
  ['resistor', fourDigitCode],
  ['resistor', upper(eia96)],
  ['resistor', colourBands('resistor', 'Ω', 0)],
  ['shunt', (text) => letterCode('shunt')(text).filter((one) => one.value > 0 && one.value < 1)],
  ['capacitor', capacitorCode],
  ['mov', varistorCode],
  ['ntc', ntcCode],
  ['trimmer', upper(threeDigitCode('trimmer', WIPER, 'KM'))],
  ['inductor', inductorCode],
  ['zener', zenerCode],
  ['fuse', fuseMarking],
];

/** Readings too loose to offer unless the kind is known. */
const ONLY_WHEN_ASKED: ReadonlyArray<readonly [PartKind, Decoder]> = [
  ['ptc', letterCode('ptc')],
  ['ptc', ptcCode],
  ['ntc', letterCode('ntc')],
  ['trimmer', letterCode('trimmer')],
  ['inductor', colourBands('inductor', 'H', -6)],
];

/**
 * Every reading that a part's printed marking may have, each with the kind of part that it belongs to:
 * `103` is 10 kΩ on a resistor, 10 nF on a capacitor. With `kind`, only that kind's readings. An unreadable
 * text, or one of more than 80 characters, has none. Never throws. Sources stand with each reading.
 */
export function decodeMarking(text: string, kind?: PartKind): MarkingReading[] {
  if (text.length > LONGEST_MARKING) return [];
  const { code, percent } = splitPercent(tidy(text));
  if (code === '') return [];
  const decoders = kind
    ? [...DECODERS, ...ONLY_WHEN_ASKED].filter(([one]) => one === kind)
    : DECODERS;
  return decoders
    .flatMap(([, decoder]) => decoder(code))
    .filter((one) => Number.isFinite(one.value))
    .map((one) => (percent === null ? one : { ...one, tolerance: percent }));
}

/** One kind of space, ohm sign (U+2126 to U+03A9) and micro sign (U+03BC to U+00B5). */
function tidy(text: string): string {
  return text
    .replace(/\s+/gu, ' ')
    .replaceAll('\u2126', '\u03a9')
    .replaceAll('\u03bc', '\u00b5')
    .trim();
}

/** Takes a printed tolerance, `5%` or `±0.1 %`, off the end of a marking. */
function splitPercent(text: string): { code: string; percent: number | null } {
  const match = /^(.+?) ?±? ?(?<![\d.])(\d{1,2}(?:\.\d{1,3})?) ?%$/.exec(text);
  const percent = Number(match?.[2]);
  if (!match || !(percent > 0)) return { code: text, percent: null };
  return { code: (match[1] ?? '').trim(), percent: Number((percent / 100).toPrecision(6)) };
}

/** Reads a power in front of a resistor's value (`5W 0R22J`) into its ratings. */
function withWatts(decoder: Decoder): Decoder {
  return (text) => {
    const match = /^(\d{1,3}(?:\.\d)?) ?W ?(.+)$/i.exec(text);
    if (!match) return decoder(text);
    return decoder(match[2] ?? '').map((one) => ({
      ...one,
      ratings: { ...one.ratings, watts: Number(match[1]) },
    }));
  };
}
