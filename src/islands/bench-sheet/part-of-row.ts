import type { Points } from '@/domain/bench/types';
import type { BoardPart } from './panel-props';

/** The one part that a row is about: the part measured straight, or the only one across its two nets. */
export function partOf(points: Points, parts: readonly BoardPart[]): string | null {
  if (points.part !== null) return points.part;
  const { from, to } = points;
  if (from === null || to === null) return null;
  const across = parts.filter(({ nets }) => nets?.includes(from) && nets.includes(to));
  return across.length === 1 ? (across[0]?.ref ?? null) : null;
}
