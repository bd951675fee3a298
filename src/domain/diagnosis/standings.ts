import type { Standing } from '@/domain/parts/kinds';
import type { Marginals } from './marginals';
import { ofPart } from './marginals';
import type { Posterior } from './posterior';
import { setTrial, trialOhms } from './trial';
import type { PartStanding } from './types';

/** A reading notices a fault that moves it by this many standard deviations of the meter. */
const NOTICED = 2;
/** A part that may have failed with less than this is cleared, if the readings can see it at all. */
const CLEARED = 0.02;
/** So is one whose odds the readings cut to less than this share of what they were. */
const CUT = 0.3;
/** A part no reading sees is a suspect all the same from here. */
const SUSPECT = 0.5;

/** Standing of every part, in the order of the network. */
export function standingsOf(posterior: Posterior, marginals: Marginals): PartStanding[] {
  const { scene } = posterior.workshop;
  const seen = seenParts(posterior);
  return scene.network.parts.map((part, index) => {
    const after = ofPart(posterior, marginals.after, index);
    const before = ofPart(posterior, marginals.before, index);
    const standing = standingOf(after.sum, before.sum, seen[index] === 1);
    return { ref: part.ref, standing, fault: after.sum, modes: after.modes };
  });
}

function standingOf(after: number, before: number, seen: boolean): Standing {
  if (!seen) return after >= SUSPECT ? 'suspect' : 'untouched';
  return after < CLEARED || after < CUT * before ? 'cleared' : 'suspect';
}

/** 1 for every part of which some mode, on its own, would move some reading by more than the meter's doubt. */
function seenParts({ workshop, hypotheses, probability }: Posterior): Uint8Array {
  const { scene, evidence, trial } = workshop;
  const seen = new Uint8Array(scene.parts);
  scene.modes.forEach((mode, m) => {
    for (const end of [mode.low, mode.high]) {
      if (seen[mode.part] === 1) return;
      setTrial(scene, trial, m, end, -1, 0);
      for (let r = 0; r < evidence.count; r++) {
        const shown = Math.log(trialOhms(evidence, trial, r) + evidence.floor[r]!);
        const top = evidence.over[r] === 1 ? evidence.y[r]! : Infinity;
        const step = Math.abs(Math.min(shown, top) - Math.min(evidence.healthy[r]!, top));
        if (step > NOTICED * evidence.deviation[r]!) seen[mode.part] = 1;
      }
    }
  });
  // A fault that only shows beside another counts once the two together are likely.
  hypotheses.forEach(({ j, k }, index) => {
    if (probability[index]! < SUSPECT) return;
    for (const m of [j, k]) if (m >= 0) seen[scene.modes[m]!.part] = 1;
  });
  return seen;
}
