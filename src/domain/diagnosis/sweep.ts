import { allResistances } from '@/domain/network/transfer';
import { DEFAULT_OVER_RANGE_OHMS } from '@/domain/quantities/accuracy';
import type { Particle } from './particles';
import type { QuickBits } from './quick-bits';
import type { Scene, Setting } from './scene';
import { newTrial, setTrial } from './trial';

/** What leads and the last digits leave of the low end, Ω. */
const FLOOR = 0.6;
const TOP = DEFAULT_OVER_RANGE_OHMS;

/** A pair of nets in a setting, and what each particle would make the meter show there, ln Ω. */
export interface Candidate {
  readonly setting: number;
  readonly a: number;
  readonly b: number;
  readonly cost: number;
  readonly shown: Float64Array;
  /** Bits by counting, see {@link QuickBits}. */
  readonly quick: number;
}

/** How every particle changes every setting: three numbers each (see `Trial`). */
interface Drops {
  readonly parts: Int32Array;
  readonly k: Float64Array;
}

export function dropsOf(scene: Scene, particles: readonly Particle[]): Drops {
  const trial = newTrial(scene);
  const settings = scene.settings.length;
  const parts = new Int32Array(particles.length * 2);
  const k = new Float64Array(particles.length * settings * 3);
  particles.forEach((particle, i) => {
    setTrial(scene, trial, particle.j, particle.lnJ, particle.k, particle.lnK);
    parts[i * 2] = trial.j;
    parts[i * 2 + 1] = trial.k;
    for (let s = 0; s < settings; s++) {
      const at = (i * settings + s) * 3;
      k[at] = trial.k11[s]!;
      k[at + 1] = 2 * trial.k12[s]!;
      k[at + 2] = trial.k22[s]!;
    }
  });
  return { parts, k };
}

/** Every pair of nets in one setting that promises at least so many bits. */
export function sweep(
  scene: Scene,
  drops: Drops,
  setting: number,
  cost: number,
  quick: QuickBits,
  least: number,
): Candidate[] {
  const { base } = scene.settings[setting] as Setting;
  const n = base.prepared.circuit.nets;
  const resistances = allResistances(base.prepared);
  const particles = drops.parts.length / 2;
  const shown = new Float64Array(particles);
  const across = new Float64Array(scene.parts + 1);
  const settings = scene.settings.length;
  const found: Candidate[] = [];
  for (let a = 0; a < n; a++)
    for (let b = a + 1; b < n; b++) {
      const ohms = resistances[a * n + b]!;
      if (ohms === Infinity) continue;
      for (let part = 0; part < scene.parts; part++)
        across[part] = base.volts[part * n + a]! - base.volts[part * n + b]!;
      for (let i = 0; i < particles; i++) {
        const zj = across[drops.parts[i * 2]!]!;
        const zk = across[drops.parts[i * 2 + 1]!]!;
        const at = (i * settings + setting) * 3;
        const left =
          ohms - (drops.k[at]! * zj * zj + drops.k[at + 1]! * zj * zk + drops.k[at + 2]! * zk * zk);
        shown[i] = left > TOP ? Infinity : Math.log(Math.max(left, 0) + FLOOR);
      }
      const bits = quick.of(shown);
      if (bits >= least)
        found.push({ setting, a, b, cost, shown: Float64Array.from(shown), quick: bits });
    }
  return found;
}
