/**
 * The part kinds with an ohms model, the failure modes and the incidents: the closed vocabularies that the
 * API, the database and the computation share.
 */

export const PART_KINDS = [
  'resistor',
  'ptc',
  'ntc',
  'mov',
  'fuse',
  'diode',
  'zener',
  'gdt',
  'capacitor',
  'inductor',
  'contact',
  'shunt',
  'trimmer',
  'clamp',
  'ic-pin',
] as const;
export type PartKind = (typeof PART_KINDS)[number];

export const MODES = ['open', 'short', 'leaky', 'drifted-high', 'drifted-low'] as const;
export type Mode = (typeof MODES)[number];

/** What the customer says happened. `unknown` carries no weight. */
export const INCIDENTS = [
  'unknown',
  'mains-on-ohms',
  'overcurrent-on-amps',
  'overvoltage-on-volts',
  'dropped',
  'battery-leak',
  'wet',
  'none',
] as const;
export type Incident = (typeof INCIDENTS)[number];

/** What the readings say of a part. */
export const STANDINGS = ['suspect', 'cleared', 'untouched'] as const;
export type Standing = (typeof STANDINGS)[number];
