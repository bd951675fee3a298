import type { Incident, Mode, PartKind } from './kinds';

type Factors = Readonly<Partial<Record<PartKind, Readonly<Partial<Record<Mode, number>>>>>>;

/**
 * What an incident does to the odds of a mode in a kind of part, as a multiplier of its prior.
 * Whatever is not listed stays at 1. Common practice of the trade: no published figures, and an owner may
 * change any of them.
 */
export const INCIDENT_FACTORS: Readonly<Record<Incident, Factors>> = {
  unknown: {},
  // Mains across the ohms jacks: the PTC heats and cracks, whatever clamps behind it takes the rest.
  'mains-on-ohms': {
    ptc: { open: 5, 'drifted-high': 3, short: 2, 'drifted-low': 2 },
    mov: { short: 4, leaky: 4, open: 2 },
    clamp: { short: 5, leaky: 4, open: 2 },
    zener: { short: 4, leaky: 3, open: 1.5 },
    diode: { short: 3, leaky: 2, open: 1.5 },
    gdt: { short: 2, leaky: 2 },
    resistor: { open: 2, 'drifted-high': 2 },
    capacitor: { short: 1.5, leaky: 1.5 },
    contact: { leaky: 1.5, open: 1.5 },
    'ic-pin': { short: 2.5, leaky: 2.5, open: 1.5 },
  },
  // Too much current through the amps jacks: the fuse first, then the shunt and what bridges it.
  'overcurrent-on-amps': {
    fuse: { open: 10, 'drifted-high': 2 },
    shunt: { open: 4, 'drifted-high': 3, 'drifted-low': 1.5 },
    diode: { short: 3, open: 2 },
    contact: { open: 1.5, 'drifted-high': 2 },
    resistor: { open: 1.5 },
  },
  // Beyond the volts range: the divider chain and the surge parts ahead of it.
  'overvoltage-on-volts': {
    resistor: { open: 3, 'drifted-high': 3 },
    mov: { short: 4, leaky: 4, open: 2.5 },
    gdt: { short: 3, leaky: 2.5, open: 1.5 },
    ptc: { open: 2, short: 1.5 },
    capacitor: { short: 2.5, leaky: 2 },
    zener: { short: 2, leaky: 2 },
    clamp: { short: 2, leaky: 2 },
    contact: { leaky: 2 },
    'ic-pin': { short: 2, leaky: 2 },
  },
  // A fall breaks what is brittle, heavy or spring-loaded.
  dropped: {
    contact: { open: 2.5, 'drifted-high': 1.5 },
    capacitor: { short: 2, leaky: 2, open: 2 },
    ptc: { open: 2, 'drifted-high': 2 },
    gdt: { open: 2 },
    inductor: { open: 2.5 },
    trimmer: { 'drifted-high': 2, 'drifted-low': 2, open: 2 },
    resistor: { open: 1.5 },
    fuse: { open: 1.5 },
  },
  // Electrolyte eats contacts and springs, and leaves a conducting film across what it dries on.
  'battery-leak': {
    contact: { open: 3, 'drifted-high': 5, leaky: 4 },
    trimmer: { open: 2, 'drifted-high': 2 },
    resistor: { open: 1.5, 'drifted-low': 2 },
    shunt: { open: 1.5 },
    inductor: { open: 2 },
    capacitor: { leaky: 2 },
    'ic-pin': { leaky: 2, open: 2 },
  },
  wet: {
    contact: { leaky: 4, 'drifted-high': 3, open: 2 },
    trimmer: { open: 1.5, 'drifted-high': 1.5 },
    resistor: { 'drifted-low': 2 },
    capacitor: { leaky: 2.5 },
    mov: { leaky: 1.5 },
    clamp: { leaky: 1.5 },
    'ic-pin': { leaky: 2.5 },
  },
  // Nothing happened, says the customer: overload parts step back, wear comes forward.
  none: {
    fuse: { open: 0.5 },
    ptc: { open: 0.5, short: 0.5 },
    mov: { short: 0.5, leaky: 0.7 },
    gdt: { short: 0.5 },
    shunt: { open: 0.5 },
    contact: { open: 1.5, 'drifted-high': 2, leaky: 1.5 },
    trimmer: { open: 1.5, 'drifted-high': 1.5, 'drifted-low': 1.5 },
  },
};

/**
 * Multiplier (0.5 to 10; 1 when the incident says nothing) of the prior of one mode of one kind.
 * The product with the kind's rate and the mode's share is not a probability yet: cap or normalise it.
 * Source: common practice of the trade, see {@link INCIDENT_FACTORS}.
 */
export function incidentFactor(incident: Incident, kind: PartKind, mode: Mode): number {
  return INCIDENT_FACTORS[incident][kind]?.[mode] ?? 1;
}
