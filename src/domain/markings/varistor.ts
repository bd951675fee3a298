import type { Decoder, MarkingReading } from './reading';
import { threeDigits } from './reading';
import { CLASS_AMPS, ENERGY_DISCS, VARISTORS } from './varistor-table';
import type { VaristorRow } from './varistor-table';

type Ratings = Record<string, number | string>;

const BY_MILLIAMP = /^(?:(\d{1,2}) ?D ?|D)?(\d{3}) ?([JKLM])?(?: ?D ?(\d{1,2}))?$/;
const BY_AC = /^S ?(\d{1,2}) ?([JKLM]) ?(\d{2,3})$/;
const TOLERANCES: Readonly<Record<string, number>> = { J: 0.05, K: 0.1, L: 0.15, M: 0.2 };

/** Nominal voltages in which varistor discs are made, at 1 mA. */
const LEAST_VOLTS = 8;
const GREATEST_VOLTS = 1800;

const CLAMP_AT = '10 A (7 mm disc), 25 A (10 mm), 50 A (14 mm), 8/20 µs';
const CAUTION =
  'A drift of the 1 mA voltage, 10 % counts as worn, cannot be seen on the ohms range';

/**
 * Varistor codes. `14D471K` and `471K` name the voltage at 1 mA DC (470 V, +-10 %); `S14K275` names the
 * highest continuous AC voltage instead, which the text tells apart. Continuous and clamping voltages and the
 * energy come from the table. Source: IEC 61051 for the code and its tolerance letter.
 */
export const varistorCode: Decoder = (text) => {
  const upper = text.toUpperCase();
  return [...byMilliamp(upper), ...byAcVolts(upper)];
};

function byMilliamp(text: string): MarkingReading[] {
  const match = BY_MILLIAMP.exec(text);
  const [, before, code = '', letter, after] = match ?? [];
  const volts = threeDigits(code);
  const disc = before ?? after;
  if (volts === null || volts < LEAST_VOLTS || volts > GREATEST_VOLTS) return [];
  if ((before && after) || (disc && !isDisc(Number(disc)))) return [];
  const known = VARISTORS.find((row) => row.code === code);
  return [
    {
      kind: 'mov',
      value: volts,
      unit: 'V',
      tolerance: letter ? (TOLERANCES[letter] ?? null) : null,
      source: sourceOf('IEC 61051, voltage at 1 mA DC', letter, known),
      ratings: ratingsOf(volts, letter, disc ? Number(disc) : null, known),
    },
  ];
}

function byAcVolts(text: string): MarkingReading[] {
  const [, disc = '', letter = '', ac = ''] = BY_AC.exec(text) ?? [];
  if (!isDisc(Number(disc)) || Number(ac) < 4) return [];
  const known = VARISTORS.find((row) => row.acVolts === Number(ac));
  const volts = threeDigits(known?.code ?? '');
  const ratings = ratingsOf(volts, letter, Number(disc), known);
  return [
    {
      kind: 'mov',
      value: volts ?? Number(ac),
      unit: volts === null ? 'V rms' : 'V',
      tolerance: TOLERANCES[letter] ?? null,
      source: sourceOf('Maker’s code by continuous AC voltage', letter, known),
      ratings: { acVolts: Number(ac), ...ratings },
    },
  ];
}

function isDisc(millimetres: number): boolean {
  return millimetres >= 5 && millimetres <= 40;
}

function sourceOf(code: string, letter: string | undefined, row: VaristorRow | undefined): string {
  const memory = letter === 'L' ? '; tolerance letter from memory' : '';
  return `${code}${memory}; ${row ? row.source : 'continuous and clamping voltage not in the table'}`;
}

function ratingsOf(
  volts: number | null,
  letter: string | undefined,
  disc: number | null,
  row: VaristorRow | undefined,
): Ratings {
  const ratings: Ratings = {};
  const tolerance = letter ? TOLERANCES[letter] : undefined;
  if (disc !== null) ratings['discMillimetres'] = disc;
  if (volts !== null && tolerance !== undefined) {
    ratings['lowVolts'] = Number((volts * (1 - tolerance)).toPrecision(6));
    ratings['highVolts'] = Number((volts * (1 + tolerance)).toPrecision(6));
  }
  if (row) Object.assign(ratings, tableRatings(row, disc));
  ratings['note'] = CAUTION;
  return ratings;
}

function tableRatings(row: VaristorRow, disc: number | null): Ratings {
  const [first, second] = row.clampVolts;
  const ratings: Ratings = { acVolts: row.acVolts, dcVolts: row.dcVolts };
  ratings['clampVolts'] = Math.max(first, second ?? first);
  if (second !== undefined) ratings['clampVoltsLow'] = Math.min(first, second);
  const amps = row.clampAmps ?? (disc === null ? undefined : CLASS_AMPS[disc]);
  if (amps !== undefined) ratings['clampAmps'] = amps;
  if (amps === undefined && disc === null) ratings['clampAt'] = CLAMP_AT;
  const joules = row.joules?.[ENERGY_DISCS.findIndex((one) => one === disc)];
  if (joules != null) ratings['joules'] = joules;
  return ratings;
}
