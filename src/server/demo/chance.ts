/** A seeded source of chance, so that the demo shop is the same on every machine (mulberry32). */
export type Chance = {
  next(): number;
  between(low: number, high: number): number;
  pick<T>(from: readonly T[]): T;
};

export function chanceFrom(seed: number): Chance {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
  return {
    next,
    between: (low, high) => low + (high - low) * next(),
    pick: (from) => {
      const found = from[Math.floor(next() * from.length)];
      if (found === undefined) throw new RangeError('Nothing to pick from.');
      return found;
    },
  };
}
