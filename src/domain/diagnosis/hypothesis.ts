import type { Fault } from './types';
import type { Scene } from './scene';

/** One hypothesis: a given fault and up to two more, as indices of the scene's modes (−1: none). */
export interface Hypothesis {
  readonly given: number;
  readonly j: number;
  readonly k: number;
  /** ln of prior odds × likelihood. */
  readonly log: number;
}

/** Modes of the hypothesis in the order of the network; none for the healthy one. */
export function modesIn({ given, j, k }: Hypothesis): number[] {
  const modes: number[] = [];
  for (const mode of [given, j, k]) if (mode >= 0) modes.push(mode);
  return modes.length < 2 ? modes : modes.sort((a, b) => a - b);
}

/** The same as faults by part and mode. */
export function faultsIn(scene: Scene, hypothesis: Hypothesis): Fault[] {
  return modesIn(hypothesis).map((m) => {
    const { part, mode } = scene.modes[m]!;
    return { ref: scene.network.parts[part]!.ref, mode };
  });
}
