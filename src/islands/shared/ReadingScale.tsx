import { OHMS, OL_AT, logGraduations, placeLog, planReading } from './scale-geometry';
import { BASE, Band, Graduations, Needle, Predicted, Print, Scale, type Tone } from './ScaleParts';

const WORDS = {
  fits: ', fits',
  above: ', above what fits',
  below: ', below what fits',
  unknown: '',
} as const;

/**
 * A reading on a logarithmic ohms scale: tolerance band shaded, predicted value as a tick, the reading as needle; OL
 * stands beyond the end stop. All rows of a bench sheet share `min` and `max`, so needles compare down the column.
 */
export function ReadingScale({
  measured,
  predicted,
  low,
  high,
  text,
  expectedText,
  label,
  min = 0.1,
  max = 1e8,
  tone,
  numberElsewhere = false,
  wide,
}: {
  /** Ω, or OL for over range. */
  measured: number | 'OL';
  predicted?: number | 'OL' | undefined;
  low?: number | undefined;
  high?: number | 'OL' | undefined;
  /** The reading as written on the bench sheet: "1.600 kΩ". */
  text: string;
  expectedText?: string | undefined;
  /** Between which points: "V to COM". */
  label: string;
  min?: number;
  max?: number;
  /** Overrides the tone that follows from the band. */
  tone?: Tone | undefined;
  /** The number stands in a column of its own. */
  numberElsewhere?: boolean;
  wide?: boolean;
}) {
  const plan = planReading(measured, { predicted, low, high }, min, max);
  const off = plan.verdict === 'above' || plan.verdict === 'below';
  const shown = tone ?? (off ? 'danger' : 'copper');
  const expected = expectedText === undefined ? '' : `, expected ${expectedText}`;
  return (
    <Scale
      name={`${label}: ${text}${expected}${WORDS[plan.verdict]}`}
      number={numberElsewhere ? null : text}
      tone={shown}
      size={wide ? 'wide' : undefined}
    >
      {plan.band && <Band span={plan.band} className="scale-band" />}
      <Graduations
        marks={logGraduations(min, max).filter(({ rank }) => wide || rank < 2)}
        span={OHMS}
      />
      <line
        className="scale-stop"
        x1={`${OHMS.to + 2}%`}
        x2={`${OHMS.to + 2}%`}
        y1={BASE - 12}
        y2={BASE}
      />
      <line
        className="scale-beyond"
        x1={`${OHMS.to + 2}%`}
        x2={`${OL_AT + 4}%`}
        y1={BASE}
        y2={BASE}
      />
      {plan.predicted !== null && <Predicted at={plan.predicted} />}
      {wide && <Print words={numbers(min, max)} />}
      <Needle at={plan.needle} tone={shown} />
    </Scale>
  );
}

const DECADES = [
  { ohms: 1, text: '1 Ω' },
  { ohms: 1e3, text: '1 kΩ' },
  { ohms: 1e6, text: '1 MΩ' },
];

/** The printed numbers of a wide scale: every third decade, and OL beyond the stop. */
function numbers(min: number, max: number) {
  return [
    ...DECADES.filter(({ ohms }) => ohms >= min && ohms <= max).map(({ ohms, text }) => ({
      at: placeLog(ohms, min, max),
      text,
    })),
    { at: OL_AT, text: 'OL' },
  ];
}
