/** The cheapest way through the grid from any of the sources to any of the goals; 45° corners, changes of layer cost. */
import type { RouteGrid } from './route-grid';

const VIA = 9;
const BEND = 1.1;

/** A binary heap of cells by cost. */
class Heap {
  private readonly cells: number[] = [];
  private readonly costs: number[] = [];

  get size(): number {
    return this.cells.length;
  }

  push(cell: number, cost: number): void {
    let i = this.cells.length;
    this.cells.push(cell);
    this.costs.push(cost);
    while (i > 0) {
      const up = (i - 1) >> 1;
      if ((this.costs[up] ?? 0) <= cost) break;
      this.swap(i, up);
      i = up;
    }
  }

  pop(): number {
    const top = this.cells[0] ?? -1;
    const cell = this.cells.pop() ?? -1;
    const cost = this.costs.pop() ?? 0;
    const n = this.cells.length;
    if (n === 0) return top;
    this.cells[0] = cell;
    this.costs[0] = cost;
    for (let i = 0; ;) {
      let least = i;
      for (const child of [2 * i + 1, 2 * i + 2])
        if (child < n && (this.costs[child] ?? 0) < (this.costs[least] ?? 0)) least = child;
      if (least === i) return top;
      this.swap(i, least);
      i = least;
    }
  }

  private swap(i: number, j: number): void {
    const [c, d] = [this.cells[i] ?? 0, this.cells[j] ?? 0];
    this.cells[i] = d;
    this.cells[j] = c;
    const [e, f] = [this.costs[i] ?? 0, this.costs[j] ?? 0];
    this.costs[i] = f;
    this.costs[j] = e;
  }
}

export type PathOptions = { blocked: Uint8Array; layers: readonly (0 | 1)[] };

const MOVES = [
  [1, 0],
  [1, 1],
  [0, 1],
  [-1, 1],
  [-1, 0],
  [-1, -1],
  [0, -1],
  [1, -1],
] as const;

/** Nodes from a source to a goal (layer × size + cell), or null. Sources and goals may lie in blocked cells. */
export function searchPath(
  grid: RouteGrid,
  sources: readonly number[],
  goals: ReadonlySet<number>,
  { blocked, layers }: PathOptions,
): number[] | null {
  const { columns, rows, size } = grid;
  const cost = new Float32Array(size * 2).fill(Infinity);
  const from = new Int32Array(size * 2).fill(-1);
  const way = new Int8Array(size * 2).fill(-1);
  const done = new Uint8Array(size * 2);
  const aims = [...goals].map((node) => [
    (node % size) % columns,
    Math.floor((node % size) / columns),
  ]);
  const few = aims.length <= 12;
  const guess = (node: number): number => {
    if (!few) return 0;
    const x = (node % size) % columns;
    const y = Math.floor((node % size) / columns);
    let best = Infinity;
    for (const [ax = 0, ay = 0] of aims) {
      const [dx, dy] = [Math.abs(x - ax), Math.abs(y - ay)];
      best = Math.min(best, Math.max(dx, dy) + 0.41 * Math.min(dx, dy));
    }
    return best * 0.98;
  };
  const heap = new Heap();
  for (const source of sources) {
    cost[source] = 0;
    heap.push(source, guess(source));
  }
  while (heap.size > 0) {
    const node = heap.pop();
    if (done[node]) continue;
    done[node] = 1;
    if (goals.has(node)) return traced(node, from);
    const layer = node >= size ? 1 : 0;
    const cell = node % size;
    const [x, y] = [cell % columns, Math.floor(cell / columns)];
    const here = cost[node] ?? 0;
    const offer = (next: number, price: number, direction: number) => {
      if (done[next] || (blocked[next] && !goals.has(next))) return;
      const total = here + price;
      if (total >= (cost[next] ?? 0)) return;
      cost[next] = total;
      from[next] = node;
      way[next] = direction;
      heap.push(next, total + guess(next));
    };
    for (const [direction, [dx, dy]] of MOVES.entries()) {
      const [nx, ny] = [x + dx, y + dy];
      if (nx < 0 || ny < 0 || nx >= columns || ny >= rows) continue;
      const slant = dx !== 0 && dy !== 0 ? 1.414 : 1;
      const against = (layer === 0 ? dy !== 0 && dx === 0 : dx !== 0 && dy === 0) ? 1.12 : 1;
      const before = way[node] ?? -1;
      const turn = before < 0 ? 0 : Math.abs(((direction - before + 12) % 8) - 4);
      const bend = before < 0 || turn === 4 ? 0 : turn === 3 ? BEND : 3;
      offer(layer * size + ny * columns + nx, slant * against + bend, direction);
    }
    const other = layer === 0 ? 1 : 0;
    if (layers.includes(other) && !blocked[node]) offer(other * size + cell, VIA, -1);
  }
  return null;
}

function traced(goal: number, from: Int32Array): number[] {
  const nodes = [goal];
  for (let node = from[goal] ?? -1; node >= 0; node = from[node] ?? -1) nodes.push(node);
  return nodes.reverse();
}
