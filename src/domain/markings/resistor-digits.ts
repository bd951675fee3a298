import type { PartKind } from '../parts/kinds';
import type { Decoder } from './reading';
import { scaled, threeDigits } from './reading';
import { letterNote, resistorTolerance } from './tolerance-letters';

/**
 * Three digits, two figures and the zeros after them (`472` is 4.7 kΩ), with or without one of the given
 * tolerance letters. Source: IEC 60062:2016.
 */
export function threeDigitCode(kind: PartKind, source: string, letters: string): Decoder {
  const pattern = new RegExp(`^(\\d{3})([${letters}])?$`);
  return (text) => {
    const [, code = '', letter] = pattern.exec(text) ?? [];
    const value = threeDigits(code);
    if (value === null) return [];
    const tolerance = letter ? resistorTolerance(letter) : null;
    return [
      {
        kind,
        value,
        unit: 'Ω',
        tolerance: tolerance?.fraction ?? null,
        source: source + letterNote(tolerance),
      },
    ];
  };
}

/** Four digits, three figures and the zeros after them: `4701` is 4.7 kΩ. Source: IEC 60062:2016. */
export const fourDigitCode: Decoder = (text) => {
  const match = /^([1-9]\d\d)(\d)$/.exec(text);
  if (!match) return [];
  const value = scaled(match[1] ?? '', Number(match[2]));
  const source = 'IEC 60062:2016, four digits on a surface-mount resistor';
  return [{ kind: 'resistor', value, unit: 'Ω', tolerance: null, source }];
};

/** `0`, `000`, `0000` and a single black band mark a link. */
export const zeroOhm: Decoder = (text) =>
  /^(?:0|000|0000|black)$/i.test(text)
    ? [
        {
          kind: 'resistor',
          value: 0,
          unit: 'Ω',
          tolerance: null,
          source: 'Common practice: zero-ohm link',
        },
      ]
    : [];
