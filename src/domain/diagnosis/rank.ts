import { fit } from './fit';
import type { Hypothesis } from './hypothesis';
import { modesIn } from './hypothesis';
import type { Posterior } from './posterior';
import { normalised, weighAll } from './posterior';
import type { Case, Workshop } from './workshop';
import { openWorkshop } from './workshop';

/** A fault this probable may be taken as given. */
const CERTAIN = 0.9;
/** Readings ask for two faults when the best pair's likelihood beats either fault's own by this much, ln. */
const ASKED = 4;

/**
 * Weighs the healthy network, every single fault and every pair. Where the readings make one pair stand out,
 * each of its faults in turn is built in and all others are weighed again in ones and twos beside it: up to
 * three faults, where it matters, so that no part is cleared only because two were enough.
 * @throws RangeError when a probe names a net that is not in the network.
 */
export function rank(one: Case): Posterior {
  const plain = openWorkshop(one);
  const { hypotheses, singles } = weighAll(plain);
  const probability = normalised(hypotheses);
  const shallow = { workshop: plain, plain, deep: [], hypotheses, probability };
  const best = likeliest(shallow);
  if (best.k < 0) return shallow;
  const certain = [best.j, best.k].filter((m) => chanceOf(shallow, m) >= CERTAIN);
  const likelihood = best.log - logPrior(plain, best);
  const asked = certain.every((m) => likelihood > singles.joint[m]! + ASKED);
  if (certain.length === 0 || !asked) return shallow;

  const { lnJ, lnK } = fit(plain, best);
  const deep = certain.map((mode) =>
    openWorkshop(one, { mode, lnOhms: mode === best.j ? lnJ : lnK }),
  );
  const further = deep.map((workshop) => rescaled(weighAll(workshop).hypotheses, best));
  return joined(plain, deep, [hypotheses.filter((h) => !has(h, certain)), ...further]);
}

/** Brings hypotheses beside a given fault to the scale of the pair that was weighed both ways. */
function rescaled(further: readonly Hypothesis[], best: Hypothesis): Hypothesis[] {
  const pair = modesIn(best).join();
  const same = further.find((h) => modesIn(h).join() === pair);
  if (same === undefined) return [];
  return further.map((h) => ({ ...h, log: h.log + best.log - same.log }));
}

/** Joins the sets; what two of them hold is taken from the workshop that holds more of what is likely. */
function joined(
  plain: Workshop,
  deep: readonly Workshop[],
  sets: readonly (readonly Hypothesis[])[],
): Posterior {
  const [rest, ...further] = sets as [readonly Hypothesis[], ...Hypothesis[][]];
  const mass = further.map((set) => set.reduce((sum, h) => sum + Math.exp(h.log - topOf(sets)), 0));
  const order = [...further.keys()].sort((a, b) => mass[b]! - mass[a]!);
  const count = plain.scene.modes.length + 1;
  const keyOf = (hypothesis: Hypothesis): number =>
    modesIn(hypothesis).reduce((key, mode) => key * count + mode + 1, 0);
  const known = new Set<number>();
  const hypotheses = [...rest];
  for (const index of order)
    for (const hypothesis of further[index]!) {
      const key = keyOf(hypothesis);
      if (known.has(key)) continue;
      known.add(key);
      hypotheses.push(hypothesis);
    }
  const workshop = deep[order[0]!]!;
  return { workshop, plain, deep, hypotheses, probability: normalised(hypotheses) };
}

function topOf(sets: readonly (readonly Hypothesis[])[]): number {
  let top = -Infinity;
  for (const set of sets) for (const { log } of set) top = Math.max(top, log);
  return top;
}

function has({ j, k }: Hypothesis, modes: readonly number[]): boolean {
  return modes.includes(j) || modes.includes(k);
}

function likeliest({ hypotheses, probability }: Posterior): Hypothesis {
  let best = 0;
  for (let i = 1; i < probability.length; i++) if (probability[i]! > probability[best]!) best = i;
  return hypotheses[best]!;
}

function chanceOf({ hypotheses, probability }: Posterior, mode: number): number {
  return hypotheses.reduce((sum, h, i) => sum + (has(h, [mode]) ? probability[i]! : 0), 0);
}

function logPrior({ scene, priors }: Workshop, { j, k }: Hypothesis): number {
  const shared = priors.shared[scene.modes[j]!.part * priors.parts + scene.modes[k]!.part]!;
  return Math.log(priors.odds[j]! * priors.odds[k]! * shared);
}
