import { FULL, linearGraduations, placeLinear } from './scale-geometry';
import { Graduations, Needle, Scale, Sector, type Tone } from './ScaleParts';

const MARKS = linearGraduations(10, 10);

/**
 * A probability on a short scale from 0 to 1, written to two decimals beside it (0.004 shows as "< 0.01").
 * `low` and `high` bound the uncertainty drawn as a sector.
 */
export function ProbabilityScale({
  value,
  low = value,
  high = value,
  label,
  tone = 'copper',
}: {
  value: number;
  low?: number;
  high?: number;
  /** What it is the probability of: "RT1 open". */
  label: string;
  tone?: Tone;
}) {
  const at = placeLinear(value, 0, 1);
  const text = writeProbability(value);
  const range =
    low < high ? `, between ${writeProbability(low)} and ${writeProbability(high)}` : '';
  return (
    <Scale name={`${label}: probability ${text}${range}`} number={text} tone={tone} size="short">
      <Graduations marks={MARKS} span={FULL} />
      <Sector at={at} span={{ from: placeLinear(low, 0, 1), to: placeLinear(high, 0, 1) }} />
      <Needle at={at} tone={tone} />
    </Scale>
  );
}

/** Two decimals, never a false certainty: what rounds to 0 or 1 without being it says so. */
export function writeProbability(value: number): string {
  if (value > 0 && value < 0.005) return '< 0.01';
  if (value < 1 && value >= 0.995) return '> 0.99';
  return value.toFixed(2);
}
