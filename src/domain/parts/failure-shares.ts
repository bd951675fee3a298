import type { Mode, PartKind } from './kinds';
import { MODES } from './kinds';

/**
 * How the failures of a kind of part divide over the five modes.
 *
 * The published rows are MIL-HDBK-338B (DoD, 1 October 1998), failure-mode distributions; rows said to be
 * FMD-91 are from memory. Both describe general service, not an overloaded meter, and name modes that are
 * not quite ours: "parameter" and "value" are split here, and each split says that it is a bench assumption.
 * An owner may replace any row; the source travels with it.
 */
export interface ShareRow {
  /** Share of each mode the kind can show. The row sums to 1. */
  readonly shares: Readonly<Partial<Record<Mode, number>>>;
  /** Where the figures come from, and what was assumed to fit them onto our modes. */
  readonly source: string;
  /** `published`: read in a copy; `memory`: published, not re-read; `assumed`: no published figure. */
  readonly certainty: 'published' | 'memory' | 'assumed';
}

export const FAILURE_SHARES: Readonly<Record<PartKind, ShareRow>> = {
  resistor: {
    shares: { open: 0.59, 'drifted-high': 0.3, 'drifted-low': 0.06, short: 0.05 },
    source:
      'MIL-HDBK-338B film resistor: open .59, parameter .36, short .05. Parameter split 5:1 towards high: bench assumption.',
    certainty: 'published',
  },
  ptc: {
    shares: { open: 0.63, 'drifted-high': 0.15, 'drifted-low': 0.07, short: 0.15 },
    source:
      'FMD-91 thermistor, from memory: open .63, parameter .22, short .15. Parameter split 2:1 towards high (cracked ceramic): bench assumption.',
    certainty: 'memory',
  },
  ntc: {
    shares: { open: 0.63, 'drifted-high': 0.11, 'drifted-low': 0.11, short: 0.15 },
    source:
      'FMD-91 thermistor, from memory: open .63, parameter .22, short .15. Parameter split evenly: bench assumption.',
    certainty: 'memory',
  },
  mov: {
    shares: { short: 0.5, leaky: 0.38, open: 0.12 },
    source:
      'Bench assumption: no published distribution found; short and leaky lead, open follows a rupture.',
    certainty: 'assumed',
  },
  fuse: {
    shares: { open: 0.95, 'drifted-high': 0.05 },
    source:
      'Bench assumption: of the published row (MIL-HDBK-338B: fails to open .49, slow .43, premature open .08) the first two cannot be seen on a cold fuse; a poor end cap is what else shows.',
    certainty: 'assumed',
  },
  diode: {
    shares: { short: 0.49, open: 0.36, leaky: 0.15 },
    source:
      'MIL-HDBK-338B diode, general: short .49, open .36, parameter .15. Parameter read as reverse leakage: bench assumption.',
    certainty: 'published',
  },
  zener: {
    shares: { open: 0.45, leaky: 0.35, short: 0.2 },
    source:
      'FMD-91 zener, regulator, from memory: open .45, parameter .35, short .20. Parameter read as leakage below the knee: bench assumption.',
    certainty: 'memory',
  },
  gdt: {
    shares: { short: 0.35, leaky: 0.35, open: 0.3 },
    source:
      'Bench assumption: no published distribution found; sputtered metal shorts or leaks, a cracked tube loses its gas and reads open.',
    certainty: 'assumed',
  },
  capacitor: {
    shares: { short: 0.49, open: 0.32, leaky: 0.19 },
    source:
      'MIL-HDBK-338B ceramic capacitor: short .49, value .29, open .22. Of value, .19 counted as leaky (cracked layers) and .10 as lost capacitance, which direct current reads as open: bench assumption.',
    certainty: 'published',
  },
  inductor: {
    shares: { open: 0.6, short: 0.2, 'drifted-low': 0.12, 'drifted-high': 0.08 },
    source:
      'Bench assumption: burnt wire or a broken tail leads; shorted turns read low or as a short, a dry joint reads high.',
    certainty: 'assumed',
  },
  contact: {
    shares: { open: 0.65, short: 0.16, 'drifted-high': 0.1, leaky: 0.09 },
    source:
      'MIL-HDBK-338B toggle or push-button switch: open .65, sticking .19, short .16. Sticking split into poor contact .10 and residue across open contacts .09: bench assumption.',
    certainty: 'published',
  },
  shunt: {
    shares: { open: 0.65, 'drifted-high': 0.2, 'drifted-low': 0.06, short: 0.09 },
    source:
      'MIL-HDBK-338B wirewound resistor, standing in for a shunt: open .65, parameter .26, short .09. Parameter split towards high (overheated alloy, cracked joint): bench assumption.',
    certainty: 'published',
  },
  trimmer: {
    shares: { open: 0.55, 'drifted-high': 0.25, 'drifted-low': 0.13, short: 0.07 },
    source: 'Bench assumption: a worn or dirty wiper opens or wanders; a short is rare.',
    certainty: 'assumed',
  },
  clamp: {
    shares: { short: 0.48, leaky: 0.25, open: 0.27 },
    source:
      'MIL-HDBK-338B bipolar transistor: short .73, open .27. Of short, .25 counted as leaky, because the input resistors limit the current into a clamp: bench assumption.',
    certainty: 'published',
  },
  'ic-pin': {
    shares: { leaky: 0.45, short: 0.35, open: 0.2 },
    source: 'Bench assumption: an overdriven input leaks or shorts through its own protection.',
    certainty: 'assumed',
  },
};

/**
 * The share of a kind's failures that are of this mode, 0 to 1; 0 for a mode the kind does not show.
 * Summed over the modes of one kind it gives 1. Source: {@link FAILURE_SHARES}.
 */
export function failureShare(kind: PartKind, mode: Mode): number {
  return FAILURE_SHARES[kind].shares[mode] ?? 0;
}

/** The modes a kind can show, in the fixed order of `MODES`. */
export function modesOf(kind: PartKind): Mode[] {
  return MODES.filter((mode) => failureShare(kind, mode) > 0);
}
