import { FULL, linearGraduations, planAccuracy } from './scale-geometry';
import { BASE, Band, Graduations, Needle, Print, Scale, Sector, type Tone } from './ScaleParts';

// 32 steps over ±1.6 limits: a tenth of the limit each, long at zero and at the limits' halves.
const MARKS = linearGraduations(32, 16);

/**
 * The error of an accuracy point: the limits as stops, the guard bands inside them shaded, the error as needle with
 * its expanded uncertainty as a sector. All quantities in one unit; `text` writes the error with it.
 */
export function AccuracyScale({
  error,
  limit,
  guard = 0,
  uncertainty = 0,
  text,
  label,
  limitText,
  verdict,
  tone = 'copper',
  wide,
}: {
  error: number;
  limit: number;
  guard?: number;
  uncertainty?: number;
  /** "+0.12 mV of ±0.50 mV". */
  text: string;
  /** The point: "DC volts 6 V at 5 V". */
  label: string;
  /** The limit as printed under a wide scale: "0.50 mV". */
  limitText?: string;
  /** The verdict in words, when there is one: "pass". */
  verdict?: string;
  tone?: Tone;
  wide?: boolean;
}) {
  const plan = planAccuracy(error, limit, guard, uncertainty);
  const beyond = plan.beyond ? ', beyond the scale' : '';
  return (
    <Scale
      name={`${label}: error ${text}${beyond}${verdict === undefined ? '' : `, ${verdict}`}`}
      number={text}
      tone={tone}
      size={wide ? 'wide' : undefined}
    >
      <Band span={{ from: plan.limits.from, to: plan.accepted.from }} className="scale-guard" />
      <Band span={{ from: plan.accepted.to, to: plan.limits.to }} className="scale-guard" />
      <Band span={plan.accepted} className="scale-accepted" />
      <Graduations marks={MARKS} span={FULL} />
      {[plan.limits.from, plan.limits.to].map((at) => (
        <line
          key={at}
          className="scale-stop"
          x1={`${at}%`}
          x2={`${at}%`}
          y1={BASE - 16}
          y2={BASE}
        />
      ))}
      <Sector at={plan.needle} span={plan.sector} />
      {wide && (
        <Print
          words={[
            { at: plan.zero, text: '0' },
            ...(limitText === undefined
              ? []
              : [
                  { at: plan.limits.from, text: `−${limitText}` },
                  { at: plan.limits.to, text: `+${limitText}` },
                ]),
          ]}
        />
      )}
      <Needle at={plan.needle} tone={tone} />
    </Scale>
  );
}
