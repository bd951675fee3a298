import type { Marginals } from './marginals';
import { ofPart } from './marginals';
import type { Posterior } from './posterior';
import type { PartStanding } from './types';
import { setTrial, trialOhms } from './trial';

/** Two faults whose readings differ by less than this many standard deviations of the meter look alike. */
const ALIKE = 1;

/**
 * Groups of suspects that these readings cannot tell apart: their likeliest faults, each alone, show the same
 * at every reading.
 */
export function groupsOf(
  posterior: Posterior,
  marginals: Marginals,
  standings: readonly PartStanding[],
): string[][] {
  const { scene } = posterior.workshop;
  const suspects = standings.flatMap(({ standing }, part) =>
    standing === 'suspect' ? [part] : [],
  );
  const looks = suspects.map((part) => lookOf(posterior, marginals, part));
  const groups: number[][] = [];
  suspects.forEach((part, at) => {
    const home = groups.find((group) =>
      alike(posterior, looks[suspects.indexOf(group[0]!)]!, looks[at]!),
    );
    if (home === undefined) groups.push([part]);
    else home.push(part);
  });
  return groups
    .filter((group) => group.length > 1)
    .map((group) => group.map((part) => scene.network.parts[part]!.ref));
}

/** What the part's likeliest fault shows at both ends of its range. */
function lookOf(posterior: Posterior, marginals: Marginals, part: number): Float64Array {
  const { scene, evidence, trial } = posterior.workshop;
  const { modes } = ofPart(posterior, marginals.after, part);
  let likeliest = -1;
  scene.modes.forEach((one, index) => {
    if (one.part !== part) return;
    if (likeliest < 0 || modes[one.mode]! > modes[scene.modes[likeliest]!.mode]!) likeliest = index;
  });
  const { low, high } = scene.modes[likeliest]!;
  const n = evidence.count;
  const look = new Float64Array(2 * n);
  [low, high].forEach((end, which) => {
    setTrial(scene, trial, likeliest, end, -1, 0);
    for (let r = 0; r < n; r++) {
      const shown = Math.log(trialOhms(evidence, trial, r) + evidence.floor[r]!);
      look[which * n + r] = evidence.over[r] === 1 ? Math.min(shown, evidence.y[r]!) : shown;
    }
  });
  return look;
}

function alike(posterior: Posterior, one: Float64Array, other: Float64Array): boolean {
  const { count, deviation } = posterior.workshop.evidence;
  return one.every((value, at) => {
    const step = value === other[at] ? 0 : Math.abs(value - other[at]!);
    return step <= ALIKE * deviation[at % count]!;
  });
}
