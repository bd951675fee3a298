import type { Circuit } from './circuit';
import { circuitAt, netNumbers } from './circuit';
import { drive, prepare } from './drive';
import type { ForcedPart, Network, Ohms, Probe } from './types';

/** Resistance between two nets of a circuit, Ω; Infinity when they lie in different components. */
export function effectiveResistance(circuit: Circuit, a: number, b: number): number {
  return drive(prepare(circuit), a, b).ohms;
}

/**
 * What an ideal ohmmeter shows between the probe's nets with some parts forced, Ω or OL.
 * @throws RangeError when a net of the probe is not in the network.
 */
export function resistanceBetween(
  network: Network,
  probe: Probe,
  forced: readonly ForcedPart[] = [],
): Ohms {
  const numbers = netNumbers(network);
  const [a, b] = [probe.from, probe.to].map((net) => {
    const number = numbers.get(net);
    if (number === undefined)
      throw new RangeError(`net ${net} given, a net of the network is needed`);
    return number;
  }) as [number, number];
  const circuit = circuitAt(network, probe.position, probe.lifted, forced);
  const ohms = effectiveResistance(circuit, a, b);
  return Number.isFinite(ohms) ? ohms : 'OL';
}
