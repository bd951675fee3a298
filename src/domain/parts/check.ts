import {
  accuracyLimit,
  autorangeResolution,
  DEFAULT_ACCURACY,
  DEFAULT_OVER_RANGE_OHMS,
} from '@/domain/quantities/accuracy';
import type { Shown } from './check-chance';
import { chanceOf, misprobeChance } from './check-chance';
import type { Expected } from './check-expected';
import { expectedOf } from './check-expected';
import type { KnownPart } from './check-input';
import { knownPart, refuseNumbers } from './check-input';
import type { PartCheckAnswer, PartCheckInput, PartVerdict, Side } from './check-types';
import { nextStep, reasonsFor } from './check-words';
import { failureShare } from './failure-shares';
import { kindRate } from './kind-rates';
import type { Mode } from './kinds';

/** From here on a part is a suspect, and up to here it fits. */
const SUSPECT_FROM = 0.5;
const FITS_UP_TO = 0.1;
/** A reading up to this, in ohms, is as good as a short, where the healthy part shows ten times it and more. */
const NEAR_SHORT_OHMS = 10;
/** Leads that nobody subtracted, in ohms; on finer meters twice the resolution. */
const LEAD_OHMS = 0.2;

/**
 * Judges one part by one reading, knowing nothing of the circuit around it.
 *
 * Out of circuit by Bayes' rule over healthy and the kind's failure modes. In circuit also by Rayleigh's
 * monotonicity law (Doyle and Snell, Random Walks and Electric Networks, 1984): a parallel path can only
 * lower a reading, so one above tolerance proves the part open or drifted high, one below proves nothing
 * until a lead is lifted; near zero across a part that should be far above it is strong, though not proof.
 *
 * Answers a refusal naming the field for numbers that are not finite or out of bounds, and for a marking that
 * cannot be read or has two values. Never throws.
 */
export function checkPart(input: PartCheckInput): PartCheckAnswer {
  const refusal = refuseNumbers(input);
  if (refusal) return refusal;
  const part = knownPart(input);
  if ('ok' in part) return part;
  const expected = expectedOf(part);
  const shown = shownBy(input);
  const side = sideOf(input, expected, shown);
  const { fault, mode } = posterior(part, expected, shown, input.inCircuit);
  const verdict = verdictOf(side, fault, expected, input.inCircuit);
  const named = verdict === 'suspect' ? mode : undefined;
  const next = nextStep(input, part, expected, side, verdict);
  return {
    ok: true,
    verdict,
    ...(named ? { mode: named } : {}),
    probability: fault,
    reasons: reasonsFor(input, part, expected, side, verdict, named),
    ...(next ? { next } : {}),
  };
}

/** What the meter may have had before it: its accuracy either way, and leads that nobody subtracted. */
function shownBy(input: PartCheckInput): Shown {
  const accuracy = input.accuracy ?? DEFAULT_ACCURACY;
  if (input.value === 'OL') {
    return { low: input.overRange ?? DEFAULT_OVER_RANGE_OHMS, high: Infinity };
  }
  const resolution = input.resolution ?? autorangeResolution(input.value);
  const limit = accuracyLimit(input.value, accuracy, resolution) + resolution / 2;
  const leads = Math.min(LEAD_OHMS, 2 * resolution);
  return { low: Math.max(0, input.value - limit - leads), high: input.value + limit };
}

function sideOf(input: PartCheckInput, { band, judgedBy }: Expected, shown: Shown): Side {
  const far = band.low >= 10 * NEAR_SHORT_OHMS || judgedBy === 'unknown';
  if (far && input.value !== 'OL' && input.value <= NEAR_SHORT_OHMS) return 'near-short';
  if (judgedBy !== 'floor' && input.value === 'OL' && band.high >= shown.low) return 'beyond-range';
  if (shown.low > band.high) return 'above';
  return shown.high < band.low ? 'below' : 'within';
}

function posterior(
  part: KnownPart,
  expected: Expected,
  shown: Shown,
  inCircuit: boolean,
): { fault: number; mode: Mode | undefined } {
  const amiss = misprobeChance(shown);
  const rate = kindRate(part.kind);
  const seen = expected.modes.reduce((sum, { mode }) => sum + failureShare(part.kind, mode), 0);
  const healthy = (1 - rate) * (chanceOf(expected.healthy, shown, inCircuit, false) + amiss);
  let total = healthy;
  let best: { mode: Mode; weight: number } | undefined;
  for (const { mode, low, high } of expected.modes) {
    const chance = chanceOf([{ low, high, weight: 1 }], shown, inCircuit, true) + amiss;
    const weight = (rate * failureShare(part.kind, mode) * chance) / seen;
    total += weight;
    if (!best || weight > best.weight) best = { mode, weight };
  }
  return { fault: total > 0 ? 1 - healthy / total : rate, mode: best?.mode };
}

function verdictOf(
  side: Side,
  fault: number,
  { judgedBy }: Expected,
  inCircuit: boolean,
): PartVerdict['verdict'] {
  if (side === 'beyond-range') return 'inconclusive';
  if (side === 'within') {
    return fault <= FITS_UP_TO && judgedBy !== 'unknown' ? 'fits' : 'inconclusive';
  }
  if (side === 'below' && inCircuit) return 'inconclusive';
  return fault >= SUSPECT_FROM ? 'suspect' : 'inconclusive';
}
