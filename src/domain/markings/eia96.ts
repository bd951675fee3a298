import { seriesValues } from './preferred';
import type { Decoder, MarkingReading } from './reading';
import { scaled } from './reading';

const E96 = seriesValues(96);

const MULTIPLIERS: Readonly<Record<string, number>> = {
  Z: -3,
  Y: -2,
  X: -1,
  A: 0,
  B: 1,
  C: 2,
  D: 3,
  E: 4,
  F: 5,
};

/** Letters on which charts disagree, or that stand for another: every exponent in use, all from memory. */
const UNSETTLED: Readonly<Record<string, readonly number[]>> = { R: [-2], S: [-1], H: [1, 7] };

/**
 * The EIA-96 code of 1 % surface-mount resistors: a number from 01 to 96 for the E96 figure and a letter for
 * the power of ten (`01C` is 10 kΩ). Sources: EIA-96; IEC 60063 for the figures. H has two meanings in
 * circulation: both are given.
 */
export const eia96: Decoder = (text) => {
  const match = /^(\d\d)([A-FHR-SX-Z])$/.exec(text);
  const figure = E96[Number(match?.[1]) - 1];
  const letter = match?.[2] ?? '';
  if (figure === undefined) return [];
  const answer = (exponent: number, source: string): MarkingReading => ({
    kind: 'resistor',
    value: scaled(String(figure), exponent),
    unit: 'Ω',
    tolerance: 0.01,
    source,
  });
  const settled = MULTIPLIERS[letter];
  if (settled !== undefined) return [answer(settled, 'EIA-96, figures of IEC 60063')];
  return (UNSETTLED[letter] ?? []).map((exponent) =>
    answer(exponent, `EIA-96, multiplier letter ${letter} from memory: charts differ`),
  );
};
