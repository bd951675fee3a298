import type { Circuit } from './circuit';
import type { PairTransfer } from './transfer';

/**
 * ∂ln R_ab/∂ln R_k for every edge k: the share of the power that the edge dissipates when a current is
 * driven from a to b (Tellegen; adjoint network). The shares of all edges sum to 1.
 */
export function sensitivities(circuit: Circuit, pair: PairTransfer): Float64Array {
  const shares = new Float64Array(circuit.edges.length);
  if (!Number.isFinite(pair.ohms) || pair.ohms === 0) return shares;
  circuit.edges.forEach((edge, index) => {
    shares[index] = (edge.siemens * pair.toEdge[index]! ** 2) / pair.ohms;
  });
  return shares;
}
