import type { ForcedPart } from '@/domain/network/types';
import type { Fitted } from './fit';
import { fit } from './fit';
import type { Posterior } from './posterior';
import type { Workshop } from './workshop';

/** Hypotheses looked at closely, for words and doubts. */
const LEADERS = 6;

export interface Leader extends Fitted {
  readonly probability: number;
}

/** Indices of the hypotheses, likeliest first; the healthy network is index 0. */
export function byProbability({ probability }: Posterior): number[] {
  const order: number[] = [];
  for (let index = 0; index < probability.length; index++)
    if (probability[index]! > 0) order.push(index);
  return order.sort((a, b) => probability[b]! - probability[a]!);
}

/** The likeliest hypotheses, the healthy network among them where it is one, each fitted to the readings. */
export function leadersOf(posterior: Posterior, order: readonly number[]): Leader[] {
  return order.slice(0, LEADERS).map((index) => ({
    ...fit(posterior.workshop, posterior.hypotheses[index]!),
    probability: posterior.probability[index]!,
  }));
}

/** The parts of a fitted hypothesis with their resistances, as a prediction takes them. */
export function forcedParts({ scene }: Workshop, leader: Fitted): ForcedPart[] {
  const { j, k } = leader.hypothesis;
  return [[j, leader.lnJ] as const, [k, leader.lnK] as const].flatMap(([m, ln]) => {
    if (m < 0) return [];
    const { part, mode } = scene.modes[m]!;
    const ohms = mode === 'open' ? ('OL' as const) : Math.exp(ln);
    return [{ ref: scene.network.parts[part]!.ref, mode, ohms }];
  });
}
