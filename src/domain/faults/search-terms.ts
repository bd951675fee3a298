/** Cuts notes and questions into the terms the fault base is searched by: words, references, values. */

/** A word of a text: where it stands, and the terms it is found by (the first says it best). */
export type Found = { start: number; end: number; terms: string[] };

const STOP = new Set(
  'a an and are as at be by do for from has in into is it its no not of on or so than that the then this to was when with'.split(
    ' ',
  ),
);

const PREFIX: Record<string, number> = {
  p: 1e-12,
  n: 1e-9,
  u: 1e-6,
  µ: 1e-6,
  μ: 1e-6,
  m: 1e-3,
  '': 1,
  k: 1e3,
  K: 1e3,
  M: 1e6,
  G: 1e9,
};

// 1k1, 4M7, 0R33: a resistance with its letter as the decimal point.
const INFIX = /^(\d+)([RrkKMG])(\d+)(?:Ω|ohms?)?$/u;
// 1.1 kΩ, 470 V, 440mA, 10 nF, 4.99M: a number with its unit; k, M and G alone are ohms, p, n and u farads.
const SUFFIX = /^(\d+(?:[.,]\d+)?) ?([pnuµμmkKMG]?)(Ω|[Oo]hms?|R|V|v|A|a|F|W|w|Hz|hz)?$/u;

// Longest first: a number with its unit, else a word with its inner points and dashes.
const WORD =
  /(?<![\p{L}\p{N}])\d+(?:[.,]\d+)? ?(?:[pnuµμmkKMG]?(?:Ω|[Oo]hms?|R|V|v|A|a|F|W|w|Hz|hz)|[pnuµμkKMG])(?![\p{L}\p{N}])|[\p{L}\p{N}][\p{L}\p{N}\p{M}]*(?:[.,+\-–/'’][\p{L}\p{N}][\p{L}\p{N}\p{M}]*)*/gu;

const written = (size: number, unit: string) => `=${Number(size.toPrecision(6))}${unit}`;

/** The same for `1k1`, `1.1 kΩ` and `1.1k`; null for what is no value. */
function valueTerm(text: string): string | null {
  const infix = INFIX.exec(text);
  if (infix) {
    const [, whole, letter = '', rest] = infix;
    const scale = letter === 'R' || letter === 'r' ? 1 : (PREFIX[letter] ?? 1);
    return written(Number(`${whole}.${rest}`) * scale, 'r');
  }
  const suffix = SUFFIX.exec(text);
  if (!suffix) return null;
  const [, number = '', prefix = '', unit = ''] = suffix;
  const size = Number(number.replace(',', '.')) * (PREFIX[prefix] ?? 1);
  if (unit) return written(size, /^(Ω|R|ohms?)$/i.test(unit) ? 'r' : unit.toLowerCase());
  if (/[kKMG]/.test(prefix)) return written(size, 'r');
  return /[pnuµμ]/.test(prefix) ? written(size, 'f') : null;
}

const plain = (text: string) =>
  text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase().replace(/['’]/g, '');

/** One of several: `fuses`, `batteries` and `fuse`, `battery` are the same term. */
function singular(word: string): string {
  if (word.length < 4 || /\d/.test(word)) return word;
  if (word.endsWith('ies') && word.length > 4) return `${word.slice(0, -3)}y`;
  return /[^aius]s$/.test(word) ? word.slice(0, -1) : word;
}

/** The words of a text in order. A dashed one (`LB-40`) is found joined and by its pieces. */
export function scanWords(text: string): Found[] {
  // One ohm sign, one kind of space; each is one unit long, so places stay right.
  const same = text.replaceAll('\u2126', 'Ω').replace(/[\u00a0\u2009\u202f]/g, ' ');
  const found: Found[] = [];
  for (const match of same.matchAll(WORD)) {
    const word = match[0];
    const value = valueTerm(word);
    const terms = new Set<string>();
    if (value) terms.add(value);
    const pieces = word.split(/[+\-–/ ]/u).map(plain);
    const joined = singular(pieces.join(''));
    if (!STOP.has(joined)) terms.add(joined);
    if (pieces.length > 1)
      for (const piece of pieces) if (piece && !STOP.has(piece)) terms.add(singular(piece));
    if (terms.size > 0)
      found.push({ start: match.index, end: match.index + word.length, terms: [...terms] });
  }
  return found;
}

/** All terms of a text, for the index. */
export const termsOf = (text: string): string[] => scanWords(text).flatMap((word) => word.terms);
