/**
 * The bodies of the IEC 60617 symbols, drawn about the lead line y = 22 in a field of 64 by 44. `left` and `right` are
 * where the leads meet the body; `through` bodies carry the lead line across themselves.
 */
import type { ReactNode } from 'react';
import type { PartKind } from '@/domain/parts/kinds';

export interface PartBody {
  readonly left: number;
  readonly right: number;
  readonly drawing: ReactNode;
}

const box = <rect className="symbol-body" x="16" y="15" width="32" height="14" />;

/** A box crossed by the kinked line of a part that is not linear in what stands at its foot. */
const nonLinear = (quantity: string) => (
  <>
    {box}
    <path d="M12 36h7L44 8" />
    <text x="46" y="40">
      {quantity}
    </text>
  </>
);

const boxed = (drawing: ReactNode): PartBody => ({ left: 16, right: 48, drawing });

export const PART_BODIES: Readonly<Record<PartKind, PartBody>> = {
  resistor: boxed(box),
  ptc: boxed(nonLinear('+t°')),
  ntc: boxed(nonLinear('−t°')),
  mov: boxed(nonLinear('U')),
  fuse: boxed(
    <>
      {box}
      <path d="M16 22h32" />
    </>,
  ),
  trimmer: boxed(
    <>
      {box}
      <path d="M19 36L44 9M40.7 6.2l6.6 5.6" />
    </>,
  ),
  shunt: boxed(
    <>
      {box}
      <path d="M22 29v9M42 29v9" />
      <circle cx="22" cy="39.5" r="1.5" />
      <circle cx="42" cy="39.5" r="1.5" />
    </>,
  ),
  diode: {
    left: 23,
    right: 41,
    drawing: (
      <>
        <path className="symbol-body" d="M23 12.5v19L41 22z" />
        <path d="M41 12.5v19M23 22h18" />
      </>
    ),
  },
  zener: {
    left: 23,
    right: 41,
    drawing: (
      <>
        <path className="symbol-body" d="M23 12.5v19L41 22z" />
        <path d="M35 12.5h6v19M23 22h18" />
      </>
    ),
  },
  gdt: {
    left: 19,
    right: 45,
    drawing: (
      <>
        <circle className="symbol-body" cx="32" cy="22" r="13" />
        <path d="M19 22h6M45 22h-6" />
        <path className="symbol-solid" d="M30 22l-6-3.5v7zM34 22l6-3.5v7z" />
        <circle className="symbol-solid" cx="32" cy="30" r="1.6" />
      </>
    ),
  },
  capacitor: {
    left: 28.5,
    right: 35.5,
    drawing: <path className="symbol-heavy" d="M28.5 11v22M35.5 11v22" />,
  },
  inductor: {
    left: 14,
    right: 50,
    drawing: (
      <path d="M14 22a4.5 4.5 0 0 1 9 0a4.5 4.5 0 0 1 9 0a4.5 4.5 0 0 1 9 0a4.5 4.5 0 0 1 9 0" />
    ),
  },
  contact: { left: 21, right: 45, drawing: <path d="M21 22L44 11M45 22v-5" /> },
  clamp: {
    left: 20,
    right: 44,
    drawing: (
      <>
        <path className="symbol-heavy" d="M22 30h20" />
        <path d="M20 22l7 8M37 30l7-8M32 30v7H14V22" />
        <path className="symbol-solid" d="M44 22l-1.4 5.4-3.6-3.2z" />
        <circle className="symbol-solid" cx="14" cy="22" r="1.6" />
      </>
    ),
  },
  'ic-pin': {
    left: 20,
    right: 48,
    drawing: (
      <>
        <rect className="symbol-body" x="25" y="5" width="23" height="34" />
        <path d="M20 12h5M20 22h5M20 32h5" />
        <circle className="symbol-solid" cx="29.5" cy="22" r="1.6" />
      </>
    ),
  },
};
