import { conductsAt, circuitAt, faultActs, netNumbers } from '@/domain/network/circuit';
import type { EdgeTransfers } from '@/domain/network/transfer';
import { edgeTransfers, pairTransfer } from '@/domain/network/transfer';
import { changedResistance } from '@/domain/network/update';
import { partModes } from '@/domain/diagnosis/modes';
import type { ForcedPart, Network, Probe } from '@/domain/network/types';

const TOP = 60e6;
const NODES = 12;

/** Far enough for three standard deviations of a meter of ±(0.8 % + 3 counts), leads and close tolerances. */
function apart(one: number, other: number): boolean {
  if (one > TOP || other > TOP) return one > TOP !== other > TOP;
  return Math.abs(one - other) > 0.04 * Math.max(one, other) + 1;
}

interface Further {
  readonly part: number;
  readonly mode: ForcedPart['mode'];
  readonly ohms: number;
}

/** What a further fault shows at every probe, beside the faults already forced. */
function showers(network: Network, forced: readonly ForcedPart[], probes: readonly Probe[]) {
  const numbers = netNumbers(network);
  const bases = new Map<string | undefined, EdgeTransfers>();
  return probes.map((probe) => {
    const position = probe.position ?? network.positions[0];
    const base =
      bases.get(position) ?? edgeTransfers(circuitAt(network, position, probe.lifted, forced));
    bases.set(position, base);
    const nets = [numbers.get(probe.from)!, numbers.get(probe.to)!] as const;
    const pair = pairTransfer(base.prepared, nets[0], nets[1]);
    return (further?: Further): number => {
      if (further === undefined) return pair.ohms;
      const part = network.parts[further.part]!;
      if (!faultActs(part, conductsAt(part, position), further.mode)) return pair.ohms;
      const change = { edge: further.part, siemens: 1 / further.ohms };
      return changedResistance(base, pair, nets, [change]);
    };
  });
}

/**
 * True when the readings can tell these faults: the healthy network, the faults with any one left out, and the
 * faults with any one exchanged for any other fault, all show something else somewhere. Computed from solved
 * networks alone, without the diagnosis.
 */
export function canBeToldApart(
  network: Network,
  faults: readonly ForcedPart[],
  probes: readonly Probe[],
): boolean {
  const truth = showers(network, faults, probes).map((show) => show());
  const modes = partModes(network);
  return faults.every((fault) => {
    const rest = faults.filter((other) => other !== fault);
    const show = showers(network, rest, probes);
    const differs = (further?: Further): boolean =>
      show.some((at, i) => apart(at(further), truth[i]!));
    if (!differs()) return false;
    return modes.every(({ part, mode, low, high }) => {
      const { ref } = network.parts[part]!;
      if (rest.some((other) => other.ref === ref)) return true;
      if (ref === fault.ref && mode === fault.mode) return true;
      for (let node = 0; node <= NODES; node++) {
        const ohms = Math.exp(low + (node / NODES) * (high - low));
        if (!differs({ part, mode, ohms })) return false;
      }
      return true;
    });
  });
}
