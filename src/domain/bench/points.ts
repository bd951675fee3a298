/** Where a row of the bench sheet belongs: between two nets of the network, on a part judged alone, or nowhere. */
import type { Network, Probe } from '../network/types';
import type { Points, SheetBoard, SheetPart } from './types';

export type Placed =
  | { kind: 'network'; probe: Probe }
  | { kind: 'alone'; part: SheetPart }
  | { kind: 'unusable'; reason: string };

/** The parts drawn into the network, as the computation takes them. */
export function drawnNetwork(positions: readonly string[], parts: readonly SheetPart[]): Network {
  return {
    positions,
    parts: parts.flatMap((p) =>
      p.nets
        ? [
            {
              ref: p.ref,
              kind: p.kind,
              nets: p.nets,
              ohms: p.ohms ?? undefined,
              tolerance: p.tolerance ?? undefined,
              closed: p.closed ?? undefined,
            },
          ]
        : [],
    ),
  };
}

const nowhere = (reason: string): Placed => ({ kind: 'unusable', reason });

/**
 * A reading on a drawn part counts as taken between that part's nets; on a part that is not drawn it is judged
 * alone. Straight on a drawn part with a lead of it lifted, nothing else is in the reading: every other part counts
 * as lifted. What fits nowhere says why.
 */
export function placePoints({ positions, parts }: SheetBoard, points: Points): Placed {
  const { position, lifted } = points;
  const part = points.part === null ? undefined : parts.find(({ ref }) => ref === points.part);
  if (points.part !== null && !part)
    return nowhere(`${points.part} is not in the board file: add it there, or name two points.`);
  const stranger = lifted.find((ref) => parts.every((p) => p.ref !== ref));
  if (stranger !== undefined)
    return nowhere(`${stranger} is lifted but not in the board file: correct its reference.`);
  if (part && !part.nets) return { kind: 'alone', part };
  const from = part?.nets?.[0] ?? points.from;
  const to = part?.nets?.[1] ?? points.to;
  if (from === null || to === null) return nowhere('Two points or a part are needed.');
  const known = (net: string) => parts.some((p) => p.nets?.includes(net));
  if (!known(from) || !known(to))
    return nowhere(`${known(from) ? to : from} is no net of the board’s network.`);
  if (from === to) return nowhere('Both points are the same net.');
  if (position !== null && !positions.includes(position))
    return nowhere(`${position} is no switch position of this board.`);
  const drawn = parts.filter((p) => p.nets).map((p) => p.ref);
  const isolated = part !== undefined && lifted.includes(part.ref);
  const gone = drawn.filter((ref) => (isolated ? ref !== part.ref : lifted.includes(ref)));
  return { kind: 'network', probe: { from, to, position: position ?? undefined, lifted: gone } };
}
