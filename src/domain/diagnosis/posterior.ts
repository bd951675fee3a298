import type { Hypothesis } from './pairs';
import { rankPairs } from './pairs';
import { weighSingles } from './singles';
import type { Workshop } from './workshop';

/** Hypotheses with their probabilities; those of no account are left out, their sum is `dropped`. */
export interface Posterior {
  readonly workshop: Workshop;
  readonly hypotheses: readonly Hypothesis[];
  readonly probability: Float64Array;
}

/** Weighs the healthy network, every single fault and every pair. */
export function posteriorOf(workshop: Workshop): Posterior {
  const { scene, priors } = workshop;
  const singles = weighSingles(workshop);
  const hypotheses: Hypothesis[] = [
    { j: -1, k: -1, log: Math.log(priors.healthy) + singles.healthy },
  ];
  scene.modes.forEach((_, j) =>
    hypotheses.push({ j, k: -1, log: Math.log(priors.odds[j]!) + singles.joint[j]! }),
  );
  const least = Math.max(...hypotheses.map((h) => h.log));
  // Hundreds of parts make more pairs than a call takes arguments.
  const all = hypotheses.concat(rankPairs(workshop, singles, least));
  return { workshop, hypotheses: all, probability: normalised(all) };
}

function normalised(hypotheses: readonly Hypothesis[]): Float64Array {
  let top = -Infinity;
  for (const { log } of hypotheses) if (log > top) top = log;
  const weights = Float64Array.from(hypotheses, ({ log }) => Math.exp(log - top));
  let sum = 0;
  for (const weight of weights) sum += weight;
  return weights.map((weight) => weight / sum);
}
