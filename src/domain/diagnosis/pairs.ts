import { COARSE, FINE } from './grid';
import type { Hypothesis } from './hypothesis';
import { pairBounds } from './pair-bounds';
import { reachOf } from './reach';
import type { Scene } from './scene';
import type { Singles } from './singles';
import { screened, weighed } from './weigh';
import type { Workshop } from './workshop';

/** Pairs whose bound lies this far (ln) below the best hypothesis are dropped: e⁻¹⁴ is 8·10⁻⁷. Beside a given
 * fault those that would have to be screened are dropped earlier. */
const HOPELESS = 14;
const HOPELESS_BESIDE = 11;
/** How many pairs are screened, and how many of them are weighed with the full covariance. */
const MOST_SCREENED = 1500;
const MOST_WEIGHED = 48;
/** A pair this far (ln) below the best keeps its screened weight. */
const SLIGHT = 9;

interface Candidate {
  readonly j: number;
  readonly k: number;
  readonly prior: number;
  log: number;
}

/**
 * Weighs the pairs of faults. Pairs that no reading sees together follow from their singles; of the rest the
 * monotonicity bound drops the hopeless, independent readings screen what is left, and the full covariance
 * weighs the best.
 *
 * @param best ln weight of the best hypothesis so far.
 */
export function rankPairs(workshop: Workshop, singles: Singles, best: number): Hypothesis[] {
  const { scene, evidence, priors, trial, joint } = workshop;
  const given = workshop.given?.mode ?? -1;
  const logOdds = priors.odds.map(Math.log);
  const logShared = priors.shared.map(Math.log);
  const bounds = pairBounds(scene, evidence, reachOf(scene));
  const found: Hypothesis[] = [];
  const candidates: Candidate[] = [];
  const least = best - HOPELESS;
  const cut = best - (given < 0 ? HOPELESS : HOPELESS_BESIDE);
  for (const [one, other] of groupPairs(scene)) {
    bounds.pair(one[0]!, other[0]!);
    const apart = bounds.apart();
    const shared =
      logShared[scene.modes[one[0]!]!.part * priors.parts + scene.modes[other[0]!]!.part]!;
    for (const j of one)
      for (const k of other) {
        const prior = logOdds[j]! + logOdds[k]! + shared;
        const sum = prior + singles.healthy + singles.gain[j]! + singles.gain[k]!;
        if (apart) {
          if (sum > least) found.push({ given, j, k, log: sum });
          continue;
        }
        const log = prior + bounds.bound(j, k, cut - prior);
        if (log <= cut) continue;
        if (bounds.still()) found.push({ given, j, k, log: sum });
        else candidates.push({ j, k, prior, log });
      }
  }
  candidates.sort((a, b) => b.log - a.log).splice(MOST_SCREENED);
  for (const one of candidates) {
    const { j, k, prior } = one;
    one.log = prior + screened(scene, evidence, trial, j, k, COARSE) + correction(singles, j, k);
  }
  candidates.sort((a, b) => b.log - a.log);
  candidates.forEach(({ j, k, prior, log }, rank) => {
    if (log < cut) return;
    const full =
      rank < MOST_WEIGHED && log > best - SLIGHT
        ? prior + weighed(scene, evidence, trial, joint, j, k, FINE).logLikelihood
        : log;
    found.push({ given, j, k, log: full });
  });
  return found;
}

/** What a finer cut and the full covariance changed for the single fault that explains more of the readings. */
function correction({ coarse, joint }: Singles, j: number, k: number): number {
  const better = coarse[j]! > coarse[k]! ? j : k;
  return joint[better]! - coarse[better]!;
}

/** Modes of two different parts, in groups that bridge alike. */
function* groupPairs(scene: Scene): Generator<[number[], number[]]> {
  const groups = new Map<string, number[]>();
  scene.modes.forEach(({ part, bridges }, m) => {
    const key = `${part} ${bridges}`;
    groups.set(key, [...(groups.get(key) ?? []), m]);
  });
  const list = [...groups.values()];
  for (let one = 1; one < list.length; one++)
    for (let other = 0; other < one; other++)
      if (scene.modes[list[one]![0]!]!.part !== scene.modes[list[other]![0]!]!.part)
        yield [list[one]!, list[other]!];
}
