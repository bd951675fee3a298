import { healthyOhms, LEAST_OHMS } from './healthy';
import type { ForcedPart, Network, NetworkPart } from './types';

/** One part as an edge of the weighted graph; 0 S when it does not conduct here (lifted, open contact). */
export interface Edge {
  readonly a: number;
  readonly b: number;
  readonly siemens: number;
}

/** The network at one switch position with some leads lifted: numbered nets, one edge per part, in order. */
export interface Circuit {
  readonly nets: number;
  readonly edges: readonly Edge[];
}

/** Number of every net, in order of first appearance. */
export function netNumbers(network: Network): Map<string, number> {
  const numbers = new Map<string, number>();
  for (const part of network.parts)
    for (const net of part.nets) if (!numbers.has(net)) numbers.set(net, numbers.size);
  return numbers;
}

/** True when the part conducts at this position: every part but a contact that is open there. */
export function conductsAt(part: NetworkPart, position: string | undefined): boolean {
  if (part.kind !== 'contact') return true;
  return position !== undefined && (part.closed ?? []).includes(position);
}

function siemensOf(ohms: number | 'OL'): number {
  return ohms === 'OL' ? 0 : 1 / Math.max(ohms, LEAST_OHMS);
}

/**
 * The circuit at a switch position (missing: the network's first). Lifted parts are gone. A forced part has
 * the resistance given, in closed and open positions alike when it is a contact that conducts more than
 * healthy; forced resistances below 1 mΩ are taken as 1 mΩ.
 */
export function circuitAt(
  network: Network,
  position: string | undefined = network.positions[0],
  lifted: readonly string[] = [],
  forced: readonly ForcedPart[] = [],
): Circuit {
  const numbers = netNumbers(network);
  const gone = new Set(lifted);
  const forcedOhms = new Map(forced.map((part) => [part.ref, part.ohms]));
  const edges = network.parts.map((part): Edge => {
    const [a, b] = part.nets.map((net) => numbers.get(net)!) as [number, number];
    if (gone.has(part.ref)) return { a, b, siemens: 0 };
    const healthy = conductsAt(part, position) ? siemensOf(healthyOhms(part)) : 0;
    const ohms = forcedOhms.get(part.ref);
    return { a, b, siemens: ohms === undefined ? healthy : forcedSiemens(part, healthy, ohms) };
  });
  return { nets: numbers.size, edges };
}

/**
 * Conductance of a faulty part, S. A contact's fault shows only where it makes a difference: an open or a
 * worn one (above its healthy value, short of insulating) in its closed positions, a bridged one where it
 * should be open.
 */
export function forcedSiemens(part: NetworkPart, healthy: number, ohms: number | 'OL'): number {
  const forced = siemensOf(ohms);
  if (part.kind !== 'contact') return forced;
  return forced;
}
