/** Lays the tracks of a board: wide ones for current, well apart where mains can stand, the rest as they fit. */
import { at, type Point } from './geometry';
import { inOrder, rulesFor, type NetPad, type Rules } from './copper-rules';
import { padsOf } from './footprint';
import type { Floor } from './floors/floor';
import { LaidCopper, type Copper } from './laid-copper';
import { roomOn } from './room';
import { RouteGrid, STEP } from './route-grid';
import { searchPath } from './search-path';
import { layerOf, type Part } from './types';

type Job = {
  floor: Floor;
  grid: RouteGrid;
  rules: Rules;
  layers: readonly (0 | 1)[];
  copper: LaidCopper;
  nodesOf(pad: NetPad): number[];
};

/** The cells where the ground area begins. */
function pourEdge({ grid, floor, layers }: Job): Set<number> {
  const cells = new Set<number>();
  const room = roomOn(floor);
  const x = floor.groundFrom + 1.2;
  for (let y = 3; y < floor.height - 3; y += STEP)
    if (room(x, y))
      for (const layer of layers) cells.add(layer * grid.size + grid.cellAt(at(x, y)));
  return cells;
}

/** A way from what is laid of the net to one of the pads; narrower when there is none as wide as it should be. */
function findPath(job: Job, net: string, tree: readonly number[], waiting: readonly NetPad[]) {
  const { grid, rules, layers } = job;
  const half = rules.half(net);
  const goals = new Set(waiting.flatMap((pad) => job.nodesOf(pad)));
  for (const tried of new Set([half, half / 2, 0.2])) {
    if (tried > half) continue;
    const apart = (other: string) => {
      if (tried < half) return 0.3;
      return Math.max(rules.clearance(net), other === '-' ? 0.3 : rules.clearance(other));
    };
    const blocked = grid.blockedFor(net, Math.max(tried, 0.3), apart);
    const nodes =
      tree.length > 0
        ? searchPath(grid, tree, goals, { blocked, layers })
        : searchPath(grid, [...goals], pourEdge(job), { blocked, layers });
    if (nodes) return { nodes, half: tried };
  }
  return null;
}

function layNet(job: Job, net: string, members: readonly NetPad[], stubs: readonly Point[]): void {
  const { floor, grid, layers, copper, nodesOf } = job;
  const ground = net === floor.ground && floor.groundFrom < floor.width;
  const room = roomOn(floor);
  const poured = (p: Point) => p.x > floor.groundFrom && room(p.x, p.y, 0);
  const waiting = ground ? members.filter((pad) => !poured(pad.at)) : [...members];
  const first = ground ? undefined : waiting.shift();
  const tree = first ? nodesOf(first) : [];
  // A stub of the chip is part of its net from the start.
  for (const stub of stubs) tree.push(...layers.map((l) => l * grid.size + grid.cellAt(stub)));
  while (waiting.length > 0) {
    const found = findPath(job, net, tree, waiting);
    if (!found) {
      waiting.shift();
      continue;
    }
    copper.path(found.nodes, net, found.half);
    const reached = new Set(found.nodes);
    tree.push(...reached);
    for (const pad of waiting.filter((p) => nodesOf(p).some((node) => reached.has(node)))) {
      tree.push(...nodesOf(pad));
      waiting.splice(waiting.indexOf(pad), 1);
    }
  }
}

/** Laid tracks and vias besides those given; a net that finds no way even when narrow stays without one. */
export function routed(parts: readonly Part[], given: Copper, floor: Floor): Copper {
  const grid = new RouteGrid(floor);
  const layers: (0 | 1)[] = floor.plainFront ? [1] : [0, 1];
  const copper = new LaidCopper(grid, given);
  const nodesOf = (pad: NetPad): number[] => {
    const cell = grid.cellAt(pad.at);
    const on = pad.layer === 'both' ? layers : layers.filter((layer) => layer === pad.layer);
    return on.map((layer) => layer * grid.size + cell);
  };
  const pads = parts.flatMap((part) =>
    padsOf(part).map((pad): NetPad => {
      return { ...pad, layer: pad.drill > 0 ? 'both' : layerOf(part.side) };
    }),
  );
  for (const pad of pads) copper.pad(pad, nodesOf(pad));
  const rules = rulesFor(parts, floor);
  const job: Job = { floor, grid, rules, layers, copper, nodesOf };
  for (const { net, members } of inOrder(pads, rules)) {
    const stubs = given.vias.filter((via) => via.net === net).map((via) => via.at);
    layNet(job, net, members, stubs);
  }
  return { tracks: copper.tracks, vias: copper.vias };
}
