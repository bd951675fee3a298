import type { Circuit, Edge } from '@/domain/network/circuit';
import { logUniform } from './seeded';

/**
 * A random circuit: a tree that joins most nets (some are left apart), then chords and parallel edges.
 * Resistances lie between the ends given, alike in their logarithm.
 */
export function randomCircuit(
  random: () => number,
  nets: number,
  ends: readonly [number, number] = [0.01, 1e9],
): Circuit {
  const edges: Edge[] = [];
  const add = (a: number, b: number): void => {
    edges.push({ a, b, siemens: 1 / logUniform(random, ends[0], ends[1]) });
  };
  for (let net = 1; net < nets; net++) if (random() > 0.06) add(Math.floor(random() * net), net);
  const chords = Math.floor(random() * nets) + 1;
  for (let i = 0; i < chords; i++) {
    const a = Math.floor(random() * nets);
    const b = Math.floor(random() * nets);
    if (a !== b) add(a, b);
  }
  return { nets, edges };
}

/** The circuit with some edges changed. */
export function withEdges(
  circuit: Circuit,
  changes: readonly { edge: number; siemens: number }[],
): Circuit {
  const edges = [...circuit.edges];
  for (const { edge, siemens } of changes) edges[edge] = { ...edges[edge]!, siemens };
  return { nets: circuit.nets, edges };
}
