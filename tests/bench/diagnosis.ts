import { LuDecomposition, Matrix } from 'ml-matrix';
import { diagnose } from '@/domain/diagnosis/diagnose';
import { observe } from '@/domain/diagnosis/meter';
import type { PartMode } from '@/domain/diagnosis/modes';
import { partModes } from '@/domain/diagnosis/modes';
import { predictUnder } from '@/domain/diagnosis/predict';
import { priorsOf } from '@/domain/diagnosis/priors';
import type { DiagnosisInput, Reading } from '@/domain/diagnosis/types';
import type { Circuit } from '@/domain/network/circuit';
import { circuitAt, netNumbers } from '@/domain/network/circuit';
import type { ForcedPart } from '@/domain/network/types';
import { benchMeter } from '../fixtures/networks/large';
import type { BenchRow } from './row';
import { median, row } from './row';

const RUNS = 41;
const PARTS = 40;
const LEAK = 1e-12;

/** Resistances of one circuit by factoring its nodal matrix; a little leakage keeps it regular. */
function factored(circuit: Circuit, pairs: readonly (readonly [number, number])[]): number[] {
  const n = circuit.nets;
  const nodal = Matrix.zeros(n, n);
  for (let net = 0; net < n; net++) nodal.set(net, net, LEAK);
  for (const { a, b, siemens } of circuit.edges) {
    nodal.set(a, a, nodal.get(a, a) + siemens);
    nodal.set(b, b, nodal.get(b, b) + siemens);
    nodal.set(a, b, nodal.get(a, b) - siemens);
    nodal.set(b, a, nodal.get(b, a) - siemens);
  }
  const currents = Matrix.zeros(n, pairs.length);
  pairs.forEach(([a, b], r) => {
    currents.set(a, r, 1);
    currents.set(b, r, -1);
  });
  const volts = new LuDecomposition(nodal).solve(currents);
  return pairs.map(([a, b], r) => volts.get(a, r) - volts.get(b, r));
}

/** Ranks singles and pairs with one solution per hypothesis and position: one resistance a mode, no tolerances. */
function refactoring({ network, readings, incident = 'unknown' }: DiagnosisInput): number[] {
  const modes = partModes(network);
  const priors = priorsOf(network, modes, incident);
  const numbers = netNumbers(network);
  const seen = readings.map(observe);
  const positions = [...new Set(readings.map((reading) => reading.position))];
  const forced = ({ part, mode, low, high }: PartMode): ForcedPart => ({
    ref: network.parts[part]!.ref,
    mode,
    ohms: Math.exp((low + high) / 2),
  });
  const likelihood = (faults: ForcedPart[]): number => {
    let total = 0;
    for (const position of positions) {
      const here = [...readings.keys()].filter((r) => readings[r]!.position === position);
      const pairs = here.map(
        (r) => [numbers.get(readings[r]!.from)!, numbers.get(readings[r]!.to)!] as const,
      );
      const ohms = factored(circuitAt(network, position, [], faults), pairs);
      here.forEach((r, i) => {
        const { over, y, floor, variance } = seen[r]!;
        const error = y - Math.log(Math.max(ohms[i]!, 0) + floor);
        if (over ? error > 0 : true) total -= (0.5 * error * error) / variance;
      });
    }
    return total;
  };
  const weights: number[] = [];
  modes.forEach((one, j) => {
    weights.push(Math.log(priors.odds[j]!) + likelihood([forced(one)]));
    for (const other of modes.slice(0, j))
      if (other.part !== one.part) weights.push(likelihood([forced(one), forced(other)]));
  });
  return weights;
}

function time(runs: number, work: () => unknown): number {
  const times: number[] = [];
  for (let run = 0; run < runs; run++) {
    const start = performance.now();
    work();
    times.push(performance.now() - start);
  }
  return median(times);
}

const cases: readonly { what: string; faults: readonly ForcedPart[] }[] = [
  { what: 'one fault', faults: [{ ref: 'R3', ohms: 4e5 }] },
  {
    what: 'two faults',
    faults: [
      { ref: 'RT1', ohms: 'OL' },
      { ref: 'RV1', ohms: 3 },
    ],
  },
  { what: 'healthy', faults: [] },
];

/** The ranking, and the ranking with the next reading, beside solving the network anew for every hypothesis. */
export async function rows(): Promise<BenchRow[]> {
  const found: BenchRow[] = [];
  const { network, probes } = benchMeter('bench meter', PARTS);
  let other = 0;
  for (const { what, faults } of cases) {
    const values = predictUnder(network, faults, probes);
    const readings: Reading[] = probes.map((probe, i) => ({ ...probe, value: values[i]! }));
    const input = { network, readings, incident: 'mains-on-ohms' as const };
    // The other's work does not depend on what the readings say: once is enough for all cases.
    if (other === 0) other = time(3, () => refactoring(input));
    const name = `Diagnosis, ${PARTS} parts, ${readings.length} readings, ${what}`;
    const note =
      'ml-matrix: one LU factoring per single and pair and position, one resistance a mode';
    time(5, () => diagnose({ ...input, next: false }));
    const ranking = time(RUNS, () => diagnose({ ...input, next: false }));
    found.push(row(name, ranking, other, note));
    const whole = time(RUNS, () => diagnose(input));
    found.push(row(`${name}, with the next reading`, whole, other, note));
  }
  return found;
}
