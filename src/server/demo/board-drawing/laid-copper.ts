/** Tracks and vias as they are laid, each at once in the way of those that follow. */
import { at, type Point } from './geometry';
import type { NetPad } from './copper-rules';
import type { RouteGrid, Thing } from './route-grid';
import type { Layer, Track, Via } from './types';

export type Copper = { tracks: Track[]; vias: Via[] };

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

/** Without the points that lie on the line between their neighbours. */
function straightened(points: readonly Point[]): Point[] {
  return points.filter((p, i) => {
    const [before, after] = [points[i - 1], points[i + 1]];
    if (!before || !after) return true;
    const cross = (p.x - before.x) * (after.y - p.y) - (p.y - before.y) * (after.x - p.x);
    return Math.abs(cross) > 1e-6;
  });
}

export class LaidCopper implements Copper {
  readonly tracks: Track[] = [];
  readonly vias: Via[] = [];
  private readonly grid: RouteGrid;
  /** Where a cell stands for a pad: its very middle. */
  private readonly ends = new Map<number, Point>();

  constructor(grid: RouteGrid, given: Copper) {
    this.grid = grid;
    given.tracks.forEach((track) => this.lay(track));
    given.vias.forEach((via) => this.pierce(via));
  }

  /** A pad, reached at these nodes. */
  pad(pad: NetPad, nodes: readonly number[]): void {
    this.grid.things.push(thingOf(pad));
    for (const node of nodes) this.ends.set(node, pad.at);
  }

  private lay(track: Track): void {
    this.tracks.push(track);
    const { net, layer, width, points } = track;
    for (const [i, q] of points.entries()) {
      const p = points[i - 1];
      if (p) this.grid.things.push({ net, p, q, half: width / 2, layer });
    }
  }

  private pierce(via: Via): void {
    this.vias.push(via);
    this.grid.things.push({ net: via.net, p: via.at, q: via.at, half: 0.42, layer: 'both' });
  }

  /** Turns the nodes of a path into tracks, and into vias where it changes the layer. */
  path(nodes: readonly number[], net: string, half: number): void {
    const { size } = this.grid;
    const pointOf = (node: number) => this.ends.get(node) ?? this.grid.pointOf(node % size);
    let run: Point[] = [];
    const finish = (layer: Layer) => {
      if (run.length > 1) this.lay({ net, layer, width: half * 2, points: straightened(run) });
      run = [];
    };
    for (const [i, node] of nodes.entries()) {
      const layer: Layer = node >= size ? 1 : 0;
      const before = nodes[i - 1];
      if (before !== undefined && before >= size !== node >= size) {
        finish(layer === 1 ? 0 : 1);
        if (!this.ends.has(node)) this.pierce({ net, at: pointOf(node) });
      }
      run.push(pointOf(node));
      if (i === nodes.length - 1) finish(layer);
    }
  }
}
