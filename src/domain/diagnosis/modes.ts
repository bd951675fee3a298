import { healthyOhms, INSULATING_OHMS, toleranceOf } from '@/domain/network/healthy';
import type { Network, NetworkPart } from '@/domain/network/types';
import { modesOf } from '@/domain/parts/failure-shares';
import type { Mode } from '@/domain/parts/kinds';
import { modeRange } from '@/domain/parts/mode-ranges';

/** One way one part can fail: its resistance lies anywhere in the range, alike in ln R. */
export interface PartMode {
  /** Index of the part in the network. */
  readonly part: number;
  readonly mode: Mode;
  /** Ends of the range, ln Ω. */
  readonly low: number;
  readonly high: number;
  /** True for a contact that conducts where it should be open: it joins what was apart. */
  readonly bridges: boolean;
}

function bridging(part: NetworkPart, mode: Mode): boolean {
  return part.kind === 'contact' && (mode === 'short' || mode === 'leaky');
}

/** Every single fault of the network, parts in order and each part's modes together. */
export function partModes(network: Network): PartMode[] {
  return network.parts.flatMap((part, index) =>
    modesOf(part.kind).map((mode) => {
      const bridges = bridging(part, mode);
      // A bridged contact is one that should insulate.
      const nominal = bridges ? INSULATING_OHMS : healthyOhms(part);
      const { low, high } = modeRange(mode, nominal, toleranceOf(part));
      return { part: index, mode, low: Math.log(low), high: Math.log(high), bridges };
    }),
  );
}
