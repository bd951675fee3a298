import { decodeMarking } from '@/domain/markings/decode';
import type { MarkingReading } from '@/domain/markings/reading';
import { formatOhms } from '@/domain/quantities/format';
import { parseResistance } from '@/domain/quantities/parse';
import type { PartCheckInput, PartRefusal } from './check-types';
import type { PartKind } from './kinds';

/** What is known of the part before it is measured. */
export interface KnownPart {
  readonly kind: PartKind;
  readonly ohms: number | null;
  readonly tolerance: number | null;
  /** The marking's own quantity where that is not a resistance: volts of a MOV, amps of a fuse. */
  readonly marked: MarkingReading | null;
  /** A marking was given that says nothing of this kind. */
  readonly unread: boolean;
  readonly position: string | null;
}

/** Kinds that cannot be judged without a value, so that an unreadable marking is refused. */
const NEEDS_VALUE: ReadonlySet<PartKind> = new Set<PartKind>(['resistor', 'ntc', 'trimmer']);

/** The first field that is not a number it may be, or `null`. */
export function refuseNumbers(input: PartCheckInput): PartRefusal | null {
  const { value, ohms, tolerance, resolution, overRange, accuracy } = input;
  const positive = (x: number | undefined) => x === undefined || (Number.isFinite(x) && x > 0);
  const notNegative = (x: number) => Number.isFinite(x) && x >= 0;
  if (value !== 'OL' && !notNegative(value)) {
    return refuse('value', `${value} given, ohms of zero or more, or OL, are needed`);
  }
  if (!positive(ohms)) return refuse('ohms', `${ohms} given, a positive number is needed`);
  if (!positive(tolerance) || (tolerance ?? 0) >= 1) {
    return refuse('tolerance', `${tolerance} given, a fraction between 0 and 1 is needed`);
  }
  if (!positive(resolution)) {
    return refuse('resolution', `${resolution} given, a positive number of ohms is needed`);
  }
  if (!positive(overRange)) {
    return refuse('overRange', `${overRange} given, a positive number of ohms is needed`);
  }
  if (accuracy && !(notNegative(accuracy.percent) && notNegative(accuracy.counts))) {
    return refuse('accuracy', 'percent and counts of zero or more are needed');
  }
  return null;
}

/** Reads the marking and puts together what is known, or says what is in the way. */
export function knownPart(input: PartCheckInput): KnownPart | PartRefusal {
  const { kind, marking } = input;
  const known = {
    kind,
    ohms: input.ohms ?? null,
    tolerance: input.tolerance ?? null,
    marked: null,
    unread: false,
    position: input.position ?? null,
  };
  if (marking === undefined || marking.trim() === '') return known;
  const readings = settled(decodeMarking(marking, kind));
  const [first] = readings;
  if (!first) {
    const typed = parseResistance(marking);
    if (typed.ok && typed.kind === 'value' && typed.ohms > 0 && NEEDS_VALUE.has(kind)) {
      return { ...known, ohms: known.ohms ?? typed.ohms };
    }
    if (known.ohms !== null || !NEEDS_VALUE.has(kind)) return { ...known, unread: true };
    return refuse(
      'marking',
      `"${marking}" given, a marking of this kind of part or its ohms is needed`,
    );
  }
  if (first.unit !== 'Ω') return { ...known, marked: first };
  const values = [...new Set(readings.map((one) => one.value))];
  if (values.length > 1 && known.ohms === null) {
    const both = values.map((one) => formatOhms(one)).join(' or ');
    return refuse('marking', `"${marking}" given, it may be ${both}: the part's ohms are needed`);
  }
  const widest = Math.max(...readings.map((one) => one.tolerance ?? 0));
  return {
    ...known,
    ohms: known.ohms ?? first.value,
    tolerance: known.tolerance ?? (widest > 0 ? widest : null),
  };
}

/** Readings that rest on memory step back where another one does not. */
function settled(readings: MarkingReading[]): MarkingReading[] {
  const firm = readings.filter((one) => !one.source.includes('from memory: charts differ'));
  return firm.length > 0 ? firm : readings;
}

function refuse(path: string, reason: string): PartRefusal {
  return { ok: false, path, reason };
}
