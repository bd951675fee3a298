import type { Accuracy } from '@/domain/quantities/accuracy';
import type { Mode, PartKind } from './kinds';

/** One part and one reading across it. Resistances in ohms. */
export interface PartCheckInput {
  readonly kind: PartKind;
  /** The healthy value; taken from the marking, or from the kind's usual value, when not given. */
  readonly ohms?: number | undefined;
  /** What is printed on the part, `561K`, `T630mA`. */
  readonly marking?: string | undefined;
  /** As a fraction, 0 to 1, both ends left out. */
  readonly tolerance?: number | undefined;
  readonly value: number | 'OL';
  /** The weight of the last digit shown; that of a 4000-count autoranging meter when not given. */
  readonly resolution?: number | undefined;
  /** The meter's; +-(0.8 % + 3 counts) when not given. */
  readonly accuracy?: Accuracy | undefined;
  /** Where the meter shows OL; 60 Mohm when not given. */
  readonly overRange?: number | undefined;
  /** False when at least one lead of the part is lifted. */
  readonly inCircuit: boolean;
  /** Switch position. A contact is taken as closed there, unless the position is named `open`. */
  readonly position?: string | undefined;
}

export interface PartVerdict {
  readonly ok: true;
  readonly verdict: 'fits' | 'suspect' | 'inconclusive';
  /** The likeliest failure, when the part is a suspect. */
  readonly mode?: Mode;
  /** Probability that the part has failed in any mode. */
  readonly probability: number;
  readonly reasons: string[];
  /** What to measure next, when something is left to settle. */
  readonly next?: string;
}

/** The input cannot be judged: the field at `path` needs another value. */
export interface PartRefusal {
  readonly ok: false;
  readonly path: string;
  readonly reason: string;
}

/** Where a reading lies, the meter's own error granted. */
export type Side = 'within' | 'above' | 'below' | 'near-short' | 'beyond-range';

export type PartCheckAnswer = PartVerdict | PartRefusal;
