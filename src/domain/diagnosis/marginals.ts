import type { Mode } from '@/domain/parts/kinds';
import type { Posterior } from './posterior';

/** Probability of each single fault, alone or in a pair, by the readings and before them. */
export interface Marginals {
  readonly after: Float64Array;
  readonly before: Float64Array;
  /** Entropy of the hypotheses, bits. */
  readonly entropy: number;
}

export function marginalsOf(posterior: Posterior): Marginals {
  const { scene, priors } = posterior.plain;
  const after = new Float64Array(scene.modes.length);
  let entropy = 0;
  posterior.hypotheses.forEach(({ given, j, k }, index) => {
    const p = posterior.probability[index]!;
    if (given >= 0) after[given]! += p;
    if (j >= 0) after[j]! += p;
    if (k >= 0) after[k]! += p;
    if (p > 0) entropy -= p * Math.log2(p);
  });
  const before = Float64Array.from(priors.odds, (odds, j) => {
    const part = scene.modes[j]!.part;
    let withOthers = odds;
    scene.modes.forEach((other, k) => {
      if (other.part !== part)
        withOthers += odds * priors.odds[k]! * priors.shared[part * scene.parts + other.part]!;
    });
    return withOthers / priors.total;
  });
  return { after, before, entropy: Math.max(0, entropy) };
}

/** Sum over a part's modes, and each mode's own figure. */
export function ofPart(
  posterior: Posterior,
  figures: Float64Array,
  part: number,
): { sum: number; modes: Partial<Record<Mode, number>> } {
  const modes: Partial<Record<Mode, number>> = {};
  let sum = 0;
  posterior.workshop.scene.modes.forEach((one, index) => {
    if (one.part !== part) return;
    modes[one.mode] = figures[index]!;
    sum += figures[index]!;
  });
  return { sum: Math.min(1, sum), modes };
}
