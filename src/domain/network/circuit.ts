import type { Mode } from '@/domain/parts/kinds';
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
 * The circuit at a switch position (missing: the network's first). Lifted parts are gone; a forced part has
 * the resistance given, never below 1 mΩ.
 */
export function circuitAt(
  network: Network,
  position: string | undefined = network.positions[0],
  lifted: readonly string[] = [],
  forced: readonly ForcedPart[] = [],
): Circuit {
  const numbers = netNumbers(network);
  const gone = new Set(lifted);
  const forcedParts = new Map(forced.map((part) => [part.ref, part]));
  const edges = network.parts.map((part): Edge => {
    const [a, b] = part.nets.map((net) => numbers.get(net)!) as [number, number];
    const conducts = conductsAt(part, position);
    const force = forcedParts.get(part.ref);
    const healthy = conducts ? siemensOf(healthyOhms(part)) : 0;
    const faulty = force !== undefined && faultActs(part, conducts, force.mode);
    const siemens = faulty ? siemensOf(force.ohms) : healthy;
    return { a, b, siemens: gone.has(part.ref) ? 0 : siemens };
  });
  return { nets: numbers.size, edges };
}

/**
 * True when a fault in this mode changes the part here. A contact's bridge (short, leaky) shows where the
 * contact should be open, any other of its faults where it should conduct.
 */
export function faultActs(part: NetworkPart, conducts: boolean, mode: Mode | undefined): boolean {
  if (part.kind !== 'contact') return true;
  return conducts !== (mode === 'short' || mode === 'leaky');
}
