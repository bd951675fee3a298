import type { Circuit } from './circuit';
import { components } from './connectivity';
import type { Workspace } from './star-mesh';
import { eliminate, leastDegree, newWorkspace, putBack } from './star-mesh';

/** A circuit made ready to be driven between any two nets: its conductances and an order of elimination. */
export interface Prepared {
  readonly circuit: Circuit;
  readonly component: Int32Array;
  /** Symmetric matrix of conductance between nets, S, row by row; the diagonal is not used. */
  readonly siemens: Float64Array;
  /** All nets in the order of elimination, and those of each component. */
  readonly sequence: Int32Array;
  readonly order: readonly Int32Array[];
  readonly workspace: Workspace;
}

/** What one ampere from net a to net b does: resistance in Ω and the voltage of every net above b's. */
export interface Drive {
  /** Infinity when a and b lie in different components. */
  readonly ohms: number;
  /** Share of the current that bypasses the withheld edge; 1 when none was withheld. */
  readonly away: number;
  /** V per A. Nets of other components stand at 0. */
  readonly volts: Float64Array;
}

/**
 * Sums parallel edges into the conductance matrix and chooses the order of elimination: by least degree, so
 * that few new edges arise, or that of a similar circuit, which saves the search. Any order is right.
 */
export function prepare(circuit: Circuit, similar?: Prepared): Prepared {
  const n = circuit.nets;
  const siemens = new Float64Array(n * n);
  for (const { a, b, siemens: g } of circuit.edges) {
    if (a === b) continue;
    siemens[a * n + b]! += g;
    siemens[b * n + a]! += g;
  }
  const component = components(circuit);
  const order: Int32Array[] = new Array<Int32Array>(n);
  const sequence = similar?.sequence ?? leastDegree(siemens, n);
  for (const net of component) order[net] ??= sequence.filter((other) => component[other] === net);
  const workspace = similar?.workspace ?? newWorkspace(n);
  return { circuit, component, siemens, sequence, order, workspace };
}

/**
 * Drives one ampere from net a to net b by eliminating every other net: star-mesh transformation, and the
 * voltages from its shares on the way back. Nothing is ever subtracted, so resistance and voltages keep
 * their relative accuracy over any span of conductances (Grassmann, Taksar, Heyman 1985; the resistance is
 * Kirchhoff's 1847, named by Klein and Randić 1993).
 *
 * @param withheld index of an edge between a and b whose own share is told apart: `away` is then the
 *   fraction of the current that flows elsewhere, exactly 0 for a bridge.
 */
export function drive(prepared: Prepared, a: number, b: number, withheld = -1): Drive {
  const { circuit, component, workspace } = prepared;
  const n = circuit.nets;
  const volts = new Float64Array(n);
  if (a === b) return { ohms: 0, away: 1, volts };
  const home = component[a]!;
  if (home !== component[b]) return { ohms: Infinity, away: 1, volts };
  const g = workspace.siemens;
  g.set(prepared.siemens);
  const own = withheld < 0 ? 0 : circuit.edges[withheld]!.siemens;
  if (withheld >= 0) g[a * n + b] = g[b * n + a] = parallelTo(circuit, withheld);
  const stars = eliminate(workspace, prepared.order[home]!, a, b);
  const rest = g[a * n + b]!;
  const ohms = 1 / (rest + own);
  volts[a] = ohms;
  putBack(stars, volts);
  return { ohms, away: withheld < 0 ? 1 : rest / (rest + own), volts };
}

/** Conductance of the edges in parallel to this one, S: a sum, not a difference. */
function parallelTo(circuit: Circuit, withheld: number): number {
  const { a, b } = circuit.edges[withheld]!;
  let sum = 0;
  circuit.edges.forEach((edge, index) => {
    const same = (edge.a === a && edge.b === b) || (edge.a === b && edge.b === a);
    if (same && index !== withheld) sum += edge.siemens;
  });
  return sum;
}
