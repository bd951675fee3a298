import type { Circuit } from './circuit';
import { components } from './connectivity';

/** A circuit made ready to be driven between any two nets: its conductances and an order of elimination. */
export interface Prepared {
  readonly circuit: Circuit;
  readonly component: Int32Array;
  /** Symmetric matrix of conductance between nets, S, row by row; the diagonal is not used. */
  readonly siemens: Float64Array;
  /** Nets in order of least degree, so that few new edges arise. */
  readonly order: Int32Array;
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

/** Sums parallel edges into the conductance matrix and chooses the order of elimination. */
export function prepare(circuit: Circuit): Prepared {
  const n = circuit.nets;
  const siemens = new Float64Array(n * n);
  for (const { a, b, siemens: g } of circuit.edges) {
    if (a === b) continue;
    siemens[a * n + b]! += g;
    siemens[b * n + a]! += g;
  }
  return { circuit, component: components(circuit), siemens, order: leastDegree(siemens, n) };
}

function leastDegree(siemens: Float64Array, n: number): Int32Array {
  const near = Array.from({ length: n }, () => new Set<number>());
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) if (i !== j && siemens[i * n + j]! > 0) near[i]!.add(j);
  const left = new Set(near.keys());
  const order = new Int32Array(n);
  for (let step = 0; step < n; step++) {
    let best = -1;
    for (const net of left) if (best < 0 || near[net]!.size < near[best]!.size) best = net;
    order[step] = best;
    left.delete(best);
    for (const i of near[best]!) {
      near[i]!.delete(best);
      for (const j of near[best]!) if (i !== j) near[i]!.add(j);
    }
  }
  return order;
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
  const n = prepared.circuit.nets;
  const volts = new Float64Array(n);
  if (a === b) return { ohms: 0, away: 1, volts };
  const joined = prepared.component[a] === prepared.component[b];
  if (!joined) return { ohms: Infinity, away: 1, volts };
  const g = Float64Array.from(prepared.siemens);
  const own = withheld < 0 ? 0 : prepared.circuit.edges[withheld]!.siemens;
  if (withheld >= 0) g[a * n + b] = g[b * n + a] = parallelTo(prepared.circuit, withheld);
  const steps = eliminate(prepared, g, a, b);
  const rest = g[a * n + b]!;
  volts[a] = 1 / (rest + own);
  putBack(steps, volts);
  return { ohms: volts[a]!, away: withheld < 0 ? 1 : rest / (rest + own), volts };
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

interface Star {
  readonly net: number;
  readonly neighbours: readonly number[];
  /** Share of the star's conductance towards each neighbour. */
  readonly shares: readonly number[];
}

/** Turns every net but a and b into a mesh between its neighbours; g is changed in place. */
function eliminate(prepared: Prepared, g: Float64Array, a: number, b: number): Star[] {
  const n = prepared.circuit.nets;
  const home = prepared.component[a];
  const gone = new Uint8Array(n);
  const steps: Star[] = [];
  for (const net of prepared.order) {
    if (net === a || net === b || prepared.component[net] !== home) continue;
    const neighbours: number[] = [];
    let sum = 0;
    for (let i = 0, at = net * n; i < n; i++, at++) {
      if (gone[i] === 1 || i === net || g[at]! === 0) continue;
      neighbours.push(i);
      sum += g[at]!;
    }
    const shares = neighbours.map((i) => g[net * n + i]! / sum);
    for (let i = 1; i < neighbours.length; i++) {
      const row = neighbours[i]! * n;
      const through = g[net * n + neighbours[i]!]!;
      for (let j = 0; j < i; j++) {
        const column = neighbours[j]!;
        const added = through * shares[j]!;
        g[row + column]! += added;
        g[column * n + neighbours[i]!]! += added;
      }
    }
    gone[net] = 1;
    steps.push({ net, neighbours, shares });
  }
  return steps;
}

/** Every eliminated net stands at the mean of its neighbours' voltages, weighted by its shares. */
function putBack(steps: readonly Star[], volts: Float64Array): void {
  for (let step = steps.length - 1; step >= 0; step--) {
    const { net, neighbours, shares } = steps[step]!;
    let sum = 0;
    for (let i = 0; i < neighbours.length; i++) sum += shares[i]! * volts[neighbours[i]!]!;
    volts[net] = sum;
  }
}
