import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Circuit } from '@/domain/network/circuit';
import { bridges, components } from '@/domain/network/connectivity';
import { prepare } from '@/domain/network/drive';
import { effectiveResistance } from '@/domain/network/resistance';
import { sensitivities } from '@/domain/network/sensitivity';
import { edgeTransfers, pairTransfer } from '@/domain/network/transfer';
import { changedResistance } from '@/domain/network/update';
import { randomCircuit, withEdges } from './random-networks';
import { pick, seeded } from './seeded';

/** A random circuit with three of its nets, from one seed; `nets` may coincide in the property's own way. */
const cases = fc
  .record({ seed: fc.integer({ min: 0, max: 2 ** 31 }), nets: fc.integer({ min: 3, max: 14 }) })
  .map(({ seed, nets }) => {
    const random = seeded(seed);
    const circuit = randomCircuit(random, nets);
    const order = [...Array(nets).keys()].sort(() => random() - 0.5);
    const [a, b, c] = order as [number, number, number];
    return { circuit, random, a, b, c };
  })
  .filter(({ circuit }) => circuit.edges.length > 0);

const close = (x: number, y: number, tolerance = 1e-9): boolean =>
  x === y || Math.abs(x - y) <= tolerance * Math.max(Math.abs(x), Math.abs(y));

const edgeSum = (circuit: Circuit): number => {
  const base = edgeTransfers(circuit);
  return circuit.edges.reduce((sum, edge, k) => sum + edge.siemens * base.ohms[k]!, 0);
};

describe('laws of effective resistance', () => {
  it('is symmetric, zero from a net to itself, and a metric', () => {
    fc.assert(
      fc.property(cases, ({ circuit, a, b, c }) => {
        const ab = effectiveResistance(circuit, a, b);
        const [ac, cb] = [effectiveResistance(circuit, a, c), effectiveResistance(circuit, c, b)];
        return (
          close(ab, effectiveResistance(circuit, b, a)) &&
          effectiveResistance(circuit, a, a) === 0 &&
          ab <= (ac + cb) * (1 + 1e-12)
        );
      }),
    );
  });

  it('falls when an edge conducts more and rises when it is lost (Rayleigh)', () => {
    fc.assert(
      fc.property(cases, ({ circuit, random, a, b }) => {
        const edge = Math.floor(random() * circuit.edges.length);
        const { siemens } = circuit.edges[edge]!;
        const now = effectiveResistance(circuit, a, b);
        const more = effectiveResistance(
          withEdges(circuit, [{ edge, siemens: siemens * 7 }]),
          a,
          b,
        );
        const lost = effectiveResistance(withEdges(circuit, [{ edge, siemens: 0 }]), a, b);
        return more <= now * (1 + 1e-12) && lost >= now * (1 - 1e-12);
      }),
    );
  });

  it('shares n − components over the edges (Foster 1949)', () => {
    fc.assert(
      fc.property(cases, ({ circuit }) => {
        const pieces = new Set(components(circuit)).size;
        return close(edgeSum(circuit), circuit.nets - pieces);
      }),
    );
  });

  it('adds in series and adds conductance in parallel', () => {
    fc.assert(
      fc.property(
        cases,
        fc.double({ min: 0.01, max: 1e9, noNaN: true }),
        ({ circuit, a, b }, ohms) => {
          const now = effectiveResistance(circuit, a, b);
          const tail = { a: b, b: circuit.nets, siemens: 1 / ohms };
          const longer = { nets: circuit.nets + 1, edges: [...circuit.edges, tail] };
          const beside = {
            nets: circuit.nets,
            edges: [...circuit.edges, { a, b, siemens: 1 / ohms }],
          };
          return (
            close(effectiveResistance(longer, a, circuit.nets), now + ohms) &&
            close(effectiveResistance(beside, a, b), 1 / (1 / now + 1 / ohms))
          );
        },
      ),
    );
  });

  it('scales with its resistances', () => {
    fc.assert(
      fc.property(cases, fc.constantFrom(1e-3, 0.3, 7, 1e4), ({ circuit, a, b }, factor) => {
        const edges = circuit.edges.map((e) => ({ ...e, siemens: e.siemens / factor }));
        const scaled = effectiveResistance({ nets: circuit.nets, edges }, a, b);
        return close(scaled, factor * effectiveResistance(circuit, a, b));
      }),
    );
  });
});

describe('changes without solving again', () => {
  it('equal a fresh solution for one and two edges, shorts and opens', () => {
    fc.assert(
      fc.property(cases, ({ circuit, random, a, b }) => {
        const base = edgeTransfers(circuit);
        const pair = pairTransfer(base.prepared, a, b);
        const change = (edge: number) => ({
          edge,
          siemens: pick(random, [0, 1e12, circuit.edges[edge]!.siemens * 5, 1e-9]),
        });
        const j = Math.floor(random() * circuit.edges.length);
        const k = Math.floor(random() * circuit.edges.length);
        const changes = j === k ? [change(j)] : [change(j), change(k)];
        const fresh = effectiveResistance(withEdges(circuit, changes), a, b);
        return close(changedResistance(base, pair, [a, b], changes), fresh, 1e-8);
      }),
      { numRuns: 300 },
    );
  });

  it('separate exactly where a bridge is opened', () => {
    fc.assert(
      fc.property(cases, ({ circuit }) => {
        const base = edgeTransfers(circuit);
        return bridges(circuit).every((edge) => {
          const { a, b } = circuit.edges[edge]!;
          const pair = pairTransfer(base.prepared, a, b);
          const opened = changedResistance(base, pair, [a, b], [{ edge, siemens: 0 }]);
          return base.away[edge] === 0 && opened === Infinity;
        });
      }),
    );
  });

  it('refuse a third change and the same edge twice', () => {
    const circuit = randomCircuit(seeded(3), 5);
    const base = edgeTransfers(circuit);
    const pair = pairTransfer(base.prepared, 0, 1);
    const change = (edge: number) => ({ edge, siemens: 1 });
    const refused = (edges: number[]) => () =>
      changedResistance(base, pair, [0, 1], edges.map(change));
    expect(refused([0, 1, 2])).toThrow(RangeError);
    expect(refused([1, 1])).toThrow(RangeError);
  });
});

describe('sensitivities', () => {
  it('sum to 1 and equal central differences', () => {
    fc.assert(
      fc.property(cases, ({ circuit, a, b }) => {
        const pair = pairTransfer(prepare(circuit), a, b);
        if (!Number.isFinite(pair.ohms)) return true;
        const shares = sensitivities(circuit, pair);
        const sum = shares.reduce((total, share) => total + share, 0);
        const step = 1e-4;
        const differ = circuit.edges.every(({ siemens }, edge) => {
          const at = (sign: number): number =>
            Math.log(
              effectiveResistance(
                withEdges(circuit, [{ edge, siemens: siemens * Math.exp(-sign * step) }]),
                a,
                b,
              ),
            );
          return Math.abs((at(1) - at(-1)) / (2 * step) - shares[edge]!) < 1e-7;
        });
        return close(sum, 1) && differ;
      }),
    );
  });
});
