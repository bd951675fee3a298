import { groupsOf } from './told-apart';
import { marginalsOf } from './marginals';
import { observe } from './meter';
import { doubtsOf } from './doubts';
import { byProbability, leadersOf } from './leaders';
import { nextReadings } from './next';
import type { Posterior } from './posterior';
import { posteriorOf } from './posterior';
import { reasonsOf } from './reasons';
import { standingsOf } from './standings';
import type { DiagnosisAnswer, DiagnosisInput, Fault, RankedHypothesis } from './types';
import { openWorkshop } from './workshop';

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
  const workshop = openWorkshop(
    input.network,
    input.readings,
    input.readings.map(observe),
    input.incident ?? 'unknown',
    input.seen,
  );
  const posterior = posteriorOf(workshop);
  const marginals = marginalsOf(posterior);
  const parts = standingsOf(posterior, marginals);
  const groups = groupsOf(posterior, marginals, parts);
  const order = byProbability(posterior);
  const leaders = leadersOf(posterior, order);
  return {
    healthy: posterior.probability[0]!,
    entropy: marginals.entropy,
    hypotheses: ranked(posterior, order, input.limit ?? DEFAULT_LIMIT),
    parts,
    groups,
    next: input.next === false ? [] : nextReadings(posterior, order, input.readings, parts),
    doubtful: doubtsOf(input.network, input.readings, workshop, leaders),
    reasons: reasonsOf(input, workshop, leaders, parts, groups),
  };
}

/** The likeliest faulty hypotheses, best first. */
function ranked(posterior: Posterior, order: readonly number[], limit: number): RankedHypothesis[] {
  const { scene } = posterior.workshop;
  const faulty = order.filter((index) => index !== 0);
  return faulty.slice(0, limit).map((index) => {
    const { j, k } = posterior.hypotheses[index]!;
    const faults: Fault[] = [j, k]
      .filter((m) => m >= 0)
      .sort((a, b) => a - b)
      .map((m) => ({
        ref: scene.network.parts[scene.modes[m]!.part]!.ref,
        mode: scene.modes[m]!.mode,
      }));
    return { faults, probability: posterior.probability[index]! };
  });
}
