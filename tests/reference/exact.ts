import type { Circuit } from '@/domain/network/circuit';

/** A double as an exact integer multiple of a power of two. */
function dyadic(value: number): { mantissa: bigint; exponent: number } {
  if (value === 0) return { mantissa: 0n, exponent: 0 };
  let exponent = Math.floor(Math.log2(value)) - 60;
  let scaled = value * 2 ** -exponent;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    exponent -= 1;
  }
  return { mantissa: BigInt(scaled), exponent };
}

/** Exact determinant of an integer matrix (Bareiss 1968); every division is without remainder. */
function determinant(rows: bigint[][]): bigint {
  const m = rows.map((row) => [...row]);
  let previous = 1n;
  let sign = 1n;
  for (let k = 0; k < m.length - 1; k++) {
    if (m[k]![k] === 0n) {
      const swap = m.findIndex((row, i) => i > k && row[k] !== 0n);
      if (swap < 0) return 0n;
      [m[k], m[swap]] = [m[swap]!, m[k]!];
      sign = -sign;
    }
    for (let i = k + 1; i < m.length; i++)
      for (let j = k + 1; j < m.length; j++)
        m[i]![j] = (m[i]![j]! * m[k]![k]! - m[i]![k]! * m[k]![j]!) / previous;
    previous = m[k]![k]!;
  }
  return m.length === 0 ? 1n : sign * m[m.length - 1]![m.length - 1]!;
}

function quotient(numerator: bigint, denominator: bigint): number {
  // 25 decimal digits after the leading one are kept before the last rounding.
  const shift = denominator.toString().length - numerator.toString().length + 25;
  const scaled =
    shift >= 0
      ? (numerator * 10n ** BigInt(shift)) / denominator
      : numerator / (denominator * 10n ** BigInt(-shift));
  return Number(`${scaled}e${-shift}`);
}

/**
 * Effective resistance in exact rational arithmetic: det L without rows a, b over det L without row b, the
 * matrix-tree form of Kirchhoff (1847). Infinity when nothing joins a and b.
 */
export function exactResistance(circuit: Circuit, a: number, b: number): number {
  const parts = circuit.edges.map((edge) => dyadic(edge.siemens));
  const least = Math.min(...parts.filter((p) => p.mantissa > 0n).map((p) => p.exponent));
  const home = reachable(circuit, b);
  if (!home.includes(a)) return Infinity;
  const index = new Map(home.filter((net) => net !== b).map((net, at) => [net, at]));
  const size = index.size;
  const laplacian = Array.from({ length: size }, () => new Array<bigint>(size).fill(0n));
  circuit.edges.forEach((edge, at) => {
    const { mantissa, exponent } = parts[at]!;
    if (mantissa === 0n) return;
    const g = mantissa << BigInt(exponent - least);
    const i = index.get(edge.a);
    const j = index.get(edge.b);
    if (i !== undefined) laplacian[i]![i]! += g;
    if (j !== undefined) laplacian[j]![j]! += g;
    if (i === undefined || j === undefined) return;
    laplacian[i]![j]! -= g;
    laplacian[j]![i]! -= g;
  });
  const cut = index.get(a)!;
  const minor = laplacian.filter((_, i) => i !== cut).map((row) => row.filter((_, j) => j !== cut));
  return quotient(determinant(minor), determinant(laplacian)) * 2 ** -least;
}

function reachable(circuit: Circuit, from: number): number[] {
  const seen = new Set([from]);
  for (const net of seen)
    for (const { a, b, siemens } of circuit.edges) {
      if (siemens === 0) continue;
      if (a === net) seen.add(b);
      if (b === net) seen.add(a);
    }
  return [...seen];
}
