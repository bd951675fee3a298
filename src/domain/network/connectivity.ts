import type { Circuit } from './circuit';

/** Component number of every net: two nets with different numbers read OL. */
export function components(circuit: Circuit): Int32Array {
  const root = Int32Array.from({ length: circuit.nets }, (_, net) => net);
  const find = (net: number): number => {
    let at = net;
    while (root[at] !== at) {
      root[at] = root[root[at]!]!;
      at = root[at]!;
    }
    return at;
  };
  for (const edge of circuit.edges) if (edge.siemens > 0) root[find(edge.a)] = find(edge.b);
  return Int32Array.from(root, (_, net) => find(net));
}

/**
 * The biconnected block of every conducting edge, −1 for the rest (Hopcroft and Tarjan 1973). A reading
 * depends on the edges of the blocks between its two nets and on no others; a block of one edge is a bridge.
 */
export function blocks(circuit: Circuit): Int32Array {
  const at: { edge: number; to: number }[][] = Array.from({ length: circuit.nets }, () => []);
  circuit.edges.forEach((edge, index) => {
    if (edge.siemens === 0) return;
    at[edge.a]!.push({ edge: index, to: edge.b });
    at[edge.b]!.push({ edge: index, to: edge.a });
  });
  const block = new Int32Array(circuit.edges.length).fill(-1);
  const order = new Int32Array(circuit.nets).fill(-1);
  const low = new Int32Array(circuit.nets);
  const stack: number[] = [];
  let clock = 0;
  let count = 0;
  // Recursion depth is at most the number of nets: 201 for a network of 200 parts.
  const visit = (net: number, entry: number): void => {
    order[net] = low[net] = clock++;
    for (const { edge, to } of at[net]!) {
      if (edge === entry) continue;
      if (order[to] === -1) {
        const mark = stack.push(edge) - 1;
        visit(to, edge);
        low[net] = Math.min(low[net]!, low[to]!);
        if (low[to]! >= order[net]!) {
          for (const member of stack.splice(mark)) block[member] = count;
          count++;
        }
      } else if (order[to]! < order[net]!) {
        stack.push(edge);
        low[net] = Math.min(low[net]!, order[to]!);
      }
    }
  };
  for (let net = 0; net < circuit.nets; net++) if (order[net] === -1) visit(net, -1);
  return block;
}

/** Indices of the edges whose loss separates the circuit further. */
export function bridges(circuit: Circuit): number[] {
  const block = blocks(circuit);
  const size = new Map<number, number>();
  for (const number of block) size.set(number, (size.get(number) ?? 0) + 1);
  return [...block.keys()].filter((edge) => block[edge]! >= 0 && size.get(block[edge]!) === 1);
}
