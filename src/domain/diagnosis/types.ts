import type { Network, Ohms, Probe } from '@/domain/network/types';
import type { Accuracy } from '@/domain/quantities/accuracy';
import type { Incident, Mode, Standing } from '@/domain/parts/kinds';

/** One resistance measurement, as the bench sheet holds it. */
export interface Reading extends Probe {
  readonly value: Ohms;
  /** Default ±(0.8 % + 3 counts). */
  readonly accuracy?: Accuracy | undefined;
  /** Ω per count. Default: that of a 4000-count autoranging meter at this value. */
  readonly resolution?: number | undefined;
  /** Ω from which the meter shows OL. Default 60 MΩ. */
  readonly overRange?: number | undefined;
}

/** How often closed tickets of this board confirmed a fault: it shifts the odds. */
export interface SeenFault {
  readonly ref: string;
  readonly mode: Mode;
  readonly times: number;
}

export interface DiagnosisInput {
  readonly network: Network;
  readonly readings: readonly Reading[];
  /** Default `unknown`. */
  readonly incident?: Incident | undefined;
  /** How many hypotheses to list, 1 to 200. Default 20. */
  readonly limit?: number | undefined;
  /** Confirmed faults of this board's closed tickets. */
  readonly seen?: readonly SeenFault[] | undefined;
  /** False leaves the proposal of the next reading out. Default true. */
  readonly next?: boolean | undefined;
}

export interface Fault {
  readonly ref: string;
  readonly mode: Mode;
}

export interface RankedHypothesis {
  readonly faults: readonly Fault[];
  readonly probability: number;
}

export interface PartStanding {
  readonly ref: string;
  readonly standing: Standing;
  /** Probability that the part has failed in any mode. */
  readonly fault: number;
  readonly modes: Partial<Record<Mode, number>>;
}

export interface NextReading {
  readonly from: string;
  readonly to: string;
  readonly position: string;
  readonly lifted: readonly string[];
  /** Expected drop in the entropy of the hypotheses. */
  readonly bits: number;
  /** Effort: probe where you stand 1, turn the switch 1.5, lift a lead 10. */
  readonly cost: number;
}

export interface DoubtfulReading {
  /** Index into the readings given. */
  readonly reading: number;
  readonly reason: string;
}

export interface DiagnosisAnswer {
  /** Probability that no part of the network has failed: look elsewhere. */
  readonly healthy: number;
  /** Entropy of the ranked hypotheses, bits. */
  readonly entropy: number;
  readonly hypotheses: readonly RankedHypothesis[];
  readonly parts: readonly PartStanding[];
  /** Suspects that the readings cannot tell apart. */
  readonly groups: readonly (readonly string[])[];
  readonly next: readonly NextReading[];
  readonly doubtful: readonly DoubtfulReading[];
  readonly reasons: readonly string[];
}

/** What the healthy network would show at a reading's points: middle and the band of tolerance and meter. */
export interface Prediction {
  readonly ohms: Ohms;
  /** Half-width of the 95 % band as a fraction of `ohms`; 0 when over range. */
  readonly band: number;
}
