import type { PartKind } from './kinds';

/** A healthy surge part, capacitor or clamp (reverse polarity) reads at least this at a meter's test voltage, in ohms. */
export const HEALTHY_FLOOR_OHMS = 50e6;

/** A PTC's and an NTC's nominal value holds at this temperature (IEC 60738-1 for the PTC's zero-power resistance). */
export const NOMINAL_CELSIUS = 25;

/** Minutes after power or soldering during which a thermistor's reading is doubtful (common practice). */
export const COOLING_MINUTES = 5;

const FLOOR_KINDS: ReadonlySet<PartKind> = new Set<PartKind>([
  'mov',
  'gdt',
  'capacitor',
  'diode',
  'zener',
  'clamp',
  'ic-pin',
]);

// Bench assumptions, except: PTC discs +-20 to +-25 % (makers' data, read in stored text).
const TOLERANCES: Readonly<Record<PartKind, number>> = {
  resistor: 0.05,
  ptc: 0.25,
  ntc: 0.2,
  mov: 0.1,
  fuse: 0.5,
  diode: 0.5,
  zener: 0.5,
  gdt: 0.5,
  capacitor: 0.2,
  inductor: 0.2,
  contact: 0.5,
  shunt: 0.02,
  trimmer: 0.2,
  clamp: 0.5,
  'ic-pin': 0.5,
};

// Bench assumptions; the PTC: common practice, 0.5 to 2 kohm in series with a meter's input.
const NOMINALS: Readonly<Partial<Record<PartKind, number>>> = {
  ptc: 1100,
  fuse: 0.1,
  contact: 0.05,
  inductor: 1,
  shunt: 0.01,
};

/**
 * The tolerance to assume when a part of this kind carries none, as a fraction of its value (0.05 is
 * +-5 %). For kinds with a healthy floor it covers only a resistance that somebody entered by hand; the
 * MOV's is that of its 1 mA voltage (letter K).
 */
export function defaultTolerance(kind: PartKind): number {
  return TOLERANCES[kind];
}

/**
 * The least a healthy part of this kind reads, in ohms, when it has no resistance of its own (MOV, gas
 * tube, capacitor, junctions in reverse, an input pin); `null` for kinds judged against a nominal value.
 */
export function healthyFloor(kind: PartKind): number | null {
  return FLOOR_KINDS.has(kind) ? HEALTHY_FLOOR_OHMS : null;
}

/**
 * The resistance to assume, in ohms, when none is known: a usual value for kinds that have one, the healthy
 * floor for kinds judged by it, `null` where the value has to be given (resistor, NTC, trimmer).
 */
export function defaultOhms(kind: PartKind): number | null {
  return healthyFloor(kind) ?? NOMINALS[kind] ?? null;
}
