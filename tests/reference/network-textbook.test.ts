import { describe, expect, it } from 'vitest';
import { resistanceBetween } from '@/domain/network/resistance';
import type { Network } from '@/domain/network/types';

const resistors = (list: readonly (readonly [string, string, number])[]): Network => ({
  positions: [],
  parts: list.map(([from, to, ohms], i) => ({
    ref: `R${i + 1}`,
    kind: 'resistor' as const,
    nets: [from, to],
    ohms,
  })),
});
const between = (network: Network, from: string, to: string): number =>
  Number(resistanceBetween(network, { from, to }));

describe('textbook networks', () => {
  it('solves the unbalanced bridge of Kuphaldt, Lessons in Electric Circuits', () => {
    // Inputs from memory; 6525/37 Ω computed from them. 24 V drive 136.092 mA.
    const bridge = resistors([
      ['top', 'left', 150],
      ['left', 'bottom', 300],
      ['top', 'right', 50],
      ['right', 'bottom', 250],
      ['left', 'right', 100],
    ]);
    const ohms = between(bridge, 'top', 'bottom');
    expect(ohms).toBeCloseTo(6525 / 37, 9);
    expect(24 / ohms).toBeCloseTo(0.136092, 6);
  });

  it('solves two bridges of 1, 2, 4, 4 and 10 Ω', () => {
    // Computed with Kirchhoff's laws: 76/35 Ω and 182/67 Ω.
    const sides = resistors([
      ['top', 'left', 2],
      ['left', 'bottom', 1],
      ['top', 'right', 4],
      ['right', 'bottom', 4],
      ['left', 'right', 10],
    ]);
    expect(between(sides, 'top', 'bottom')).toBeCloseTo(76 / 35, 12);
    const tops = resistors([
      ['top', 'left', 2],
      ['top', 'right', 1],
      ['left', 'bottom', 4],
      ['right', 'bottom', 4],
      ['left', 'right', 10],
    ]);
    expect(between(tops, 'top', 'bottom')).toBeCloseTo(182 / 67, 12);
  });

  it('measures 2/n across an edge of a complete graph of 1 Ω edges', () => {
    // By Foster's theorem (1949) and symmetry: n − 1 shared among n(n − 1)/2 equal edges.
    for (const n of [3, 4, 5, 9]) {
      const list: [string, string, number][] = [];
      for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) list.push([`n${i}`, `n${j}`, 1]);
      expect(between(resistors(list), 'n0', 'n1')).toBeCloseTo(2 / n, 13);
    }
  });

  it('gives 5/6 Ω across the diagonal of a cube of 1 Ω edges', () => {
    // A classic problem; face diagonal 3/4 Ω, edge 7/12 Ω.
    const list: [string, string, number][] = [];
    for (let i = 0; i < 8; i++)
      for (const bit of [1, 2, 4]) if ((i & bit) === 0) list.push([`n${i}`, `n${i | bit}`, 1]);
    const cube = resistors(list);
    expect(between(cube, 'n0', 'n7')).toBeCloseTo(5 / 6, 13);
    expect(between(cube, 'n0', 'n3')).toBeCloseTo(3 / 4, 13);
    expect(between(cube, 'n0', 'n1')).toBeCloseTo(7 / 12, 13);
  });

  it('makes 10 MΩ of four 2.5 MΩ in series', () => {
    // Common practice of the trade.
    const chain = resistors([0, 1, 2, 3].map((i) => [`n${i}`, `n${i + 1}`, 2.5e6] as const));
    expect(between(chain, 'n0', 'n4')).toBe(1e7);
  });
});
