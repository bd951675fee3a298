import { faultsIn } from './hypothesis';
import { groupsOf } from './told-apart';
import { marginalsOf } from './marginals';
import { observe } from './meter';
import { doubtsOf } from './doubts';
import type { Leader } from './leaders';
import { byProbability, leadersOf } from './leaders';
import { nextReadings } from './next';
import type { Posterior } from './posterior';
import { rank } from './rank';
import { reasonsOf } from './reasons';
import { standingsOf } from './standings';
import type { DiagnosisAnswer, DiagnosisInput, RankedHypothesis } from './types';

export const DEFAULT_LIMIT = 20;

/**
 * Ranks what may have failed, given a network and readings of it: model-based diagnosis (de Kleer and
 * Williams 1987) with Bayes' rule over the healthy network, every single fault and every pair.
 *
 * The network must be free of violations (`violations` of the network area) and the readings must name its
 * nets, positions and parts.
 * @throws RangeError when a reading names a net that is not in the network.
 */
export function diagnose(input: DiagnosisInput): DiagnosisAnswer {
  return diagnoseClosely(input).answer;
}

/** The same, with the likeliest hypotheses (at most six, the healthy network among them) fitted to the readings. */
export function diagnoseClosely(input: DiagnosisInput): {
  answer: DiagnosisAnswer;
  leaders: readonly Leader[];
} {
  const posterior = rank({
    network: input.network,
    probes: input.readings,
    observations: input.readings.map(observe),
    incident: input.incident ?? 'unknown',
    seen: input.seen ?? [],
  });
  const marginals = marginalsOf(posterior);
  const parts = standingsOf(posterior, marginals);
  const groups = groupsOf(posterior, marginals, parts);
  const order = byProbability(posterior);
  const leaders = leadersOf(posterior, order);
  const answer = {
    healthy: posterior.probability[0]!,
    entropy: marginals.entropy,
    hypotheses: ranked(posterior, order, input.limit ?? DEFAULT_LIMIT),
    parts,
    groups,
    next: input.next === false ? [] : nextReadings(posterior, order, input.readings, parts),
    doubtful: doubtsOf(input.network, input.readings, leaders),
    reasons: reasonsOf(input, leaders, parts, groups),
  };
  return { answer, leaders };
}

/** The likeliest faulty hypotheses, best first. */
function ranked(
  { plain, hypotheses, probability }: Posterior,
  order: readonly number[],
  limit: number,
): RankedHypothesis[] {
  const faulty = order.filter((index) => index !== 0).slice(0, limit);
  return faulty.map((index) => ({
    faults: faultsIn(plain.scene, hypotheses[index]!),
    probability: probability[index]!,
  }));
}
