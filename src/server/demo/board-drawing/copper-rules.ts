/** What each net needs of its copper: how wide, how far from others, who goes first. */
import { distance } from './geometry';
import type { PlacedPad } from './footprint';
import type { Floor } from './floors/floor';
import type { Layer, Part } from './types';

export type NetPad = PlacedPad & { layer: Layer | 'both' };

/** Half width and clearance of a net, mm. */
export type Rules = { half(net: string): number; clearance(net: string): number };

/** Nets that carry the measured current, and nets at which mains can stand. */
export function rulesFor(parts: readonly Part[], floor: Floor): Rules {
  const strong = new Set<string>();
  const high = new Set<string>();
  for (const part of parts) {
    const nets = part.pads.flatMap((pad) => pad.net ?? []).filter((net) => net !== floor.ground);
    const { look } = part.body;
    const current = look === 'fuse' || look === 'loop' || part.kind === 'shunt';
    if (current || (floor.through && part.kind === 'diode'))
      for (const net of nets) strong.add(net);
    if (look === 'jack' || part.protection) for (const net of nets) high.add(net);
  }
  return {
    half: (net) => {
      if (strong.has(net)) return 1.5;
      if (net === floor.ground) return 0.7;
      if (floor.through) return 0.5;
      return high.has(net) ? 0.4 : 0.2;
    },
    clearance: (net) => (high.has(net) ? 1 : 0.3),
  };
}

/** The nets in the order they are laid: the wide ones first, then those under tension, short before long. */
export function inOrder(
  pads: readonly NetPad[],
  rules: Rules,
): { net: string; members: NetPad[] }[] {
  const groups = new Map<string, NetPad[]>();
  for (const pad of pads)
    if (pad.net !== null) groups.set(pad.net, [...(groups.get(pad.net) ?? []), pad]);
  const span = (members: readonly NetPad[]) =>
    Math.max(...members.map((pad) => distance(pad.at, members[0]?.at ?? pad.at)));
  return [...groups]
    .map(([net, members]) => ({
      net,
      members,
      rank: rules.half(net) * 400 + rules.clearance(net) * 100 - span(members),
    }))
    .sort((a, b) => b.rank - a.rank);
}
