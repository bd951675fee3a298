/** Stars in order of elimination: each net, and its neighbours with their shares of its conductance. */
export interface Star {
  count: number;
  readonly net: Int32Array;
  /** Where each star's neighbours start; one more entry ends the last. */
  readonly start: Int32Array;
  readonly neighbour: Int32Array;
  readonly share: Float64Array;
}

/** Buffers of one circuit: its conductances, eaten by the elimination, and the stars it leaves. */
export interface Workspace {
  readonly siemens: Float64Array;
  readonly alive: Int32Array;
  readonly stars: Star;
}

export function newWorkspace(nets: number): Workspace {
  return {
    siemens: new Float64Array(nets * nets),
    alive: new Int32Array(nets),
    stars: {
      count: 0,
      net: new Int32Array(nets),
      start: new Int32Array(nets + 1),
      neighbour: new Int32Array((nets * nets) / 2 + nets),
      share: new Float64Array((nets * nets) / 2 + nets),
    },
  };
}

/** Nets in order of least degree, counting the edges that arise on the way. */
export function leastDegree(siemens: Float64Array, nets: number): Int32Array {
  const joined = Uint8Array.from(siemens, (g) => (g > 0 ? 1 : 0));
  const degree = new Int32Array(nets);
  for (let i = 0; i < nets; i++) for (let j = 0; j < nets; j++) degree[i]! += joined[i * nets + j]!;
  const left = Array.from({ length: nets }, (_, net) => net);
  const order = new Int32Array(nets);
  for (let step = 0; step < nets; step++) {
    let at = 0;
    for (let i = 1; i < left.length; i++) if (degree[left[i]!]! < degree[left[at]!]!) at = i;
    const net = left[at]!;
    order[step] = net;
    left.splice(at, 1);
    const near = left.filter((other) => joined[net * nets + other] === 1);
    for (const one of near) {
      degree[one]! -= 1;
      for (const other of near) {
        if (one === other || joined[one * nets + other] === 1) continue;
        joined[one * nets + other] = 1;
        degree[one]! += 1;
      }
    }
  }
  return order;
}

/**
 * Turns every net of the order but a and b into a mesh between its neighbours (star-mesh transformation);
 * the conductances of the workspace are changed in place and end at that between a and b.
 */
export function eliminate(workspace: Workspace, order: Int32Array, a: number, b: number): Star {
  const { siemens, alive, stars } = workspace;
  const { net: nets, start, neighbour, share } = stars;
  const n = alive.length;
  let living = order.length;
  for (let i = 0; i < living; i++) alive[i] = order[i]!;
  let at = 0;
  let count = 0;
  for (let step = 0; step < order.length; step++) {
    const net = order[step]!;
    if (net === a || net === b) continue;
    const row = net * n;
    const first = at;
    let sum = 0;
    let kept = 0;
    for (let i = 0; i < living; i++) {
      const other = alive[i]!;
      if (other === net) continue;
      alive[kept++] = other;
      const g = siemens[row + other]!;
      if (g === 0) continue;
      neighbour[at] = other;
      share[at++] = g;
      sum += g;
    }
    living = kept;
    nets[count] = net;
    start[count++] = first;
    mesh(siemens, n, neighbour, share, first, at, sum);
  }
  start[count] = at;
  stars.count = count;
  return stars;
}

/** Turns conductances g into shares g/sum, and adds g_i·g_j/sum between every two neighbours. */
function mesh(
  siemens: Float64Array,
  n: number,
  neighbour: Int32Array,
  share: Float64Array,
  first: number,
  end: number,
  sum: number,
): void {
  for (let i = first; i < end; i++) {
    const g = share[i]!;
    const one = neighbour[i]!;
    for (let j = first; j < i; j++) {
      const other = neighbour[j]!;
      const added = g * share[j]!;
      siemens[one * n + other]! += added;
      siemens[other * n + one]! += added;
    }
    share[i] = g / sum;
  }
}

/** Every eliminated net stands at the mean of its neighbours' voltages, weighted by its shares. */
export function putBack(stars: Star, volts: Float64Array): void {
  const { net, start, neighbour, share } = stars;
  for (let step = stars.count - 1; step >= 0; step--) {
    let sum = 0;
    for (let i = start[step]!; i < start[step + 1]!; i++) sum += share[i]! * volts[neighbour[i]!]!;
    volts[net[step]!] = sum;
  }
}
