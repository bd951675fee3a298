import type { KnownPart } from './check-input';
import { defaultTolerance, HEALTHY_FLOOR_OHMS, healthyFloor } from './defaults';
import { modesOf } from './failure-shares';
import type { Mode, PartKind } from './kinds';
import type { OhmsRange } from './mode-ranges';
import { modeRange, OPEN_CEILING_OHMS } from './mode-ranges';

/** A range with a weight: the value lies anywhere in it, alike in ln R. */
export interface Spread extends OhmsRange {
  readonly weight: number;
}

/** What a part may show, healthy or failed, in ohms. */
export interface Expected {
  /** Healthy readings; `high` is infinite for a part judged by a floor. */
  readonly band: OhmsRange;
  readonly healthy: readonly Spread[];
  readonly modes: ReadonlyArray<OhmsRange & { readonly mode: Mode }>;
  /** `value`: against a value; `usual`: against the kind's usual range; `floor`; `unknown`: neither. */
  readonly judgedBy: 'value' | 'usual' | 'floor' | 'unknown';
}

const JUNCTIONS: ReadonlySet<PartKind> = new Set<PartKind>(['diode', 'zener', 'clamp', 'ic-pin']);
/**
 * How often a sound junction conducts, because the leads are the wrong way round and the meter's test voltage
 * is enough, and what it shows then (bench assumptions).
 */
const FORWARD: Spread = { low: 500, high: HEALTHY_FLOOR_OHMS, weight: 0.01 };

/**
 * What kinds show that carry no value, in ohms. PTC: 0.5 to 2 kohm is usual in a meter's input, widened by
 * its +-25 % (common practice). Contact, winding, shunt: bench assumptions.
 */
const USUAL: Readonly<Partial<Record<PartKind, OhmsRange>>> = {
  ptc: { low: 375, high: 2500 },
  contact: { low: 0.005, high: 0.3 },
  inductor: { low: 0.01, high: 500 },
  shunt: { low: 0.0005, high: 1 },
};

/** A fuse is good below 0.5 ohm from 5 A on, below 12 ohm under that, shunt and leads included (a maker's manual). */
const fuseLimit = (amps: number | null): number => (amps !== null && amps >= 5 ? 0.5 : 12);

/** An NTC moves by 4 to 5 % a kelvin: 5 K off 25 degrees C widens its band by this factor (bench assumption). */
const NTC_SPREAD = 1.25;

export function expectedOf(part: KnownPart): Expected {
  if (part.kind === 'contact' && part.position === 'open') return ofOpenContact();
  if (part.ohms !== null) return ofValue(part, part.ohms);
  const floor = floorOf(part);
  if (floor !== null) return ofFloor(part.kind, floor);
  if (part.kind === 'fuse') {
    const amps = part.marked?.unit === 'A' ? part.marked.value : null;
    return ofBand(part.kind, { low: 0.003, high: fuseLimit(amps) }, 'usual');
  }
  const usual = USUAL[part.kind];
  return usual ? ofBand(part.kind, usual, 'usual') : ofUnknown(part.kind);
}

/** The floor of a capacitor falls with its size: 100 s over C, as the usual leakage of 0.01 C V. */
function floorOf({ kind, marked }: KnownPart): number | null {
  const floor = healthyFloor(kind);
  if (floor === null || kind !== 'capacitor' || marked?.unit !== 'F') return floor;
  return Math.min(floor, 100 / marked.value);
}

function ofValue(part: KnownPart, ohms: number): Expected {
  const { kind } = part;
  // A zero-ohm link still has its own few milliohms.
  if (ohms === 0) return ofBand(kind, { low: 0.001, high: 0.1 }, 'value');
  const tolerance = part.tolerance ?? defaultTolerance(kind);
  const widened = kind === 'ntc' ? NTC_SPREAD : 1;
  const low = (ohms * (1 - tolerance)) / widened;
  return ofBand(kind, { low, high: ohms * (1 + tolerance) * widened }, 'value');
}

function ofBand(kind: PartKind, band: OhmsRange, judgedBy: 'value' | 'usual'): Expected {
  const middle = Math.sqrt(band.low * band.high);
  // Residue shows across open contacts, not through closed ones.
  const shows = (mode: Mode) => kind !== 'contact' || (mode !== 'leaky' && mode !== 'short');
  const modes = modesOf(kind)
    .filter(shows)
    .map((mode) => ({ mode, ...drifted(mode, band, middle) }));
  // A short, a winding or a link cannot be told from less of itself.
  const low = judgedBy === 'usual' && kind !== 'ptc' ? 0 : band.low;
  return { band: { low, high: band.high }, healthy: [{ ...band, weight: 1 }], modes, judgedBy };
}

/** A drift begins where the tolerance ends. */
function drifted(mode: Mode, band: OhmsRange, middle: number): OhmsRange {
  if (mode === 'drifted-high') return { low: band.high, high: band.high * 30 };
  if (mode === 'drifted-low') return { low: band.low / 30, high: band.low };
  return modeRange(mode, middle);
}

function ofFloor(kind: PartKind, floor: number): Expected {
  const sound = { low: floor, high: OPEN_CEILING_OHMS };
  const healthy = JUNCTIONS.has(kind)
    ? [{ ...sound, weight: 1 - FORWARD.weight }, FORWARD]
    : [{ ...sound, weight: 1 }];
  const modes = modesOf(kind).map((mode) => ({ mode, ...modeRange(mode, floor) }));
  return { band: { low: floor, high: Infinity }, healthy, modes, judgedBy: 'floor' };
}

function ofOpenContact(): Expected {
  const modes = (['short', 'leaky'] as const).map((mode) => ({
    mode,
    ...modeRange(mode, HEALTHY_FLOOR_OHMS),
  }));
  const healthy = [{ low: HEALTHY_FLOOR_OHMS, high: OPEN_CEILING_OHMS, weight: 1 }];
  const band = { low: HEALTHY_FLOOR_OHMS, high: Infinity };
  return { band, healthy, modes, judgedBy: 'floor' };
}

/** Without a value only an open and a short stand out. */
function ofUnknown(kind: PartKind): Expected {
  const band = { low: 1, high: 20e6 };
  const modes = modesOf(kind)
    .filter((mode) => mode === 'open' || mode === 'short')
    .map((mode) => ({ mode, ...modeRange(mode, 1e4) }));
  return { band, healthy: [{ ...band, weight: 1 }], modes, judgedBy: 'unknown' };
}
