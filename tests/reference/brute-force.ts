import { MISPROBE } from '@/domain/diagnosis/assumptions';
import type { Observation } from '@/domain/diagnosis/meter';
import { observe } from '@/domain/diagnosis/meter';
import { partModes } from '@/domain/diagnosis/modes';
import { normalCdf } from '@/domain/diagnosis/normal';
import { priorsOf } from '@/domain/diagnosis/priors';
import type { DiagnosisInput, Fault, Reading } from '@/domain/diagnosis/types';
import { conductsAt, faultActs } from '@/domain/network/circuit';
import { healthyOhms, healthySpread } from '@/domain/network/healthy';
import type { Network } from '@/domain/network/types';
import type { Mode } from '@/domain/parts/kinds';

export interface Enumerated {
  readonly faults: readonly Fault[];
  readonly probability: number;
}

/** Resistances per mode: a part that is gone or shorted looks much the same over its range. */
const NODES: Readonly<Record<Mode, number>> = {
  open: 4,
  short: 8,
  leaky: 70,
  'drifted-high': 40,
  'drifted-low': 40,
};
const STEP = 1e-3;

/**
 * The posterior the slow way: every hypothesis, every mode cut into many single resistances, every network
 * solved afresh, tolerances through numeric derivatives, a full covariance whose density is built reading by
 * reading. Shares the priors and the meter model with the diagnosis, nothing of its solving or integrating.
 * Modes are cut evenly in ln Ω, so a meter sharper than the cut wants singles alone (`upTo` 1, cut finer).
 * Misprobes are summed over every subset of readings set aside.
 */
export function enumerate(
  { network, readings, incident = 'unknown' }: DiagnosisInput,
  upTo: 1 | 2,
): Enumerated[] {
  const modes = partModes(network);
  const priors = priorsOf(network, modes, incident);
  const bench = new Bench(network, readings);
  const nodes = (m: number, fine: number): Forced[] => {
    const { part, mode, low, high } = modes[m]!;
    const count = NODES[mode] * fine;
    return Array.from({ length: count }, (_, i) => ({
      part,
      mode,
      ohms: Math.exp(low + ((i + 0.5) / count) * (high - low)),
    }));
  };
  const found: { faults: Fault[]; weight: number }[] = [];
  const add = (list: number[], odds: number): void => {
    const grids = list.map((m) => nodes(m, upTo === 1 ? 60 : list.length === 1 ? 12 : 1));
    let sum = 0;
    let cells = 0;
    for (const one of grids[0] ?? [undefined])
      for (const other of grids[1] ?? [undefined]) {
        const faults = [one, other].filter((f) => f !== undefined);
        sum += bench.likelihood(faults);
        cells++;
      }
    const faults = list.map((m) => ({
      ref: network.parts[modes[m]!.part]!.ref,
      mode: modes[m]!.mode,
    }));
    found.push({ faults, weight: (odds * sum) / cells });
  };
  add([], priors.healthy);
  modes.forEach((one, j) => {
    add([j], priors.odds[j]!);
    for (let k = 0; upTo === 2 && k < j; k++) {
      const other = modes[k]!;
      if (other.part === one.part) continue;
      const shared = priors.shared[one.part * network.parts.length + other.part]!;
      add([k, j], priors.odds[j]! * priors.odds[k]! * shared);
    }
  });
  const total = found.reduce((sum, { weight }) => sum + weight, 0);
  return found
    .map(({ faults, weight }) => ({ faults, probability: weight / total }))
    .sort((a, b) => b.probability - a.probability);
}

interface Forced {
  readonly part: number;
  readonly mode: Mode;
  readonly ohms: number;
}

/** The readings of one network, solved by plain elimination on its nodal matrix. */
class Bench {
  private readonly seen: Observation[];
  private readonly nets: string[];

  constructor(
    private readonly network: Network,
    private readonly readings: readonly Reading[],
  ) {
    this.seen = readings.map(observe);
    this.nets = [...new Set(network.parts.flatMap((part) => part.nets))];
  }

