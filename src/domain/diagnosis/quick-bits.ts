import type { Particle } from './particles';

/** Width of a bin of ln R: some five standard deviations of a meter. */
const WIDTH = 0.03;
const LOW = Math.log(0.01);
const BINS = Math.ceil((Math.log(1e12) - LOW) / WIDTH) + 2;

/** A fast stand-in for the mutual information: outcomes counted in bins of ln R, OL a bin of its own. */
export interface QuickBits {
  /** Bits of a reading that shows these ln R (Infinity: OL), one per particle. */
  of(shown: Float64Array): number;
}

export function quickBits(particles: readonly Particle[]): QuickBits {
  const chance = new Float64Array(BINS + 1);
  const bins = new Int32Array(particles.length);
  const weight = Float64Array.from(particles, (particle) => particle.weight);
  const starts = particles.flatMap((particle, i) =>
    i === 0 || particles[i - 1]!.hypothesis !== particle.hypothesis ? [i] : [],
  );
  starts.push(particles.length);

  const of = (shown: Float64Array): number => {
    for (let i = 0; i < bins.length; i++) {
      const value = shown[i]!;
      const bin = value === Infinity ? BINS : Math.min(BINS - 1, Math.max(0, binOf(value)));
      bins[i] = bin;
      chance[bin]! += weight[i]!;
    }
    let bits = 0;
    for (let i = 0; i < bins.length; i++) {
      const p = chance[bins[i]!]!;
      if (p === 0) continue;
      bits -= p * Math.log2(p);
      chance[bins[i]!] = 0;
    }
    for (let s = 0; s + 1 < starts.length; s++) bits -= within(starts[s]!, starts[s + 1]!);
    return bits;
  };

  /** What the particles of one hypothesis scatter on their own: p_h·H(bin | h). */
  const within = (first: number, end: number): number => {
    if (end - first < 2) return 0;
    let sum = 0;
    for (let i = first; i < end; i++) sum += weight[i]!;
    let bits = 0;
    for (let i = first; i < end; i++) {
      let together = 0;
      let earlier = false;
      for (let m = first; m < end; m++) {
        if (bins[m] !== bins[i]) continue;
        together += weight[m]!;
        if (m < i) earlier = true;
      }
      if (!earlier && together > 0) bits -= together * Math.log2(together / sum);
    }
    return bits;
  };
  return { of };
}

function binOf(value: number): number {
  return Math.round((value - LOW) / WIDTH);
}
