import { conductsAt, faultActs } from '@/domain/network/circuit';
import { healthyOhms } from '@/domain/network/healthy';
import type { ForcedPart, Network, Probe } from '@/domain/network/types';
import type { SpiceProbe } from './ngspice';

/** A netlist for one probe, built from the network without the solver's own circuit. */
export function netlist(
  network: Network,
  probe: Probe,
  forced: readonly ForcedPart[] = [],
): SpiceProbe {
  const position = probe.position ?? network.positions[0];
  const resistors = network.parts.flatMap((part) => {
    if ((probe.lifted ?? []).includes(part.ref)) return [];
    const conducts = conductsAt(part, position);
    const fault = forced.find((one) => one.ref === part.ref);
    const acts = fault !== undefined && faultActs(part, conducts, fault.mode);
    if (!acts && !conducts) return [];
    const ohms = acts ? fault.ohms : healthyOhms(part);
    // Ngspice names may hold no dot of a chain's inner net.
    const [a, b] = part.nets.map((net) => net.replace('.', '_')) as [string, string];
    return ohms === 'OL' ? [] : [{ a, b, ohms }];
  });
  return { resistors, from: probe.from.replace('.', '_'), to: probe.to.replace('.', '_') };
}
