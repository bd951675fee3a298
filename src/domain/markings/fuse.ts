import type { Decoder } from './reading';

type Ratings = Record<string, number | string>;

const SPEEDS: Readonly<Record<string, string>> = {
  FF: 'very quick acting',
  F: 'quick acting',
  M: 'medium time lag',
  T: 'time lag',
  TT: 'long time lag',
};

/** Breaking capacity of IEC 60127 cartridge fuses at 250 V, in amps, given the rating. From memory. */
const BREAKING: Readonly<Record<string, (rated: number) => number>> = {
  L: (rated) => Math.max(35, 10 * rated),
  E: () => 150,
  H: () => 1500,
};

const SIZE = /(?<![\d.])(\d{1,2}(?:\.\d{1,2})?) ?[X×] ?(\d{2}(?:\.\d)?)(?: ?MM)?(?![\d.])/;
const KILOAMPS = /(?<![\d.])(\d{1,3}(?:\.\d)?) ?KA(?:IC)?(?![A-Z])/;
const VOLTS = /(?<![\d.])(\d{2,4}) ?V(?: ?(?:AC\/DC|AC|DC|~|=|⎓))?/;
const CLASS = /(?<![A-Z])(AR|GR|GG|GPV)(?![A-Z])/;
/** Utilisation classes of IEC 60269, as printed. From memory. */
const CLASSES: Readonly<Record<string, string>> = { AR: 'aR', GR: 'gR', GG: 'gG', GPV: 'gPV' };
const RATING = /(?<![\d.])(\d{1,4}(?:\.\d{1,3})?|\.\d{1,3}) ?(MA|A)/;

/**
 * Fuse markings in any order: speed, rating, breaking capacity, voltage, size (`F 11A 1000V 10x38`,
 * `T630mAL250V`, `FF440mA`). Answers the rated current. Nothing is read when any part of the text is left
 * over. Source: IEC 60127 for speed and breaking letters (from memory).
 */
export const fuseMarking: Decoder = (text) => {
  const ratings: Ratings = {};
  let rest = ` ${text.replaceAll(',', '.').toUpperCase()} `;
  const take = (pattern: RegExp): RegExpExecArray | null => {
    const match = pattern.exec(rest);
    if (match) rest = `${rest.slice(0, match.index)} ${rest.slice(match.index + match[0].length)}`;
    return match;
  };
  const size = take(SIZE);
  const kiloamps = take(KILOAMPS);
  const volts = take(VOLTS);
  const family = take(CLASS);
  const rating = take(RATING);
  const amps = rating ? Number(rating[1]) * (rating[2] === 'MA' ? 1e-3 : 1) : 0;
  if (amps <= 0 || amps > 1000) return [];
  const letters = rest.trim().split(/ +/).filter(Boolean);
  const speed = letters.find((one) => Object.hasOwn(SPEEDS, one));
  const breaking = letters.find((one) => Object.hasOwn(BREAKING, one));
  if (letters.some((one) => one !== speed && one !== breaking)) return [];
  if (letters.length > new Set(letters).size) return [];
  if (speed) Object.assign(ratings, { speed, speedWords: SPEEDS[speed] });
  if (volts) ratings['volts'] = Number(volts[1]);
  if (breaking) {
    ratings['breaking'] = breaking;
    ratings['breakingAmps'] = BREAKING[breaking]?.(amps) ?? 'not known';
  }
  if (kiloamps) ratings['breakingAmps'] = Number(kiloamps[1]) * 1000;
  if (size) ratings['sizeMillimetres'] = `${size[1]}x${size[2]}`;
  if (family) ratings['class'] = CLASSES[family[1] ?? ''] ?? 'not known';
  const source =
    speed || breaking || family
      ? 'IEC 60127 and IEC 60269 letters, from memory'
      : 'Rated current as printed';
  return [
    {
      kind: 'fuse',
      value: Number(amps.toPrecision(6)),
      unit: 'A',
      tolerance: null,
      source,
      ...(Object.keys(ratings).length > 0 ? { ratings } : {}),
    },
  ];
};
