import { pairBounds } from './pair-bounds';
import { COARSE, MEDIUM } from './grid';
import { reachOf } from './reach';
import type { Singles } from './singles';
import { screened, weighed } from './weigh';
import type { Workshop } from './workshop';

/** One hypothesis: up to two modes (−1: none), and its weight. */
export interface Hypothesis {
  readonly j: number;
  readonly k: number;
  /** ln of prior odds × likelihood. */
  readonly log: number;
}

/** Pairs whose bound lies this far (ln) below the best hypothesis are dropped: e⁻¹⁴ is 8·10⁻⁷. */
const HOPELESS = 14;
/** How many pairs are screened, and how many of them are weighed with the full covariance. */
const MOST_SCREENED = 1500;
const MOST_WEIGHED = 120;
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
  const logOdds = priors.odds.map(Math.log);
  const logShared = priors.shared.map(Math.log);
  const bounds = pairBounds(scene, evidence, reachOf(scene));
  const found: Hypothesis[] = [];
  const candidates: Candidate[] = [];
  for (let j = 1; j < scene.modes.length; j++) {
    const partJ = scene.modes[j]!.part;
    for (let k = 0; k < j; k++) {
      const partK = scene.modes[k]!.part;
      if (partJ === partK) continue;
      const prior = logOdds[j]! + logOdds[k]! + logShared[partJ * scene.parts + partK]!;
      if (bounds.apart(j, k)) {
        const log = prior + singles.healthy + singles.gain[j]! + singles.gain[k]!;
        if (log > best - HOPELESS) found.push({ j, k, log });
        continue;
      }
      const log = prior + bounds.bound(j, k, best - HOPELESS - prior);
      if (log <= best - HOPELESS) continue;
      if (bounds.still())
        found.push({ j, k, log: prior + singles.healthy + singles.gain[j]! + singles.gain[k]! });
      else candidates.push({ j, k, prior, log });
    }
  }
  candidates.sort((a, b) => b.log - a.log).splice(MOST_SCREENED);
  for (const one of candidates)
    one.log = one.prior + screened(scene, evidence, trial, one.j, one.k, COARSE);
  candidates.sort((a, b) => b.log - a.log);
  candidates.forEach(({ j, k, prior, log }, rank) => {
    if (log < best - HOPELESS) return;
    const full =
      rank < MOST_WEIGHED && log > best - SLIGHT
        ? prior + weighed(scene, evidence, trial, joint, j, k, MEDIUM).logLikelihood
        : log + correction(singles, j, k);
    found.push({ j, k, log: full });
  });
  return found;
}

/** What the full covariance changed for the single fault that explains more of the readings. */
function correction(singles: Singles, j: number, k: number): number {
  const better = singles.screened[j]! > singles.screened[k]! ? j : k;
  return singles.joint[better]! - singles.screened[better]!;
}
