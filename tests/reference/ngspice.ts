import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** A resistor of a netlist; 0 Ω is a short (a voltage source of 0 V). */
export interface Resistor {
  readonly a: string;
  readonly b: string;
  readonly ohms: number;
}

/** One measurement of one circuit. */
export interface SpiceProbe {
  readonly resistors: readonly Resistor[];
  readonly from: string;
  readonly to: string;
}

/** Nets joined to `from` by resistors. */
function reached({ resistors, from }: SpiceProbe): Set<string> {
  const near = new Map<string, string[]>();
  for (const { a, b } of resistors) {
    near.set(a, [...(near.get(a) ?? []), b]);
    near.set(b, [...(near.get(b) ?? []), a]);
  }
  const seen = new Set([from]);
  for (const net of seen) for (const next of near.get(net) ?? []) seen.add(next);
  return seen;
}

/**
 * A resistor as ngspice keeps its digits: a low one through its current (a sense source and a voltage R·i),
 * because its conductance would swallow that of the gigohms beside it on the matrix's diagonal.
 */
function element(name: string, ends: string, ohms: number): string[] {
  if (ohms === 0) return [`V${name} ${ends} 0`];
  if (ohms > LOW) return [`R${name} ${ends} ${ohms}`];
  const [a, b] = ends.split(' ');
  return [`V${name} ${a} s${name} 0`, `H${name} s${name} ${b} V${name} ${ohms}`];
}

/** Ω */
const LOW = 1000;

/**
 * Resistances by ngspice, all probes in one run: each is a copy of its circuit with its own net names, driven
 * with 1 A into a grounded far end. Nets that nothing joins read Infinity without asking.
 */
export function spiceOhms(probes: readonly SpiceProbe[]): number[] {
  const lines = ['* effective resistances'];
  const asked: number[] = [];
  probes.forEach((probe, index) => {
    const joined = reached(probe);
    if (!joined.has(probe.to) || probe.from === probe.to) return;
    asked.push(index);
    const name = (net: string): string => (net === probe.to ? '0' : `p${index}_${net}`);
    probe.resistors.forEach(({ a, b, ohms }, at) => {
      if (!joined.has(a)) return;
      const ends = `${name(a)} ${name(b)}`;
      lines.push(...element(`${index}_${at}`, ends, ohms));
    });
    lines.push(`I${index} 0 ${name(probe.from)} 1`);
  });
  lines.push('.options gmin=1e-30 reltol=1e-9 abstol=1e-15 vntol=1e-15 rshunt=0', '.control');
  lines.push('set numdgt=14', 'op');
  for (const index of asked) lines.push(`print v(p${index}_${probes[index]!.from})`);
  lines.push('quit 0', '.endc', '.end');
  const folder = mkdtempSync(join(tmpdir(), 'meterwright-spice-'));
  try {
    const file = join(folder, 'network.cir');
    writeFileSync(file, `${lines.join('\n')}\n`);
    const out = execFileSync('ngspice', ['-b', file], { encoding: 'utf8', stdio: 'pipe' });
    const values = new Map(
      [...out.matchAll(/^v\(p(\d+)_[^)]*\) = (\S+)$/gim)].map((m) => [Number(m[1]), Number(m[2])]),
    );
    return probes.map((probe, index) => {
      if (probe.from === probe.to) return 0;
      if (!asked.includes(index)) return Infinity;
      const value = values.get(index);
      if (value === undefined)
        throw new Error(`ngspice printed no value for probe ${index}:\n${out}`);
      return value;
    });
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
