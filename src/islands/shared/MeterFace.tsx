import { dialPoint, ohmmeterDeflection } from './scale-geometry';

/** Ω at half scale of the printed ohms scale. */
const MID = 20;
const OHMS_NUMBERED = [0, 2, 5, 10, 20, 30, 50, 100, 200];
const OHMS_MARKS = [
  ...[1, 3, 4, 6, 7, 8, 9, 12, 14, 16, 18, 22, 24, 26, 28, 35, 40, 45, 60, 70, 80, 90, 150, 500],
  ...OHMS_NUMBERED,
];
const VOLT_MARKS = Array.from({ length: 51 }, (_, i) => i / 50);

/** Radii from the pivot, in the drawing's units. */
const OHMS_ARC = 236;
const VOLTS_ARC = 214;

const stroke = (deflection: number, from: number, to: number) => {
  const a = dialPoint(deflection, from);
  const b = dialPoint(deflection, to);
  return `M${a.x} ${a.y}L${b.x} ${b.y}`;
};

const arc = (radius: number) => {
  const a = dialPoint(0, radius);
  const b = dialPoint(1, radius);
  return `M${a.x} ${a.y}A${radius} ${radius} 0 0 1 ${b.x} ${b.y}`;
};

function Number({ at, radius, text }: { at: number; radius: number; text: string }) {
  const { x, y } = dialPoint(at, radius);
  return (
    <text x={x} y={y} textAnchor="middle" dominantBaseline="central">
      {text}
    </text>
  );
}

/**
 * The face of a moving-coil meter: an ohms scale from open leads to shorted ones as its own movement bends it, a
 * volts scale under it, the needle at `deflection` (0 to 1). An ornament: it says nothing a reader would miss.
 */
export function MeterFace({ deflection }: { deflection: number }) {
  return (
    <svg className="meter-face" viewBox="-206 -272 412 176" aria-hidden="true">
      <path d={arc(OHMS_ARC)} />
      {OHMS_MARKS.map((ohms) => (
        <path
          key={ohms}
          className={OHMS_NUMBERED.includes(ohms) ? 'meter-face-long' : undefined}
          d={stroke(
            ohmmeterDeflection(ohms, MID),
            OHMS_ARC,
            OHMS_ARC + (OHMS_NUMBERED.includes(ohms) ? 13 : 8),
          )}
        />
      ))}
      <path className="meter-face-long" d={stroke(0, OHMS_ARC, OHMS_ARC + 13)} />
      {OHMS_NUMBERED.map((ohms) => (
        <Number
          key={ohms}
          at={ohmmeterDeflection(ohms, MID)}
          radius={OHMS_ARC + 23}
          text={String(ohms)}
        />
      ))}
      <Number at={0} radius={OHMS_ARC + 23} text="∞" />
      <Number at={-0.06} radius={OHMS_ARC + 8} text="Ω" />
      <path d={arc(VOLTS_ARC)} />
      {VOLT_MARKS.map((at, i) => (
        <path
          key={at}
          className={i % 10 === 0 ? 'meter-face-long' : undefined}
          d={stroke(at, VOLTS_ARC, VOLTS_ARC - (i % 10 === 0 ? 12 : i % 5 === 0 ? 9 : 6))}
        />
      ))}
      {[0, 2, 4, 6, 8, 10].map((volts) => (
        <Number key={volts} at={volts / 10} radius={VOLTS_ARC - 23} text={String(volts)} />
      ))}
      <Number at={-0.06} radius={VOLTS_ARC - 8} text="V" />
      <path className="meter-face-needle" d={stroke(deflection, 60, OHMS_ARC + 4)} />
    </svg>
  );
}
