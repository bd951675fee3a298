import type { ForcedPart } from '@/domain/network/types';
import type { Fitted } from './fit';
import { fit } from './fit';
import { faultsIn, modesIn } from './hypothesis';
import type { Posterior } from './posterior';
import { workshopOf } from './posterior';
import type { Fault } from './types';
import type { Workshop } from './workshop';

/** Hypotheses looked at closely, for words and doubts. */
const LEADERS = 6;

export interface Leader extends Fitted {
  /** The faulty parts as a prediction takes them. */
  readonly forced: readonly ForcedPart[];
  readonly faults: readonly Fault[];
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
  return order.slice(0, LEADERS).map((index) => {
    const hypothesis = posterior.hypotheses[index]!;
    const workshop = workshopOf(posterior, hypothesis);
    const fitted = fit(workshop, hypothesis);
    const forced = forcedParts(workshop, fitted);
    const faults = faultsIn(posterior.plain.scene, hypothesis);
    return { ...fitted, forced, faults, probability: posterior.probability[index]! };
  });
}

/** The parts of a fitted hypothesis with their resistances, in the order of the network. */
function forcedParts({ scene, given }: Workshop, fitted: Fitted): ForcedPart[] {
  const { j, k } = fitted.hypothesis;
  const lnOhms = new Map([
    [j, fitted.lnJ],
    [k, fitted.lnK],
  ]);
  if (given !== undefined) lnOhms.set(given.mode, given.lnOhms);
  return modesIn(fitted.hypothesis).map((m) => {
    const { part, mode } = scene.modes[m]!;
    const ohms = mode === 'open' ? ('OL' as const) : Math.exp(lnOhms.get(m)!);
    return { ref: scene.network.parts[part]!.ref, mode, ohms };
  });
}