  likelihood(faults: readonly Forced[]): number {
    const { parts } = this.network;
    const middle = this.shown(faults);
    const slopes = parts.map((part, index) => {
      if (faults.some((fault) => fault.part === index)) return middle.map(() => 0);
      const at = (sign: number): number[] =>
        this.shown(faults, { part: index, factor: Math.exp(sign * STEP) });
      const [up, down] = [at(1), at(-1)] as [number[], number[]];
      return up.map((value, r) =>
        Number.isFinite(middle[r]!) ? ((value - down[r]!) / (2 * STEP)) * healthySpread(part) : 0,
      );
    });
    const n = this.readings.length;
    let sum = 0;
    for (let subset = 0; subset < 1 << n; subset++) {
      const kept = [...Array(n).keys()].filter((r) => (subset & (1 << r)) === 0);
      let weight = 1;
      for (let r = 0; r < n; r++)
        weight *= kept.includes(r) ? 1 - MISPROBE : this.seen[r]!.misprobe;
      sum += weight * this.density(kept, middle, slopes);
    }
    return sum;
  }

  /** ln(R + floor) of every reading, with one healthy part off its nominal by a factor. */
  private shown(faults: readonly Forced[], off?: { part: number; factor: number }): number[] {
    return this.readings.map((reading, r) => {
      const position = reading.position ?? this.network.positions[0];
      const siemens = this.network.parts.map((part, index) => {
        const conducts = conductsAt(part, position);
        const fault = faults.find((one) => one.part === index);
        if (fault !== undefined && faultActs(part, conducts, fault.mode)) return 1 / fault.ohms;
        const factor = off?.part === index ? off.factor : 1;
        return conducts ? 1 / (healthyOhms(part) * factor) : 0;
      });
      return Math.log(this.solve(siemens, reading.from, reading.to) + this.seen[r]!.floor);
    });
  }

  /** Voltage of `from` above a grounded `to` at one ampere; Infinity when nothing joins them. */
  private solve(siemens: readonly number[], from: string, to: string): number {
    const free = this.nets.filter((net) => net !== to);
    const n = free.length;
    const rows = free.map(() => new Array<number>(n + 1).fill(0));
    this.network.parts.forEach(({ nets: [a, b] }, index) => {
      const [i, j] = [free.indexOf(a), free.indexOf(b)];
      if (i >= 0) rows[i]![i]! += siemens[index]!;
      if (j >= 0) rows[j]![j]! += siemens[index]!;
      if (i >= 0 && j >= 0) {
        rows[i]![j]! -= siemens[index]!;
        rows[j]![i]! -= siemens[index]!;
      }
    });
    const target = free.indexOf(from);
    rows[target]![n] = 1;
    const order = [...free.keys()].filter((i) => i !== target);
    for (const k of order) {
      const pivot = rows[k]![k]!;
      // A net on its own, or a group that hangs together but not on `to`: 1e-13 S is no part of it.
      if (pivot < 1e-13) continue;
      for (let i = 0; i < n; i++) {
        if (i === k || rows[i]![k] === 0) continue;
        const factor = rows[i]![k]! / pivot;
        for (let j = 0; j <= n; j++) rows[i]![j]! -= factor * rows[k]![j]!;
      }
    }
    const left = rows[target]![target]!;
    return left < 1e-13 ? Infinity : 1 / left;
  }

  /** Density of the values kept, OL readings as censored given the values (one at a time). */
  private density(
    kept: readonly number[],
    middle: readonly number[],
    slopes: readonly (readonly number[])[],
  ): number {
    const { seen } = this;
    const order = [...kept].sort((a, b) => Number(seen[a]!.over) - Number(seen[b]!.over));
    const rows: number[][] = [];
    const solved: number[] = [];
    const values: number[] = [];
    let product = 1;
    for (const r of order) {
      const { over, y, variance } = seen[r]!;
      if (!Number.isFinite(middle[r]!)) {
        if (!over) return 0;
        continue;
      }
      const covariance = (q: number): number =>
        slopes.reduce((total, slope) => total + slope[r]! * slope[q]!, q === r ? variance : 0);
      const row: number[] = [];
      values.forEach((q, i) => {
        let entry = covariance(q);
        for (let m = 0; m < i; m++) entry -= row[m]! * rows[i]![m]!;
        row.push(entry / rows[i]![i]!);
      });
      const own = covariance(r) - row.reduce((total, entry) => total + entry * entry, 0);
      const error = y - middle[r]! - row.reduce((total, entry, i) => total + entry * solved[i]!, 0);
      const deviation = Math.sqrt(own);
      if (over) {
        product *= normalCdf(-error / deviation);
        continue;
      }
      product *= Math.exp(-0.5 * (error / deviation) ** 2) / (deviation * Math.sqrt(2 * Math.PI));
      rows.push([...row, deviation]);
      solved.push(error / deviation);
      values.push(r);
    }
    return product;
  }
}
