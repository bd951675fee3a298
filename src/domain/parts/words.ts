import type { Incident, Mode, PartKind, Standing } from './kinds';

/** What the trade calls each kind of part, in running text. */
export const kindLabels: Readonly<Record<PartKind, string>> = {
  resistor: 'resistor',
  ptc: 'PTC thermistor',
  ntc: 'NTC thermistor',
  mov: 'varistor (MOV)',
  fuse: 'fuse',
  diode: 'diode',
  zener: 'zener or TVS',
  gdt: 'gas discharge tube',
  capacitor: 'capacitor',
  inductor: 'inductor',
  contact: 'switch contact',
  shunt: 'current shunt',
  trimmer: 'trimmer',
  clamp: 'clamp transistor',
  'ic-pin': 'IC pin',
};

/** What the trade calls each failure mode. */
export const modeLabels: Readonly<Record<Mode, string>> = {
  open: 'open',
  short: 'short',
  leaky: 'leaky',
  'drifted-high': 'drifted high',
  'drifted-low': 'drifted low',
};

export const incidentLabels: Readonly<Record<Incident, string>> = {
  unknown: 'not known',
  'mains-on-ohms': 'mains on ohms',
  'overcurrent-on-amps': 'overcurrent on amps',
  'overvoltage-on-volts': 'overvoltage on volts',
  dropped: 'dropped',
  'battery-leak': 'battery leak',
  wet: 'wet',
  none: 'nothing happened',
};

export const standingLabels: Readonly<Record<Standing, string>> = {
  suspect: 'suspect',
  cleared: 'cleared',
  untouched: 'untouched',
};
