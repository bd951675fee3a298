import type { Standing } from '@/domain/parts/kinds';
import { modesIn } from './hypothesis';
import type { Marginals } from './marginals';
import { ofPart } from './marginals';
import type { Posterior } from './posterior';
import { setTrial, trialOhms } from './trial';
import type { PartStanding } from './types';
import type { Workshop } from './workshop';

/** A reading notices a fault that moves it by this many standard deviations of the meter. */
const NOTICED = 2;
/** A part is a suspect from this probability on, where the readings raised it by this factor. */
const SUSPECT = 0.05;
const RAISED = 1.2;
/** So is a rare one that they raised more. */
const RARE = 0.01;
const RAISED_RARE = 2;
/** A part is cleared when the readings cut its odds below this share of what they were. */
const CUT = 0.5;
/** A likely one is a suspect whatever the readings say of it: the incident alone accuses it. */
const LIKELY = 0.5;

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
  if (after >= LIKELY) return 'suspect';
  if (!seen) return 'untouched';
  if (after >= SUSPECT && after >= RAISED * before) return 'suspect';
  if (after >= RARE && after >= RAISED_RARE * before) return 'suspect';
  return after < CUT * before ? 'cleared' : 'untouched';
}

/** 1 for every part of which some mode would move some reading by more than the meter's doubt. */
function seenParts(posterior: Posterior): Uint8Array {
  const { plain, deep, hypotheses, probability } = posterior;
  const seen = new Uint8Array(plain.scene.parts);
  for (const one of [plain, ...deep]) markMoving(one, seen);
  // A fault that only shows beside another counts once the two together are likely.
  hypotheses.forEach((hypothesis, index) => {
    if (probability[index]! < LIKELY) return;
    for (const m of modesIn(hypothesis)) seen[plain.scene.modes[m]!.part] = 1;
  });
  return seen;
}

function markMoving({ scene, evidence, trial }: Workshop, seen: Uint8Array): void {
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
}
