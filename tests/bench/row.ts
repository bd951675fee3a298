/** One line of `npm run bench`: the same work done by us and by another, in one run on one machine. */
export interface BenchRow {
  name: string;
  /** Milliseconds per unit of work. */
  ours_ms: number;
  other_ms: number;
  /** ours / other: below 1 we are faster. */
  ratio: number;
  /** What the other is, and what the unit of work. */
  note?: string;
}

export const row = (name: string, ours_ms: number, other_ms: number, note: string): BenchRow => ({
  name,
  ours_ms,
  other_ms,
  ratio: ours_ms / other_ms,
  note,
});

/** The middle of some measurements. @throws RangeError when there are none */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted[Math.floor(sorted.length / 2)];
  if (middle === undefined) throw new RangeError('No measurement was given.');
  return middle;
}
