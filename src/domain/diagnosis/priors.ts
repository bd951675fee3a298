import type { Network } from '@/domain/network/types';
import { failureShare } from '@/domain/parts/failure-shares';
import { incidentFactor } from '@/domain/parts/incident-factors';
import { kindRate } from '@/domain/parts/kind-rates';
import type { Incident } from '@/domain/parts/kinds';
import { HEALTHY_PRIOR, PUBLISHED_WEIGHT, SHARED_CAUSE, SHARING_INCIDENTS } from './assumptions';
import type { PartMode } from './modes';
import type { SeenFault } from './types';

/** A part's chance to fail is never taken above this before the readings are heard. */
const MOST_LIKELY = 0.6;

export interface Priors {
  /** Odds of each single fault against its part being sound. */
  readonly odds: Float64Array;
  /** Shared-cause factor of two parts, part by part, row by row, rows of `parts`. */
  readonly shared: Float64Array;
  readonly parts: number;
  /** Odds of the healthy network on the same scale as a product of fault odds. */
  readonly healthy: number;
  /** Sum of all hypotheses' odds: divide by it for a probability. */
  readonly total: number;
}

/**
 * Prior odds: kind rate × mode share × incident factor, moved by the board's own closed tickets as a
 * Dirichlet-multinomial. A pair's odds are the product of both, times the shared-cause factor; the healthy
 * network's are set so that its probability before any reading is that of {@link HEALTHY_PRIOR}.
 */
export function priorsOf(
  network: Network,
  modes: readonly PartMode[],
  incident: Incident,
  seen: readonly SeenFault[] = [],
): Priors {
  const odds = learned(network, modes, published(network, modes, incident), seen);
  const shared = sharedCauses(network, incident);
  let faulty = 0;
  for (let j = 0; j < modes.length; j++) {
    faulty += odds[j]!;
    const row = modes[j]!.part * network.parts.length;
    for (let k = 0; k < j; k++)
      if (modes[k]!.part !== modes[j]!.part)
        faulty += odds[j]! * odds[k]! * shared[row + modes[k]!.part]!;
  }
  const prior = HEALTHY_PRIOR[incident];
  const healthy = (faulty * prior) / (1 - prior);
  return { odds, shared, parts: network.parts.length, healthy, total: healthy + faulty };
}

function published(network: Network, modes: readonly PartMode[], incident: Incident): Float64Array {
  const chance = Float64Array.from(modes, ({ part, mode }) => {
    const { kind } = network.parts[part]!;
    return kindRate(kind) * failureShare(kind, mode) * incidentFactor(incident, kind, mode);
  });
  const ofPart = new Float64Array(network.parts.length);
  modes.forEach(({ part }, index) => (ofPart[part]! += chance[index]!));
  return chance.map((value, index) => {
    const sum = ofPart[modes[index]!.part]!;
    const capped = Math.min(sum, MOST_LIKELY);
    return (value * (capped / sum)) / (1 - capped);
  });
}

/** Posterior mean of a Dirichlet whose pseudo-counts are the published odds; their sum stays. */
function learned(
  network: Network,
  modes: readonly PartMode[],
  odds: Float64Array,
  seen: readonly SeenFault[],
): Float64Array {
  const times = modes.map(({ part, mode }) => {
    const ref = network.parts[part]!.ref;
    return seen.reduce((n, s) => n + (s.ref === ref && s.mode === mode ? s.times : 0), 0);
  });
  const tickets = times.reduce((sum, n) => sum + n, 0);
  if (tickets === 0) return odds;
  const sum = odds.reduce((total, value) => total + value, 0);
  return odds.map(
    (value, index) =>
      (sum * (PUBLISHED_WEIGHT * (value / sum) + times[index]!)) / (PUBLISHED_WEIGHT + tickets),
  );
}

/** {@link SHARED_CAUSE} for parts that meet on a net (closed contacts count as one net), else 1. */
function sharedCauses(network: Network, incident: Incident): Float64Array {
  const count = network.parts.length;
  const shared = new Float64Array(count * count).fill(1);
  if (!SHARING_INCIDENTS.has(incident)) return shared;
  const same = new Map<string, string>();
  const root = (net: string): string => {
    let at = net;
    for (let up = same.get(at); up !== undefined; up = same.get(at)) at = up;
    return at;
  };
  for (const part of network.parts) {
    const [a, b] = part.nets.map(root) as [string, string];
    if (part.kind === 'contact' && a !== b) same.set(a, b);
  }
  const nets = network.parts.map((part) => part.nets.map(root));
  for (let j = 0; j < count; j++)
    for (let k = 0; k < count; k++)
      if (nets[j]!.some((net) => nets[k]!.includes(net))) shared[j * count + k] = SHARED_CAUSE;
  return shared;
}
