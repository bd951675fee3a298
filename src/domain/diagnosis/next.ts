import type { Told } from './information';
import { mutualInformation } from './information';
import { particlesOf } from './particles';
import type { Posterior } from './posterior';
import { quickBits } from './quick-bits';
import type { Scene, Setting } from './scene';
import { settingIndex } from './scene';
import type { Candidate } from './sweep';
import { dropsOf, sweep } from './sweep';
import { boundAt, toleranceBound } from './tolerance-bound';
import type { NextReading, PartStanding, Reading } from './types';

/** Efforts by which bits are divided. */
export const COSTS = { here: 1, turn: 1.5, lift: 10 } as const;
/** How many are proposed, how many are weighed by quadrature, and how many leads may be lifted. */
const PROPOSED = 5;
const WEIGHED = 24;
const LIFTED = 3;
/** A reading that promises less is not worth proposing, bits. */
const LEAST_BITS = 0.02;
/** Lifting a lead is thought of only when no reading in circuit gives this much per effort, bits. */
const ENOUGH = 0.25;
/** Variance of ln R shown by a usual meter: 0.8 % and three counts in some two thousand. */
const METER_VARIANCE = 3e-5;
/** Of readings that tell about the same, one across a single part is the easiest to take and to read. */
const ACROSS_PART = 1.03;

/**
 * The readings that would tell most for their effort: one step ahead, over all pairs of nets at every switch
 * position, and with a suspect's lead lifted where nothing in circuit helps. Best bits per cost first.
 */
export function nextReadings(
  posterior: Posterior,
  order: readonly number[],
  readings: readonly Reading[],
  parts: readonly PartStanding[],
): NextReading[] {
  const { scene } = posterior.workshop;
  const { positions } = scene.network;
  const here = readings.at(-1)?.position ?? positions[0];
  const particles = particlesOf(posterior, order);
  const quick = quickBits(particles);
  const search = (wanted: readonly { setting: number; cost: number }[], among: Scene) => {
    const drops = dropsOf(among, particles);
    return wanted.flatMap(({ setting, cost }) =>
      sweep(among, drops, setting, cost, quick, LEAST_BITS),
    );
  };
  const settings: Setting[] = [...scene.settings];
  const wide: Scene = { ...scene, settings };
  const inCircuit = (positions.length > 0 ? positions : [undefined]).map((position) => ({
    setting: settingIndex(scene.network, scene.modes, settings, { position }),
    cost: position === here ? COSTS.here : COSTS.turn,
  }));
  const bound = toleranceBound(scene);
  const weigh = (candidates: Candidate[]): Scored[] =>
    best(candidates.filter((one) => !taken(one, wide, readings))).map((one) => ({
      ...one,
      ...told(one, particles, bound),
    }));
  let scored = weigh(search(inCircuit, wide));
  if (scored.every(({ bits, cost }) => bits / cost < ENOUGH)) {
    const lifts = liftable(parts).map((ref) => ({
      setting: settingIndex(scene.network, scene.modes, settings, {
        position: here,
        lifted: [ref],
      }),
      cost: COSTS.lift,
    }));
    scored = [...scored, ...weigh(search(lifts, wide))];
  }
  return distinct(
    scored.filter(({ bits }) => bits >= LEAST_BITS),
    wide,
  ).map((one) => named(one, wide));
}

type Scored = Candidate & Told;

function best(candidates: Candidate[]): Candidate[] {
  return candidates.sort((x, y) => y.quick / y.cost - x.quick / x.cost).slice(0, WEIGHED);
}

function told(
  { shown }: Candidate,
  particles: readonly { hypothesis: number; weight: number }[],
  bound: Float64Array,
): Told {
  return mutualInformation({
    count: shown.length,
    hypothesis: particles.map((particle) => particle.hypothesis),
    weight: particles.map((particle) => particle.weight),
    shown,
    doubt: shown.map((ln) =>
      Math.sqrt(METER_VARIANCE + (ln === Infinity ? 0 : boundAt(bound, 0, ln))),
    ),
  });
}

/** Suspects that are neither certain nor unlikely: lifting their lead may settle it. */
function liftable(parts: readonly PartStanding[]): string[] {
  return parts
    .filter(({ standing, fault }) => standing === 'suspect' && fault < 0.98)
    .sort((x, y) => y.fault - x.fault)
    .slice(0, LIFTED)
    .map(({ ref }) => ref);
}

function netNames(scene: Scene): string[] {
  return [...scene.numbers.keys()];
}

function taken(candidate: Candidate, scene: Scene, readings: readonly Reading[]): boolean {
  const names = netNames(scene);
  const [a, b] = [names[candidate.a], names[candidate.b]];
  const { position, lifted } = scene.settings[candidate.setting]!;
  return readings.some(
    (reading) =>
      (reading.position ?? scene.network.positions[0]) === position &&
      [...(reading.lifted ?? [])].sort().join('\n') === lifted.join('\n') &&
      ((reading.from === a && reading.to === b) || (reading.from === b && reading.to === a)),
  );
}

/** The best by bits per cost, leaving out those that ask what a better one asks. */
function distinct(scored: readonly Scored[], scene: Scene): Scored[] {
  const edges = scene.settings[0]!.base.prepared.circuit.edges;
  const across = ({ a, b }: Scored): boolean =>
    edges.some((edge) => (edge.a === a && edge.b === b) || (edge.a === b && edge.b === a));
  const value = (one: Scored): number => (one.bits / one.cost) * (across(one) ? ACROSS_PART : 1);
  const kept: Scored[] = [];
  for (const one of [...scored].sort((x, y) => value(y) - value(x))) {
    if (kept.length === PROPOSED) break;
    if (!kept.some((other) => other.question === one.question)) kept.push(one);
  }
  return kept;
}

function named({ a, b, setting, bits, cost }: Scored, scene: Scene): NextReading {
  const names = netNames(scene);
  const { position, lifted } = scene.settings[setting]!;
  return { from: names[a]!, to: names[b]!, position: position ?? '', lifted, bits, cost };
}
