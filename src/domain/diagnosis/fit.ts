import { FINE } from './grid';
import type { Hypothesis } from './hypothesis';
import { screen } from './screen';
import { setTrial } from './trial';
import { weighed } from './weigh';
import type { Workshop } from './workshop';

/** A hypothesis with the resistances of its faults that explain the readings best. */
export interface Fitted {
  readonly hypothesis: Hypothesis;
  readonly lnJ: number;
  readonly lnK: number;
  /** Chance that each reading is a misprobe, if the hypothesis holds. */
  readonly doubt: Float64Array;
}

/** Spreads of the faults' ln Ω, step by step: as far as each step may look. */
const LOOKS = [0.6, 0.4, 0.3, 0.2, 0.2];

/**
 * Fits the resistances: from the best node of the grid, steps of Gauss and Newton, each the estimate that the
 * readings leave of the faults' resistances (see `screen`).
 */
export function fit(workshop: Workshop, hypothesis: Hypothesis): Fitted {
  const { scene, evidence, trial, joint } = workshop;
  const { j, k } = hypothesis;
  let { lnJ, lnK } = weighed(scene, evidence, trial, joint, j, k, FINE);
  const doubt = new Float64Array(evidence.count);
  const free = (mode: number): number => (mode >= 0 && scene.modes[mode]!.mode !== 'open' ? 1 : 0);
  const within = (mode: number, ln: number): number =>
    mode < 0 ? ln : Math.min(scene.modes[mode]!.high, Math.max(scene.modes[mode]!.low, ln));
  let best = -Infinity;
  let [atJ, atK] = [lnJ, lnK];
  for (const look of LOOKS) {
    setTrial(scene, trial, j, atJ, k, atK);
    screen(evidence, trial, look * free(j), look * free(k));
    const [nextJ, nextK] = [within(j, atJ + trial.shiftJ), within(k, atK + trial.shiftK)];
    setTrial(scene, trial, j, nextJ, k, nextK);
    const value = screen(evidence, trial, 0, 0, doubt);
    [atJ, atK] = [nextJ, nextK];
    if (value < best) continue;
    best = value;
    [lnJ, lnK] = [atJ, atK];
  }
  setTrial(scene, trial, j, lnJ, k, lnK);
  screen(evidence, trial, 0, 0, doubt);
  return { hypothesis, lnJ, lnK, doubt };
}
