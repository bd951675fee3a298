import { COARSE, nodesFor } from './grid';
import type { Posterior } from './posterior';
import { workshopOf } from './posterior';
import { screen } from './screen';
import { setTrial } from './trial';

/** What may be the case, in single resistances: a hypothesis at one of its likely nodes. */
export interface Particle {
  /** Number of the hypothesis among those kept. */
  readonly hypothesis: number;
  readonly j: number;
  readonly k: number;
  readonly lnJ: number;
  readonly lnK: number;
  readonly weight: number;
}

const MOST_HYPOTHESES = 40;
const MOST_NODES = 3;
/** Nodes less likely than this share of the best are left out. */
const SLIGHT = 0.1;

/** The likeliest hypotheses as particles; the weights sum to 1. */
export function particlesOf(posterior: Posterior, order: readonly number[]): Particle[] {
  const particles: Particle[] = [];
  // With a certain fault built in, only what includes it can be set up beside the others.
  const usable = order.filter(
    (index) => workshopOf(posterior, posterior.hypotheses[index]!) === posterior.workshop,
  );
  usable.slice(0, MOST_HYPOTHESES).forEach((index, hypothesis) => {
    const { j, k } = posterior.hypotheses[index]!;
    const probability = posterior.probability[index]!;
    const nodes = likelyNodes(posterior, j, k);
    const sum = nodes.reduce((total, node) => total + node.weight, 0);
    for (const { lnJ, lnK, weight } of nodes)
      particles.push({ hypothesis, j, k, lnJ, lnK, weight: (probability * weight) / sum });
  });
  const sum = particles.reduce((total, particle) => total + particle.weight, 0);
  return particles.map((particle) => ({ ...particle, weight: particle.weight / sum }));
}

interface Node {
  readonly lnJ: number;
  readonly lnK: number;
  readonly weight: number;
}

function likelyNodes({ workshop }: Posterior, j: number, k: number): Node[] {
  if (j < 0) return [{ lnJ: 0, lnK: 0, weight: 1 }];
  const { scene, evidence, trial } = workshop;
  const [a, b] = nodesFor(scene, evidence, trial, j, k, COARSE);
  const found: Node[] = [];
  for (const lnJ of unseen(scene.modes[j]!, a))
    for (const lnK of k < 0 ? [0] : unseen(scene.modes[k]!, b)) {
      setTrial(scene, trial, j, lnJ, k, lnK);
      found.push({ lnJ, lnK, weight: screen(evidence, trial, a.spread, b.spread) });
    }
  found.sort((x, y) => y.weight - x.weight).splice(MOST_NODES);
  const best = found[0]!.weight;
  return found
    .map((node) => ({ ...node, weight: Math.exp(node.weight - best) }))
    .filter((node) => node.weight >= SLIGHT);
}

/** Where no reading sees the mode's range, two places in it stand for all of it. */
function unseen(
  { low, high, mode }: { low: number; high: number; mode: string },
  nodes: { at: readonly number[]; spread: number },
): readonly number[] {
  if (nodes.spread > 0 || mode === 'open') return nodes.at;
  return [low + 0.3 * (high - low), low + 0.8 * (high - low)];
}
