/** The closed lists a ticket is written with: the trade's symptoms, what came along, the cautions to tick. */

export const SYMPTOMS = {
  dead: 'Dead, nothing on the display',
  'dead-on-ohms': 'Ohms reads OL or nothing',
  'dead-on-volts': 'Volts reads zero',
  'dead-on-amps': 'Amps reads zero',
  'reads-wrong-volts': 'Volts reads wrong',
  'reads-wrong-ohms': 'Ohms reads wrong',
  'reads-wrong-amps': 'Amps reads wrong',
  drifts: 'Reading drifts or jumps',
  overload: 'Shows overload with leads open',
  'no-continuity': 'Continuity does not beep',
  display: 'Display segments missing or faint',
  switch: 'Rotary switch skips or is loose',
  battery: 'Battery low sign stays, or drains quickly',
  burnt: 'Burnt smell or visible damage',
  jacks: 'Loose or broken jack',
  other: 'Something else',
} as const;
export type Symptom = keyof typeof SYMPTOMS;
export const SYMPTOM_CODES = Object.keys(SYMPTOMS) as [Symptom, ...Symptom[]];

export const ACCESSORIES = {
  leads: 'Test leads',
  case: 'Case or pouch',
  battery: 'Battery',
  probe: 'Temperature probe',
  clips: 'Clips',
  manual: 'Manual',
  certificate: 'Calibration certificate',
} as const;
export type Accessory = keyof typeof ACCESSORIES;
export const ACCESSORY_CODES = Object.keys(ACCESSORIES) as [Accessory, ...Accessory[]];

/** Ticked at the bench before a reading can be entered. */
export const CAUTIONS = {
  leads: 'Leads out, nothing connected to any jack',
  battery: 'Battery out',
  capacitors: 'Capacitors discharged, and a voltmeter says so',
} as const;
export type Caution = keyof typeof CAUTIONS;
export const CAUTION_CODES = Object.keys(CAUTIONS) as [Caution, ...Caution[]];

export const INCIDENT_LABELS = {
  unknown: 'Not known',
  'mains-on-ohms': 'Mains on an ohms range',
  'overcurrent-on-amps': 'Too much current on amps',
  'overvoltage-on-volts': 'Too much voltage on volts',
  dropped: 'Dropped',
  'battery-leak': 'Battery leaked',
  wet: 'Got wet',
  none: 'Nothing happened, it just stopped',
} as const;
