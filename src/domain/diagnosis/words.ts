import type { Ohms } from '@/domain/network/types';
import { modeLabels } from '@/domain/parts/words';
import { autorangeResolution } from '@/domain/quantities/accuracy';
import { formatOhms } from '@/domain/quantities/format';
import type { Fault, Prediction, Reading } from './types';

/** A value as the meter showed it. */
export function measured(reading: Reading): string {
  const { value } = reading;
  return value === 'OL'
    ? 'OL'
    : formatOhms(value, reading.resolution ?? autorangeResolution(value));
}

/** A predicted value: three digits are all that tolerances leave. */
export function predicted(ohms: Ohms): string {
  return ohms === 'OL' ? 'OL' : formatOhms(Number(ohms.toPrecision(3)));
}

/** A prediction with its band: `1.1 kΩ ±21 %`; `100 mΩ, at most 525 mΩ` where leads and counts rule. */
export function expected({ ohms, band }: Prediction): string {
  if (ohms === 'OL') return 'OL';
  if (band > 0.5) return `${predicted(ohms)}, at most ${predicted(ohms * (1 + band))}`;
  return `${predicted(ohms)} ±${Math.max(1, Math.round(band * 100))} %`;
}

/** `VIN to COM at ohms, R3 lifted`. */
export function place(reading: Omit<Reading, 'value'>): string {
  const at = reading.position === undefined ? '' : ` at ${reading.position}`;
  const lifted = reading.lifted ?? [];
  const off = lifted.length === 0 ? '' : `, ${list(lifted)} lifted`;
  return `${reading.from} to ${reading.to}${at}${off}`;
}

/** `RT1 open and RV1 short`. */
export function faultNames(faults: readonly Fault[]): string {
  return list(faults.map(({ ref, mode }) => `${ref} ${modeLabels[mode]}`));
}

/** `a`, `a and b`, `a, b and c`; beyond `most`, `a, b and 4 more`. */
export function list(words: readonly string[], most = 6): string {
  if (words.length <= 1) return words[0] ?? '';
  const shown = words.length > most ? words.slice(0, most - 1) : words.slice(0, -1);
  const rest = words.length > most ? `${words.length - most + 1} more` : words[words.length - 1]!;
  return `${shown.join(', ')} and ${rest}`;
}
