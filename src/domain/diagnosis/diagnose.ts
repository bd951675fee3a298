import { groupsOf } from './told-apart';
import { marginalsOf } from './marginals';
import { observe } from './meter';
import type { Posterior } from './posterior';
import { posteriorOf } from './posterior';
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
  return {
    healthy: posterior.probability[0]!,
    entropy: marginals.entropy,
    hypotheses: ranked(posterior, input.limit ?? DEFAULT_LIMIT),
    parts,
    groups: groupsOf(posterior, marginals, parts),
    next: [],
    doubtful: [],
    reasons: [],
  };
}

/** The likeliest faulty hypotheses, best first. */
function ranked(posterior: Posterior, limit: number): RankedHypothesis[] {
  const { scene } = posterior.workshop;
  const order = [...posterior.hypotheses.keys()].slice(1);
  order.sort((a, b) => posterior.probability[b]! - posterior.probability[a]!);
  return order.slice(0, limit).map((index) => {
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
