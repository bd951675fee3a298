/** Lays the tracks of a board: wide ones for current, well apart where mains can stand, the rest as they fit. */
import { at, distance, type Point } from './geometry';
import { padsOf, type PlacedPad } from './footprint';
import type { Floor } from './floors';
import { onBoard } from './floors';
import { RouteGrid, type Thing } from './route-grid';
import { searchPath } from './search-path';
import { layerOf, type Layer, type Part, type Track, type Via } from './types';

export type Copper = { tracks: Track[]; vias: Via[] };
type NetPad = PlacedPad & { layer: Layer | 'both' };

const thingOf = ({ net, at: p, width, height, round, layer }: NetPad): Thing => {
  const half = Math.min(width, height) / 2;
  const along = round ? 0 : (Math.max(width, height) - half * 2) / 2;
  const [dx, dy] = width >= height ? [along, 0] : [0, along];
  return {
    net: net ?? '-',
    p: at(p.x - dx, p.y - dy),
    q: at(p.x + dx, p.y + dy),
    half: round ? half : half * 1.1,
    layer,
  };
};

/** What each net needs: half width and clearance. */
export type Rules = { half(net: string): number; clearance(net: string): number };

export function rulesFor(parts: readonly Part[], floor: Floor): Rules {
  const strong = new Set<string>();
  const high = new Set<string>();
  for (const part of parts) {
    const nets = part.pads.flatMap((pad) => pad.net ?? []).filter((net) => net !== floor.ground);
    const { look } = part.body;
    if (
      look === 'fuse' ||
      look === 'loop' ||
      part.kind === 'shunt' ||
      (floor.through && part.kind === 'diode')
    )
      for (const net of nets) strong.add(net);
    if (look === 'jack' || part.protection) for (const net of nets) high.add(net);
  }
  return {
    half: (net) =>
      strong.has(net)
        ? 1.5
        : net === floor.ground
          ? 0.7
          : floor.through
            ? 0.5
            : high.has(net)
              ? 0.4
              : 0.2,
    clearance: (net) => (high.has(net) ? 1 : 0.3),
  };
}

