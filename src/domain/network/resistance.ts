import type { Circuit } from './circuit';
import { circuitAt, netNumbers } from './circuit';
import type { Prepared } from './drive';
import { drive, prepare } from './drive';
import type { ForcedPart, Network, Ohms, Probe } from './types';

/** Resistance between two nets of a circuit, Ω; Infinity when they lie in different components. */
export function effectiveResistance(circuit: Circuit, a: number, b: number): number {
  return drive(prepare(circuit), a, b).ohms;
}

/**
 * An ideal ohmmeter for the network with some parts forced: what it shows between a probe's nets, Ω or OL.
 * Every switch position with its lifted leads is prepared once.
 *
 * The function returned throws RangeError when a net of the probe is not in the network.
 */
export function ohmmeter(
  network: Network,
  forced: readonly ForcedPart[] = [],
): (probe: Probe) => Ohms {
  const numbers = netNumbers(network);
  const ready = new Map<string, Prepared>();
  let first: Prepared | undefined;
  return (probe) => {
    const [a, b] = [probe.from, probe.to].map((net) => {
      const number = numbers.get(net);
      if (number === undefined)
        throw new RangeError(`net ${net} given, a net of the network is needed`);
      return number;
    }) as [number, number];
    const key = JSON.stringify([probe.position, probe.lifted]);
    const known = ready.get(key);
    const prepared =
      known ?? prepare(circuitAt(network, probe.position, probe.lifted, forced), first);
    if (known === undefined) ready.set(key, prepared);
    first ??= prepared;
    const { ohms } = drive(prepared, a, b);
    return Number.isFinite(ohms) ? ohms : 'OL';
  };
}

/** One reading of {@link ohmmeter}. @throws RangeError as there. */
export function resistanceBetween(
  network: Network,
  probe: Probe,
  forced: readonly ForcedPart[] = [],
): Ohms {
  return ohmmeter(network, forced)(probe);
}
