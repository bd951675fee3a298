import type { Hypothesis } from './hypothesis';
import { rankPairs } from './pairs';
import type { Singles } from './singles';
import { weighSingles } from './singles';
import type { Workshop } from './workshop';

/** Hypotheses with their probabilities. The first is the healthy network; those of no account are left out. */
export interface Posterior {
  /** Where most of what is likely was weighed: with a certain fault built in, if there is one. */
  readonly workshop: Workshop;
  /** Where hypotheses without a given fault were weighed. */
  readonly plain: Workshop;
  /** Where those with a given fault were. */
  readonly deep: readonly Workshop[];
  readonly hypotheses: readonly Hypothesis[];
  readonly probability: Float64Array;
}

/** Everything weighed in one workshop: its healthy network first, every single fault, every pair. */
export interface Weights {
  readonly hypotheses: readonly Hypothesis[];
  readonly singles: Singles;
}

/** Weighs the healthy network (or the given fault alone), every single fault and every pair. */
export function weighAll(workshop: Workshop): Weights {
  const { scene, priors } = workshop;
  const given = workshop.given?.mode ?? -1;
  const singles = weighSingles(workshop);
  const healthy = Math.log(given < 0 ? priors.healthy : 1) + singles.healthy;
  const hypotheses: Hypothesis[] = [{ given, j: -1, k: -1, log: healthy }];
  scene.modes.forEach((_, j) => {
    const log = Math.log(priors.odds[j]!) + singles.joint[j]!;
    if (log > -Infinity) hypotheses.push({ given, j, k: -1, log });
  });
  let best = -Infinity;
  for (const { log } of hypotheses) best = Math.max(best, log);
  // Hundreds of parts make more pairs than a call takes arguments.
  return { hypotheses: hypotheses.concat(rankPairs(workshop, singles, best)), singles };
}

/** The workshop in which a hypothesis can be set up. */
export function workshopOf({ plain, deep }: Posterior, hypothesis: Hypothesis): Workshop {
  return deep.find(({ given }) => given!.mode === hypothesis.given) ?? plain;
}

/** Probabilities from ln weights. */
export function normalised(hypotheses: readonly Hypothesis[]): Float64Array {
  const weights = new Float64Array(hypotheses.length);
  let top = -Infinity;
  for (let i = 0; i < weights.length; i++) top = Math.max(top, hypotheses[i]!.log);
  let sum = 0;
  for (let i = 0; i < weights.length; i++) {
    weights[i] = Math.exp(hypotheses[i]!.log - top);
    sum += weights[i]!;
  }
  for (let i = 0; i < weights.length; i++) weights[i]! /= sum;
  return weights;
}
