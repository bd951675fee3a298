import { describe, expect, it } from 'vitest';
import type { Circuit } from '@/domain/network/circuit';
import { effectiveResistance } from '@/domain/network/resistance';
import { edgeTransfers, pairTransfer } from '@/domain/network/transfer';
import { changedResistance } from '@/domain/network/update';
import type { SpiceProbe } from './ngspice';
import { spiceOhms } from './ngspice';
import { randomCircuit } from './random-networks';
import { seeded } from './seeded';

const TOLERANCE = 1e-6;
const SHORT = 1e15;

function probeOf(circuit: Circuit, from: number, to: number): SpiceProbe {
  const resistors = circuit.edges
    .filter((edge) => edge.siemens > 0)
    .map(({ a, b, siemens }) => ({
      a: `n${a}`,
      b: `n${b}`,
      ohms: siemens >= SHORT ? 0 : 1 / siemens,
    }));
  return { resistors, from: `n${from}`, to: `n${to}` };
}

function expectClose(ours: number, spice: number, what: string): void {
  if (!Number.isFinite(spice) || !Number.isFinite(ours)) expect(ours, what).toBe(spice);
  else expect(Math.abs(ours - spice) / spice, what).toBeLessThanOrEqual(TOLERANCE);
}

describe('effective resistance against ngspice', () => {
  const spans = [
    [1, 1e6],
    [10, 1e7],
    [0.01, 1e9],
  ] as const;

  it('agrees on random networks of 3 to 40 nets', () => {
    const random = seeded(1);
    const cases = Array.from({ length: 90 }, (_, i) => {
      const nets = 3 + Math.floor(random() * 38);
      const circuit = randomCircuit(random, nets, spans[i % 3]!);
      const from = Math.floor(random() * nets);
      const to = (from + 1 + Math.floor(random() * (nets - 1))) % nets;
      return { circuit, from, to };
    });
    const spice = spiceOhms(cases.map(({ circuit, from, to }) => probeOf(circuit, from, to)));
    cases.forEach(({ circuit, from, to }, i) =>
      expectClose(effectiveResistance(circuit, from, to), spice[i]!, `network ${i}`),
    );
    expect(spice.filter(Number.isFinite).length).toBeGreaterThan(60);
    expect(spice.filter((ohms) => !Number.isFinite(ohms)).length).toBeGreaterThan(2);
  });

  it('agrees after one or two edges opened, shorted or changed, without solving again', () => {
    const random = seeded(2);
    const probes: SpiceProbe[] = [];
    const ours: number[] = [];
    for (let i = 0; i < 120; i++) {
      const nets = 3 + Math.floor(random() * 38);
      const circuit = randomCircuit(random, nets, spans[i % 3]!);
      const from = Math.floor(random() * nets);
      const to = (from + 1 + Math.floor(random() * (nets - 1))) % nets;
      const first = Math.floor(random() * circuit.edges.length);
      const second = (first + 1) % circuit.edges.length;
      const choice = (): number =>
        [0, SHORT, circuit.edges[first]!.siemens * 3][Math.floor(random() * 3)]!;
      const changes = [{ edge: first, siemens: choice() }];
      if (second !== first && i % 3 > 0) changes.push({ edge: second, siemens: choice() });
      const base = edgeTransfers(circuit);
      const pair = pairTransfer(base.prepared, from, to);
      const exact = changes.map((c) => ({
        ...c,
        siemens: c.siemens === SHORT ? Infinity : c.siemens,
      }));
      const edges = [...circuit.edges];
      for (const change of changes) edges[change.edge] = { ...edges[change.edge]!, ...change };
      const altered = probeOf({ nets, edges }, from, to);
      const shorts = altered.resistors.filter((r) => r.ohms === 0);
      // Two shorts in parallel are a loop of voltage sources, which ngspice refuses.
      const loop =
        shorts.length === 2 && shorts[0]!.a + shorts[0]!.b === shorts[1]!.a + shorts[1]!.b;
      if (loop) continue;
      probes.push(altered);
      ours.push(changedResistance(base, pair, [from, to], exact));
    }
    const spice = spiceOhms(probes);
    let opened = 0;
    ours.forEach((value, i) => {
      if (spice[i]! < 1e-9) expect(value, `network ${i}`).toBeLessThan(1e-9);
      else expectClose(value, spice[i]!, `network ${i}`);
      if (!Number.isFinite(spice[i]!)) opened++;
    });
    expect(opened).toBeGreaterThan(5);
    expect(ours.length).toBeGreaterThan(100);
  });
});
