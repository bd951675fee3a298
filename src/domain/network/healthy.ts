import { defaultOhms, defaultTolerance, healthyFloor } from '@/domain/parts/defaults';
import type { PartKind } from '@/domain/parts/kinds';
import type { NetworkPart } from './types';

/**
 * What a healthy surge part, capacitor, gas tube or reverse junction is taken to read at a meter's test
 * voltage, Ω: the middle of a log-normal that hardly ever reaches down to the 50 MΩ floor. Bench assumption.
 * A diode or zener below its knee insulates as well; which way round it was probed is not known here.
 */
export const INSULATING_OHMS = 5e9;
/** Standard deviation of ln R around {@link INSULATING_OHMS}: 95 % lie in 0.4 to 64 GΩ. Bench assumption. */
export const INSULATING_SPREAD = 1.3;
/** The least resistance an edge may have, Ω: a zero-ohm link is taken as this. */
export const LEAST_OHMS = 1e-3;
/** What an open switch contact lets through, S (1 TΩ): used by the ranking only, never by a prediction. */
export const OPEN_CONTACT_SIEMENS = 1e-12;

/** True for kinds that have to be given their resistance, because none is usual. */
export function needsOhms(kind: PartKind): boolean {
  return defaultOhms(kind) === null;
}

/**
 * The resistance of the part when healthy, Ω (a closed contact's for a contact): its own value, or the
 * usual one of its kind.
 * @throws RangeError when neither is known; `violations` reports that first.
 */
export function healthyOhms(part: NetworkPart): number {
  if (part.ohms !== undefined) return Math.max(part.ohms, LEAST_OHMS);
  if (healthyFloor(part.kind) !== null) return INSULATING_OHMS;
  const usual = defaultOhms(part.kind);
  if (usual === null) throw new RangeError(`${part.ref} has no ohms, its kind needs them`);
  return usual;
}

/** The part's tolerance as a fraction: its own, or the usual one of its kind. */
export function toleranceOf({ tolerance, kind }: NetworkPart): number {
  return tolerance ?? defaultTolerance(kind);
}

/**
 * Standard deviation of ln R of the healthy part: its tolerance read as a rectangular distribution, a/√3
 * (JCGM 100:2008, 4.3.7), or the wide spread of a part that insulates.
 */
export function healthySpread(part: NetworkPart): number {
  if (part.tolerance === undefined && healthyFloor(part.kind) !== null) return INSULATING_SPREAD;
  return toleranceOf(part) / Math.sqrt(3);
}
