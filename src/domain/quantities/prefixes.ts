/** SI prefixes as powers of ten, with every way they are typed for a resistance. `m` is milli, `M` mega. */
export const TYPED_PREFIXES: Readonly<Record<string, number>> = {
  n: -9,
  u: -6,
  µ: -6,
  m: -3,
  k: 3,
  K: 3,
  M: 6,
  Meg: 6,
  meg: 6,
  MEG: 6,
  G: 9,
  T: 12,
};

/** How a prefix is printed. */
export const PRINTED_PREFIXES: ReadonlyMap<number, string> = new Map([
  [-12, 'p'],
  [-9, 'n'],
  [-6, 'µ'],
  [-3, 'm'],
  [0, ''],
  [3, 'k'],
  [6, 'M'],
  [9, 'G'],
  [12, 'T'],
]);

export const LEAST_PREFIX = -12;
export const GREATEST_PREFIX = 12;
