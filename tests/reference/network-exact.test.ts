import { describe, expect, it } from 'vitest';
import { effectiveResistance } from '@/domain/network/resistance';
import { edgeTransfers, pairTransfer } from '@/domain/network/transfer';
import { changedResistance } from '@/domain/network/update';
import { exactResistance } from './exact';
import { randomCircuit, withEdges } from './random-networks';
import { seeded } from './seeded';

const relative = (ours: number, exact: number): number =>
  ours === exact ? 0 : Math.abs(ours - exact) / exact;

describe('effective resistance against exact rational arithmetic', () => {
  it('keeps twelve digits over fifteen decades of conductance', () => {
    const random = seeded(11);
    let worst = 0;
    let finite = 0;
    for (let i = 0; i < 200; i++) {
      const nets = 3 + Math.floor(random() * 10);
      const circuit = randomCircuit(random, nets, [1e-3, 1e12]);
      const a = Math.floor(random() * nets);
      const b = (a + 1 + Math.floor(random() * (nets - 1))) % nets;
      const exact = exactResistance(circuit, a, b);
      worst = Math.max(worst, relative(effectiveResistance(circuit, a, b), exact));
      if (Number.isFinite(exact)) finite++;
    }
    expect(finite).toBeGreaterThan(120);
    expect(worst).toBeLessThanOrEqual(1e-12);
  });

  it('keeps nine digits after any one or two edges are opened or shorted', () => {
    const random = seeded(12);
    let worst = 0;
    let separated = 0;
    for (let i = 0; i < 150; i++) {
      const nets = 3 + Math.floor(random() * 8);
      const circuit = randomCircuit(random, nets, [1e-2, 1e9]);
      const a = Math.floor(random() * nets);
      const b = (a + 1 + Math.floor(random() * (nets - 1))) % nets;
      const base = edgeTransfers(circuit);
      const pair = pairTransfer(base.prepared, a, b);
      for (let j = 0; j < circuit.edges.length; j++) {
        const k = Math.floor(random() * circuit.edges.length);
        const change = (edge: number) => ({ edge, siemens: random() < 0.5 ? 0 : 1e6 });
        const changes = j === k ? [change(j)] : [change(j), change(k)];
        const ours = changedResistance(base, pair, [a, b], changes);
        const exact = exactResistance(withEdges(circuit, changes), a, b);
        worst = Math.max(worst, relative(ours, exact));
        if (!Number.isFinite(exact)) separated++;
      }
    }
    expect(separated).toBeGreaterThan(100);
    expect(worst).toBeLessThanOrEqual(1e-9);
  });

  it('gives a near-bridge of one part in 10^12 its digits back', () => {
    const edges = [
      { a: 0, b: 1, siemens: 100 },
      { a: 1, b: 2, siemens: 1 },
      { a: 0, b: 2, siemens: 1e-12 },
    ];
    const base = edgeTransfers({ nets: 3, edges });
    const pair = pairTransfer(base.prepared, 0, 1);
    const opened = changedResistance(base, pair, [0, 1], [{ edge: 0, siemens: 0 }]);
    expect(relative(opened, 1e12 + 1)).toBeLessThan(1e-15);
    const bridge = edgeTransfers({ nets: 3, edges: edges.slice(0, 2) });
    const far = pairTransfer(bridge.prepared, 0, 2);
    expect(changedResistance(bridge, far, [0, 2], [{ edge: 0, siemens: 0 }])).toBe(Infinity);
  });
});
