import type { Incident } from '@/domain/parts/kinds';

/*
 * Numbers of the diagnosis that no publication gives: bench assumptions, each in one place. The rates and
 * shares of parts are tables of src/domain/parts.
 */

/** Chance that a reading was taken at the wrong point or with a poor touch. */
export const MISPROBE = 0.01;
/** What a misprobe shows: OL this often, or else any value from 0.1 Ω to 100 MΩ alike in ln R. */
export const MISPROBE_OL = 0.3;
export const MISPROBE_DENSITY = (1 - MISPROBE_OL) / Math.log(1e9);

/** Resistance of the leads that nobody subtracted, Ω; on finer meters twice the resolution. */
export const LEAD_OHMS = 0.2;

/** Where one current went through two parts in a row, their faults are not independent: pair odds times this. */
export const SHARED_CAUSE = 4;
/** Incidents in which one current, or one spill, reaches neighbouring parts. */
export const SHARING_INCIDENTS: ReadonlySet<Incident> = new Set<Incident>([
  'mains-on-ohms',
  'overcurrent-on-amps',
  'overvoltage-on-volts',
  'battery-leak',
  'wet',
]);

/** Chance, before any reading, that the input network of a meter that came in dead is sound. */
export const HEALTHY_PRIOR: Readonly<Record<Incident, number>> = {
  unknown: 0.25,
  'mains-on-ohms': 0.05,
  'overcurrent-on-amps': 0.05,
  'overvoltage-on-volts': 0.1,
  dropped: 0.5,
  'battery-leak': 0.35,
  wet: 0.3,
  none: 0.35,
};

/** How many closed tickets the published shares weigh as much as (Dirichlet pseudo-counts). */
export const PUBLISHED_WEIGHT = 8;