/** Laid tracks and vias; a net that finds no way even when narrow stays without one. */
export function routed(parts: readonly Part[], given: Copper, floor: Floor): Copper {
  const grid = new RouteGrid(floor);
  const rules = rulesFor(parts, floor);
  const layers: (0 | 1)[] = floor.plainFront ? [1] : [0, 1];
  const pads = parts.flatMap((part) =>
    padsOf(part).map((pad): NetPad => ({
      ...pad,
      layer: pad.drill > 0 ? 'both' : layerOf(part.side),
    })),
  );
  const copper: Copper = { tracks: [...given.tracks], vias: [...given.vias] };
  const lay = (track: Track) => {
    for (const [i, q] of track.points.entries()) {
      const p = track.points[i - 1];
      if (p) grid.things.push({ net: track.net, p, q, half: track.width / 2, layer: track.layer });
    }
  };
  const pierce = ({ net, at: p }: Via) =>
    grid.things.push({ net, p, q: p, half: 0.42, layer: 'both' });
  for (const pad of pads) grid.things.push(thingOf(pad));
  given.tracks.forEach(lay);
  given.vias.forEach(pierce);
  const nodesOf = (pad: NetPad): number[] => {
    const cell = grid.cellAt(pad.at);
    const on = pad.layer === 'both' ? layers : layers.filter((layer) => layer === pad.layer);
    return on.map((layer) => layer * grid.size + cell);
  };
  const ends = new Map<number, Point>();
  for (const pad of pads) for (const node of nodesOf(pad)) ends.set(node, pad.at);

  /** Turns nodes into tracks and vias and lays them. */
  const laid = (nodes: number[], net: string, half: number) => {
    const pointOf = (node: number) => ends.get(node) ?? grid.pointOf(node % grid.size);
    let run: Point[] = [];
    const finish = (layer: Layer) => {
      if (run.length > 1) {
        const track = { net, layer, width: half * 2, points: straightened(run) };
        copper.tracks.push(track);
        lay(track);
      }
      run = [];
    };
    for (const [i, node] of nodes.entries()) {
      const layer: Layer = node >= grid.size ? 1 : 0;
      const before = nodes[i - 1];
      if (before !== undefined && before >= grid.size !== node >= grid.size) {
        finish(layer === 1 ? 0 : 1);
        if (!ends.has(node)) {
          const via = { net, at: pointOf(node) };
          copper.vias.push(via);
          pierce(via);
        }
      }
      run.push(pointOf(node));
      if (i === nodes.length - 1) finish(layer);
    }
  };

  const poured = (p: Point) => p.x > floor.groundFrom && onBoard(floor, p);
  for (const { net, members } of ordered(pads, rules)) {
    const ground = net === floor.ground && floor.groundFrom < floor.width;
    const waiting = ground ? members.filter((pad) => !poured(pad.at)) : [...members];
    const half = rules.half(net);
    const tries = [half, half / 2, 0.2].filter((h, i, all) => all.indexOf(h) === i && h <= half);
    const tree: number[] = [];
    if (!ground) tree.push(...nodesOf(waiting.shift() ?? members[0] ?? fail()));
    // A stub of the chip is part of the net from the start.
    for (const via of given.vias)
      if (via.net === net) tree.push(...layers.map((l) => l * grid.size + grid.cellAt(via.at)));
    while (waiting.length > 0) {
      let path: number[] | null = null;
      let used = half;
      for (const h of tries) {
        const narrow = h < half;
        const blocked = grid.blockedFor(net, Math.max(h, 0.3), (other) =>
          narrow
            ? 0.3
            : Math.max(rules.clearance(net), other === '-' ? 0.3 : rules.clearance(other)),
        );
        const goals = new Set(waiting.flatMap(nodesOf));
        if (ground && tree.length === 0) {
          const edge = pourEdge(grid, floor, layers);
          path = searchPath(grid, [...goals], edge, { blocked, layers });
        } else path = searchPath(grid, tree, goals, { blocked, layers });
        used = h;
        if (path) break;
      }
      if (!path) {
        waiting.shift();
        continue;
      }
      laid(path, net, used);
      tree.push(...path);
      const reached = new Set(path);
      for (let i = waiting.length - 1; i >= 0; i--) {
        const pad = waiting[i];
        if (!pad || !nodesOf(pad).some((node) => reached.has(node))) continue;
        tree.push(...nodesOf(pad));
        waiting.splice(i, 1);
      }
    }
  }
  return copper;
}

function fail(): never {
  throw new Error('A net without pads.');
}

/** The cells where the ground area begins. */
function pourEdge(grid: RouteGrid, floor: Floor, layers: readonly (0 | 1)[]): Set<number> {
  const cells = new Set<number>();
  for (let y = 3; y < floor.height - 3; y += 0.635) {
    const p = at(floor.groundFrom + 1.2, y);
    if (onBoard(floor, p))
      for (const layer of layers) cells.add(layer * grid.size + grid.cellAt(p));
  }
  return cells;
}

/** The nets with more than one pad: the wide ones first, then those under tension, short before long. */
function ordered(pads: readonly NetPad[], rules: Rules): { net: string; members: NetPad[] }[] {
  const groups = new Map<string, NetPad[]>();
  for (const pad of pads)
    if (pad.net !== null) groups.set(pad.net, [...(groups.get(pad.net) ?? []), pad]);
  const spanOf = (members: readonly NetPad[]) =>
    Math.max(...members.map((pad) => distance(pad.at, members[0]?.at ?? pad.at)));
  return [...groups]
    .map(([net, members]) => ({
      net,
      members,
      rank: rules.half(net) * 400 + rules.clearance(net) * 100 - spanOf(members),
    }))
    .sort((a, b) => b.rank - a.rank);
}

/** Without the points that lie on the line between their neighbours. */
function straightened(points: readonly Point[]): Point[] {
  return points.filter((p, i) => {
    const [before, after] = [points[i - 1], points[i + 1]];
    if (!before || !after) return true;
    const cross = (p.x - before.x) * (after.y - p.y) - (p.y - before.y) * (after.x - p.x);
    return Math.abs(cross) > 1e-6;
  });
}
