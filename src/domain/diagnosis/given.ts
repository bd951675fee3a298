import type { Network } from '@/domain/network/types';
import type { PartMode } from './modes';
import type { Priors } from './priors';

/** A fault taken as certain, at the resistance that fits the readings best. */
export interface Given {
  readonly mode: number;
  readonly lnOhms: number;
}

/** Its resistance stays a little open, as a tolerance: further faults may move the fit. */
const LOOSE = 0.5;
/** An open part's resistance tells nothing apart, Ω. */
const GONE_OHMS = 1e10;

/** The network with the fault built in: what is healthy now is everything else. */
export function networkGiven(
  network: Network,
  modes: readonly PartMode[],
  { mode, lnOhms }: Given,
): Network {
  const fault = modes[mode]!;
  const { parts, positions } = network;
  const ohms = Math.exp(lnOhms);
  if (fault.bridges) {
    // The contact goes on closing where it should: what bridges it lies beside it.
    const { ref, nets } = parts[fault.part]!;
    const bridge = {
      ref: `${ref} bridged`,
      kind: 'resistor',
      nets,
      ohms,
      tolerance: LOOSE,
    } as const;
    return { positions, parts: [...parts, bridge] };
  }
  const changed =
    fault.mode === 'open' ? { ohms: GONE_OHMS, tolerance: 0 } : { ohms, tolerance: LOOSE };
  return {
    positions,
    parts: parts.map((part, index) => (index === fault.part ? { ...part, ...changed } : part)),
  };
}

/**
 * Odds of further faults beside the given one: its own part has no other mode, and what shares a cause with
 * it is likelier. Two further faults that already share its cause gain no more from each other.
 */
export function priorsGiven(priors: Priors, modes: readonly PartMode[], { mode }: Given): Priors {
  const { parts } = priors;
  const given = modes[mode]!.part;
  const withGiven = (part: number): number => priors.shared[given * parts + part]!;
  const odds = priors.odds.map((value, m) =>
    modes[m]!.part === given ? 0 : value * withGiven(modes[m]!.part),
  );
  const shared = priors.shared.map((value, at) => {
    const [one, other] = [Math.floor(at / parts), at % parts];
    return withGiven(one) > 1 || withGiven(other) > 1 ? 1 : value;
  });
  return { ...priors, odds, shared };
}
