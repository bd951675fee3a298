import type { Spread } from './check-expected';
import type { OhmsRange } from './mode-ranges';

/** Chance that a reading of one part alone was taken amiss (bench assumption), and that it then shows OL. */
const MISPROBE = 0.002;
const MISPROBE_OL = 0.3;
/** A misprobe shows anything from 0.1 ohm to 100 Mohm alike in ln R; beyond them it keeps a little. */
const MISPROBE_FROM = 0.1;
const MISPROBE_SPAN = Math.log(1e9);

/** Part of a failure mode that lies outside its usual range, thinning by e for each factor of e. */
const TAIL = 0.1;

/**
 * What stands in parallel with a part whose circuit is not known, in ohms (bench assumptions): nothing, a
 * short way round, or anything else alike in ln R.
 */
const NO_PATH = 0.4;
const SHORT_PATH: Spread = { low: 0.05, high: 100, weight: 0.008 };
const ANY_PATH: Spread = { low: 100, high: 1e9, weight: 0.592 };
const PATH_NODES = 64;

/** The resistances that the meter may have had before it, in ohms; `high` is infinite for OL. */
export type Shown = OhmsRange;

/** The chance that a part spread over these ranges gives the reading. `tails` for failure modes. */
export function chanceOf(
  spreads: readonly Spread[],
  shown: Shown,
  inCircuit: boolean,
  tails: boolean,
): number {
  let chance = 0;
  for (const spread of spreads) {
    const alone = share(spread, shown.high, tails) - share(spread, shown.low, tails);
    const here = inCircuit ? NO_PATH * alone + besidePaths(spread, shown) : alone;
    chance += spread.weight * here;
  }
  return chance;
}

/** The chance that a misprobe gives the reading, whatever the part. */
export function misprobeChance(shown: Shown): number {
  if (shown.high === Infinity) return MISPROBE * MISPROBE_OL;
  const low = Math.min(Math.max(shown.low, MISPROBE_FROM), shown.high * 0.99);
  const width = Math.log(shown.high / low);
  return (MISPROBE * (1 - MISPROBE_OL) * width) / MISPROBE_SPAN;
}

/** The share of a spread at or below a resistance. */
function share({ low, high }: OhmsRange, ohms: number, tails: boolean): number {
  if (ohms <= 0) return 0;
  if (ohms === Infinity) return 1;
  const tail = tails ? TAIL : 0;
  if (ohms < low) return (tail / 2) * (ohms / low);
  if (ohms > high) return 1 - (tail / 2) * (high / ohms);
  return tail / 2 + ((1 - tail) * Math.log(ohms / low)) / Math.log(high / low);
}

/** The chance of the reading with an unknown path in parallel, over the part's spread at its quantiles. */
function besidePaths(part: OhmsRange, shown: Shown): number {
  let sum = 0;
  for (let i = 0; i < PATH_NODES; i++) {
    const ohms = part.low * (part.high / part.low) ** ((i + 0.5) / PATH_NODES);
    const [least, most] = [beside(shown.low, ohms), beside(shown.high, ohms)];
    for (const path of [SHORT_PATH, ANY_PATH]) {
      sum += path.weight * (share(path, most, false) - share(path, least, false));
    }
  }
  return sum / PATH_NODES;
}

/** The path that in parallel with the part gives this reading; infinite when none can lower it that little. */
function beside(shown: number, part: number): number {
  return shown >= part ? Infinity : shown / (1 - shown / part);
}
