import type { PartKind } from './kinds';

/**
 * How likely one part of a kind is to be faulty in a meter that came in dead.
 *
 * Bench assumption throughout: no published figure covers this population. Only the ratios between kinds
 * matter much; the shop's own closed tickets move them.
 */
export const KIND_RATES: Readonly<Record<PartKind, number>> = {
  fuse: 0.05,
  ptc: 0.05,
  mov: 0.04,
  clamp: 0.04,
  contact: 0.04,
  zener: 0.03,
  'ic-pin': 0.03,
  diode: 0.02,
  ntc: 0.02,
  gdt: 0.015,
  capacitor: 0.015,
  shunt: 0.015,
  trimmer: 0.015,
  resistor: 0.01,
  inductor: 0.01,
};

/**
 * The prior probability (0.01 to 0.05) that one part of this kind is faulty in a meter that came in dead,
 * before the incident and the readings are heard. Source: bench assumption, see {@link KIND_RATES}.
 */
export function kindRate(kind: PartKind): number {
  return KIND_RATES[kind];
}
