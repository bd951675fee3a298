import { components } from './connectivity';
import { effectiveResistance } from './resistance';
import type { EdgeTransfers, PairTransfer } from './transfer';

/** A new conductance of one edge, S: 0 takes it away, Infinity is a perfect short. */
export interface EdgeChange {
  readonly edge: number;
  readonly siemens: number;
}

/** A perfect short where a solution has to be rebuilt, S. */
const SHORT_SIEMENS = 1e15;
/** Digits lost to cancellation from which a solution is rebuilt: 1e-7 leaves nine of sixteen. */
const CANCELLED = 1e-7;

/**
 * Resistance of a pair of nets after one or two edges changed, from the base solution alone
 * (Sherman and Morrison 1950; Woodbury 1950). A change that separates the nets gives Infinity exactly; one
 * that cancels more than seven digits is solved afresh.
 *
 * @throws RangeError for more than two changes, or two of one edge.
 */
export function changedResistance(
  base: EdgeTransfers,
  pair: PairTransfer,
  nets: readonly [number, number],
  changes: readonly EdgeChange[],
): number {
  const { circuit } = base.prepared;
  if (changes.length > 2 || (changes.length === 2 && changes[0]!.edge === changes[1]!.edge))
    throw new RangeError(`${changes.length} changes given, up to two different edges are needed`);
  const real = changes.filter((change) => change.siemens !== circuit.edges[change.edge]!.siemens);
  if (real.length === 0) return pair.ohms;
  const fresh = (): number => rebuilt(base, nets, real);
  // An edge that was not there has no base solution across it.
  if (real.some((change) => circuit.edges[change.edge]!.siemens === 0)) return fresh();
  if (!Number.isFinite(pair.ohms)) return pair.ohms;
  const drop = real.length === 1 ? oneDrop(base, pair, real[0]!) : twoDrop(base, pair, real);
  const changed = pair.ohms - drop;
  return drop === drop && changed > CANCELLED * pair.ohms ? changed : fresh();
}

/** (1 + δ·R)/δ of an edge, Ω, without subtraction for the cases that cancel. */
function pivot(base: EdgeTransfers, change: EdgeChange): number {
  const g = base.prepared.circuit.edges[change.edge]!.siemens;
  if (change.siemens === Infinity) return base.ohms[change.edge]!;
  const factor = base.away[change.edge]! + base.ohms[change.edge]! * change.siemens;
  return factor / (change.siemens - g);
}

function oneDrop(base: EdgeTransfers, pair: PairTransfer, change: EdgeChange): number {
  const z = pair.toEdge[change.edge]!;
  const p = pivot(base, change);
  return p === 0 ? NaN : (z * z) / p;
}

function twoDrop(base: EdgeTransfers, pair: PairTransfer, changes: readonly EdgeChange[]): number {
  const [j, k] = changes as [EdgeChange, EdgeChange];
  const count = base.ohms.length;
  const [zj, zk] = [pair.toEdge[j.edge]!, pair.toEdge[k.edge]!];
  const between = base.between[j.edge * count + k.edge]!;
  const [pj, pk] = [pivot(base, j), pivot(base, k)];
  const determinant = pj * pk - between * between;
  if (Math.abs(determinant) <= CANCELLED * (Math.abs(pj * pk) + between * between)) return NaN;
  return (zj * zj * pk - 2 * zj * zk * between + zk * zk * pj) / determinant;
}

function rebuilt(
  base: EdgeTransfers,
  nets: readonly [number, number],
  changes: readonly EdgeChange[],
): number {
  const { circuit } = base.prepared;
  const edges = [...circuit.edges];
  for (const change of changes) {
    const siemens = Math.min(change.siemens, SHORT_SIEMENS);
    edges[change.edge] = { ...edges[change.edge]!, siemens };
  }
  const altered = { nets: circuit.nets, edges };
  const component = components(altered);
  if (component[nets[0]] !== component[nets[1]]) return Infinity;
  return effectiveResistance(altered, nets[0], nets[1]);
}
