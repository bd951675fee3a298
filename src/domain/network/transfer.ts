import type { Circuit } from './circuit';
import type { Drive, Prepared } from './drive';
import { drive, prepare } from './drive';

/**
 * The base solution of one circuit, from which every changed edge follows without solving again.
 * Edge quantities are stored one entry per edge, edge pairs row by row.
 */
export interface EdgeTransfers {
  readonly prepared: Prepared;
  /** Resistance across each edge's nets, Ω; 0 for an edge that does not conduct. */
  readonly ohms: Float64Array;
  /** Share of a current driven across the edge that takes another way; 0 exactly for a bridge. */
  readonly away: Float64Array;
  /** Transfer resistance between edges, Ω: voltage across one per ampere driven across the other. */
  readonly between: Float64Array;
  /** Voltage of every net per ampere driven across each edge, Ω; edge by edge, rows of nets. */
  readonly volts: Float64Array;
}

/** Resistance of a pair of nets and its transfer resistance to every edge, Ω. */
export interface PairTransfer {
  /** Infinity when the pair lies in different components; its transfers are 0 then. */
  readonly ohms: number;
  readonly toEdge: Float64Array;
}

function acrossEdges(circuit: Circuit, { volts }: Drive, across: Float64Array): Float64Array {
  for (let k = 0; k < across.length; k++) {
    const edge = circuit.edges[k]!;
    across[k] = edge.siemens > 0 ? volts[edge.a]! - volts[edge.b]! : 0;
  }
  return across;
}

/** Drives every conducting edge once (`similar`: see `prepare`). Errors of a transfer are relative to the smaller of both resistances. */
export function edgeTransfers(circuit: Circuit, similar?: Prepared): EdgeTransfers {
  const prepared = prepare(circuit, similar);
  const count = circuit.edges.length;
  const ohms = new Float64Array(count);
  const away = new Float64Array(count).fill(1);
  const between = new Float64Array(count * count);
  const volts = new Float64Array(count * circuit.nets);
  for (let k = 0; k < count; k++) {
    const edge = circuit.edges[k]!;
    if (edge.siemens === 0) continue;
    const driven = drive(prepared, edge.a, edge.b, k);
    ohms[k] = driven.ohms;
    away[k] = driven.away;
    acrossEdges(circuit, driven, between.subarray(k * count, (k + 1) * count));
    volts.set(driven.volts, k * circuit.nets);
  }
  for (let j = 1; j < count; j++)
    for (let k = 0; k < j; k++) {
      const better = ohms[j]! < ohms[k]! ? between[j * count + k]! : between[k * count + j]!;
      between[j * count + k] = between[k * count + j] = better;
    }
  return { prepared, ohms, away, between, volts };
}

/** Drives a pair of nets once. */
export function pairTransfer(prepared: Prepared, a: number, b: number): PairTransfer {
  const driven = drive(prepared, a, b);
  const { circuit } = prepared;
  const toEdge = acrossEdges(circuit, driven, new Float64Array(circuit.edges.length));
  return { ohms: driven.ohms, toEdge };
}

/**
 * Resistance between all nets, Ω, row by row; Infinity across components. From one drive per net towards one
 * of its component, so rounding is relative to the highest resistance there: for choosing, not for showing.
 */
export function allResistances(prepared: Prepared): Float64Array {
  const n = prepared.circuit.nets;
  const driven = Array.from(
    { length: n },
    (_, net) => drive(prepared, net, prepared.component[net]!).volts,
  );
  const ohms = new Float64Array(n * n);
  for (let a = 0; a < n; a++)
    for (let b = 0; b < a; b++) {
      const same = prepared.component[a] === prepared.component[b];
      const sum = driven[a]![a]! + driven[b]![b]! - 2 * driven[a]![b]!;
      ohms[a * n + b] = ohms[b * n + a] = same ? Math.max(sum, 0) : Infinity;
    }
  return ohms;
}
