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
/** Rounding of a base solution, relative: a few times that of one operation. */
const ROUNDING = 1e-15;
/** A change whose rounding may exceed this fraction of its result is solved afresh. */
const WANTED = 1e-10;

/**
 * Resistance of a pair of nets after one or two edges changed, from the base solution alone
 * (Sherman and Morrison 1950; Woodbury 1950). A change that separates the nets gives Infinity exactly; one
 * that cancels too many digits (a near-bridge opened, a short across a high resistance) is solved afresh.
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
  const { drop, error } = dropOf(base, pair, real);
  const changed = pair.ohms - drop;
  const rounding = error + ROUNDING * (pair.ohms + Math.abs(drop));
  return Number.isFinite(changed) && rounding <= WANTED * changed ? changed : fresh();
}

/** (1 + δ·R)/δ of an edge, Ω, without subtraction where it would cancel; 0 for a bridge taken away. */
function pivot(base: EdgeTransfers, change: EdgeChange): number {
  const g = base.prepared.circuit.edges[change.edge]!.siemens;
  if (change.siemens === Infinity) return base.ohms[change.edge]!;
  const factor = base.away[change.edge]! + base.ohms[change.edge]! * change.siemens;
  return factor / (change.siemens - g);
}

/** How far the resistance drops, Ω, and how far rounding may have moved that; NaN where it cannot be told. */
function dropOf(
  base: EdgeTransfers,
  pair: PairTransfer,
  changes: readonly EdgeChange[],
): { drop: number; error: number } {
  const [j, k] = changes as [EdgeChange, EdgeChange?];
  const zj = pair.toEdge[j.edge]!;
  const pj = pivot(base, j);
  const noise = ROUNDING * pair.ohms;
  if (k === undefined)
    return { drop: (zj * zj) / pj, error: (noise * (2 * Math.abs(zj) + noise)) / Math.abs(pj) };
  const zk = pair.toEdge[k.edge]!;
  const pk = pivot(base, k);
  const between = base.between[j.edge * base.ohms.length + k.edge]!;
  const determinant = pj * pk - between * between;
  const numerator = zj * zj * pk - 2 * zj * zk * between + zk * zk * pj;
  const drop = numerator / determinant;
  const betweenNoise = ROUNDING * Math.min(base.ohms[j.edge]!, base.ohms[k.edge]!);
  const far = Math.abs(zj) + Math.abs(zk) + noise;
  const pivots = Math.abs(pj) + Math.abs(pk) + Math.abs(between);
  const numeratorError =
    2 * far * (noise * pivots + betweenNoise * far) + ROUNDING * far * far * pivots;
  const determinantError =
    ROUNDING * Math.abs(pj * pk) + betweenNoise * (2 * Math.abs(between) + betweenNoise);
  return {
    drop,
    error: (numeratorError + Math.abs(drop) * determinantError) / Math.abs(determinant),
  };
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
