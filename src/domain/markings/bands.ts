import type { PartKind } from '../parts/kinds';
import type { BandTolerance, Colour } from './colours';
import { coloursIn } from './colours';
import type { Decoder, MarkingReading, MarkingUnit } from './reading';
import { scaled } from './reading';

const UNMARKED: readonly BandTolerance[] = [{ fraction: 0.2 }];

/**
 * Colour bands, three to six, as words in the order they are read: `brown-black-red-gold`, `gn bu bn bn`.
 * Three and four bands have two figures, five and six have three; the sixth is the temperature coefficient.
 * No fourth band is +-20 %. When the order given cannot be read, the other end is tried and said.
 * Source: IEC 60062:2016; on inductors, in microhenries, common practice.
 */
export function colourBands(kind: PartKind, unit: MarkingUnit, exponent: number): Decoder {
  return (text) => {
    const bands = coloursIn(text);
    if (!bands || bands.length < 3 || bands.length > 6) return [];
    const straight = readBands(bands, kind, unit, exponent);
    if (straight.length > 0) return straight;
    return readBands(bands.toReversed(), kind, unit, exponent).map((one) => ({
      ...one,
      ratings: { ...one.ratings, note: 'read from the other end' },
    }));
  };
}

function readBands(
  bands: readonly Colour[],
  kind: PartKind,
  unit: MarkingUnit,
  exponent: number,
): MarkingReading[] {
  const figures = bands.length >= 5 ? 3 : 2;
  const digits = bands.slice(0, figures).map((band) => band.digit);
  const multiplier = bands[figures]?.multiplier;
  const tolerances = bands.length === 3 ? UNMARKED : bands[figures + 1]?.tolerances;
  const ppm = bands[5]?.ppm;
  if (digits.includes(undefined) || digits[0] === 0) return [];
  if (multiplier === undefined || !tolerances || (bands.length === 6 && ppm === undefined)) {
    return [];
  }
  const standard = kind === 'inductor' ? 'Common practice' : 'IEC 60062:2016';
  return tolerances.map(({ fraction, note }) => ({
    kind,
    value: scaled(digits.join(''), multiplier + exponent),
    unit,
    tolerance: fraction,
    source: `${standard}, ${bands.length} colour bands${note ? `, ${note}` : ''}`,
    ...(ppm === undefined ? {} : { ratings: { ppmPerKelvin: ppm } }),
  }));
}
