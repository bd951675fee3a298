import { describe, expect, it } from 'vitest';
import type { Network, NetworkPart } from '@/domain/network/types';
import { violations } from '@/domain/network/validate';

const sound: Network = {
  positions: ['volts', 'ohms'],
  parts: [
    { ref: 'R1', kind: 'resistor', nets: ['A', 'B'], ohms: 1000 },
    { ref: 'S1', kind: 'contact', nets: ['B', 'C'], closed: ['ohms'] },
    { ref: 'RV1', kind: 'mov', nets: ['C', 'COM'] },
  ],
};
const withPart = (part: Partial<NetworkPart>): Network => ({
  ...sound,
  parts: [...sound.parts, { ref: 'X1', kind: 'resistor', nets: ['A', 'COM'], ohms: 1, ...part }],
});
const paths = (network: Network): string[] => violations(network).map(({ path }) => path);

describe('violations of a network', () => {
  it('are none for a sound network', () => {
    expect(violations(sound)).toEqual([]);
  });

  it.each<[string, Partial<NetworkPart>, string]>([
    ['a ref used twice', { ref: 'R1' }, 'parts[3].ref'],
    ['an empty ref', { ref: '' }, 'parts[3].ref'],
    ['both ends on one net', { nets: ['A', 'A'] }, 'parts[3].nets'],
    ['an end on no net', { nets: ['A', ''] }, 'parts[3].nets[1]'],
    ['missing ohms', { ohms: undefined }, 'parts[3].ohms'],
    ['ohms that are no number', { ohms: NaN }, 'parts[3].ohms'],
    ['infinite ohms', { ohms: Infinity }, 'parts[3].ohms'],
    ['negative ohms', { ohms: -1 }, 'parts[3].ohms'],
    ['a tolerance of one', { tolerance: 1 }, 'parts[3].tolerance'],
    ['a tolerance that is no number', { tolerance: NaN }, 'parts[3].tolerance'],
    ['positions on a part that is no contact', { closed: ['ohms'] }, 'parts[3].closed'],
    ['a contact that is never closed', { kind: 'contact', closed: [] }, 'parts[3].closed'],
    ['a contact without positions', { kind: 'contact' }, 'parts[3].closed'],
    ['an unknown position', { kind: 'contact', closed: ['ohms', 'amps'] }, 'parts[3].closed[1]'],
    [
      'a position listed twice',
      { kind: 'contact', closed: ['ohms', 'ohms'] },
      'parts[3].closed[1]',
    ],
  ])('name %s', (_, part, path) => {
    expect(paths(withPart(part))).toEqual([path]);
  });

  it('name the part and its nets', () => {
    const [first] = violations(withPart({ kind: 'contact', closed: [] }));
    expect(first!.message).toContain('X1 (A to COM) is never closed');
  });

  it('are all reported at once, in the order of the network', () => {
    const broken: Network = {
      positions: ['volts', 'volts', ''],
      parts: [
        { ref: 'R1', kind: 'resistor', nets: ['A', 'A'] },
        { ref: 'R1', kind: 'contact', nets: ['A', 'B'], closed: ['amps'] },
      ],
    };
    expect(paths(broken)).toEqual([
      'positions[1]',
      'positions[2]',
      'parts[0].nets',
      'parts[0].ohms',
      'parts[1].ref',
      'parts[1].closed[0]',
    ]);
  });

  it('hold the network to 200 parts and at least one', () => {
    const part = (i: number): NetworkPart => ({ ref: `R${i}`, kind: 'fuse', nets: ['A', `N${i}`] });
    const of = (count: number): Network => ({
      positions: [],
      parts: Array.from({ length: count }, (_, i) => part(i)),
    });
    expect(paths(of(200))).toEqual([]);
    expect(paths(of(201))).toEqual(['parts']);
    expect(paths(of(0))).toEqual(['parts']);
  });

  it.each(['ptc', 'fuse', 'mov', 'inductor', 'shunt', 'clamp'] as const)(
    'let a %s leave its ohms out: it has a usual value',
    (kind) => {
      expect(violations(withPart({ kind, ohms: undefined }))).toEqual([]);
    },
  );
});
