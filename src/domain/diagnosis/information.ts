/** Values of ln R that one reading may show, each with its chance, doubt and the hypothesis it comes from. */
export interface Outcomes {
  readonly count: number;
  readonly hypothesis: ArrayLike<number>;
  readonly weight: ArrayLike<number>;
  /** ln R; Infinity for OL. */
  readonly shown: ArrayLike<number>;
  /** Standard deviation of ln R shown. */
  readonly doubt: ArrayLike<number>;
}

const LOG2E = Math.LOG2E;
/** Outcomes closer than this many standard deviations count as one. */
const ONE = 0.5;
/** Abscissae and weights of Gauss and Hermite for a standard normal, five points (Abramowitz and Stegun 25.10). */
const POINTS = [-2.8569700138728, -1.3556261799742659, 0, 1.3556261799742659, 2.8569700138728];
const WEIGHTS = [
  0.011257411327720691, 0.2220759220056126, 0.5333333333333333, 0.2220759220056126,
  0.011257411327720691,
];

/** Outcomes merged where the meter cannot tell them apart; OL is one of its own. */
interface Atoms {
  readonly at: number[];
  readonly doubt: number[];
  readonly weight: number[];
  /** Per outcome, its atom. */
  readonly of: Int32Array;
}

function merge(outcomes: Outcomes): Atoms {
  const order = [...Array(outcomes.count).keys()];
  order.sort((a, b) => outcomes.shown[a]! - outcomes.shown[b]!);
  const atoms: Atoms = { at: [], doubt: [], weight: [], of: new Int32Array(outcomes.count) };
  for (const i of order) {
    const last = atoms.at.length - 1;
    const value = outcomes.shown[i]!;
    const same =
      last >= 0 && (atoms.at[last] === value || value - atoms.at[last]! < ONE * outcomes.doubt[i]!);
    if (!same) {
      atoms.at.push(value);
      atoms.doubt.push(outcomes.doubt[i]!);
      atoms.weight.push(0);
    }
    const atom = same ? last : last + 1;
    atoms.of[i] = atom;
    atoms.weight[atom]! += outcomes.weight[i]!;
  }
  return atoms;
}

/** Entropy of a mixture of normals and OL, bits; finite atoms by quadrature. */
function mixtureEntropy(atoms: Atoms, weight: readonly number[]): number {
  let entropy = 0;
  for (let i = 0; i < weight.length; i++) {
    if (weight[i] === 0) continue;
    if (atoms.at[i] === Infinity) {
      entropy -= weight[i]! * Math.log(weight[i]!);
      continue;
    }
    for (let q = 0; q < POINTS.length; q++) {
      const y = atoms.at[i]! + atoms.doubt[i]! * POINTS[q]!;
      let density = 0;
      for (let m = 0; m < weight.length; m++) {
        if (weight[m] === 0 || atoms.at[m] === Infinity) continue;
        const far = (y - atoms.at[m]!) / atoms.doubt[m]!;
        if (far > -7 && far < 7)
          density += (weight[m]! / atoms.doubt[m]!) * Math.exp(-0.5 * far * far);
      }
      entropy -= weight[i]! * WEIGHTS[q]! * Math.log(density / Math.sqrt(2 * Math.PI));
    }
  }
  return entropy * LOG2E;
}

/** What a reading would tell. */
export interface Told {
  readonly bits: number;
  /** Which outcomes it holds apart, numbered by first appearance: equal for readings that ask the same. */
  readonly question: string;
}

/** Outcomes of less weight do not make a question another one. */
const MATTERS = 0.01;

function questionOf(outcomes: Outcomes, atoms: Atoms): string {
  const numbers = new Map<number, number>();
  const parts: number[] = [];
  for (let i = 0; i < outcomes.count; i++) {
    if (outcomes.weight[i]! < MATTERS) continue;
    const atom = atoms.of[i]!;
    if (!numbers.has(atom)) numbers.set(atom, numbers.size);
    parts.push(numbers.get(atom)!);
  }
  return parts.join(' ');
}

/**
 * Mutual information of hypothesis and reading, bits: the expected drop in the entropy of the hypotheses (de
 * Kleer and Williams 1987, one step ahead), `H(Y) − Σ p_h·H(Y|h)` with Y a mixture of normals in ln R and OL.
 */
export function mutualInformation(outcomes: Outcomes): Told {
  const atoms = merge(outcomes);
  const question = questionOf(outcomes, atoms);
  if (atoms.at.length < 2) return { bits: 0, question };
  let bits = mixtureEntropy(atoms, atoms.weight);
  const byHypothesis = new Map<number, number[]>();
  for (let i = 0; i < outcomes.count; i++) {
    const h = outcomes.hypothesis[i]!;
    const weights = byHypothesis.get(h) ?? atoms.weight.map(() => 0);
    weights[atoms.of[i]!]! += outcomes.weight[i]!;
    byHypothesis.set(h, weights);
  }
  const single = atoms.at.map((at, i) =>
    at === Infinity ? 0 : Math.log(atoms.doubt[i]! * Math.sqrt(2 * Math.PI * Math.E)) * LOG2E,
  );
  for (const weights of byHypothesis.values()) {
    const sum = weights.reduce((total, weight) => total + weight, 0);
    const only = weights.findIndex((weight) => weight > 0.999 * sum);
    const inside =
      only >= 0
        ? single[only]!
        : mixtureEntropy(
            atoms,
            weights.map((weight) => weight / sum),
          );
    bits -= sum * inside;
  }
  return { bits: Math.max(0, bits), question };
}
