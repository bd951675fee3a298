/** How well a fault explains single readings: what a sentence about it can quote. */
import { predictUnder } from '../diagnosis/predict';
import type { Fault } from '../diagnosis/types';
import { healthyOhms, toleranceOf } from '../network/healthy';
import type { ForcedPart, Network, Ohms, Probe } from '../network/types';
import type { Mode } from '../parts/kinds';
import { modeRange } from '../parts/mode-ranges';

export type Taken = Probe & { value: Ohms };

/** Values tried over a mode's range, evenly in ln R. */
const TRIED = 9;
/** Beyond this many factors of e two readings are simply different. */
const FAR = 6;
/** Ω of leads and counts: below it differences say nothing. */
const FLOOR = 0.5;

/** How far a reading lies from a prediction, in factors of e, 6 at most; OL against a value is far. */
export function apart(value: Ohms, predicted: Ohms): number {
  if (value === 'OL' || predicted === 'OL') return value === predicted ? 0 : FAR;
  return Math.min(FAR, Math.abs(Math.log((value + FLOOR) / (predicted + FLOOR))));
}

function valuesOf(network: Network, { ref, mode }: Fault): Ohms[] {
  const part = network.parts.find((p) => p.ref === ref);
  if (!part || mode === 'open') return ['OL'];
  const { low, high } = modeRange(mode, healthyOhms(part), toleranceOf(part));
  return Array.from({ length: TRIED }, (_, i) => low * (high / low) ** (i / (TRIED - 1)));
}

const forced = ({ ref, mode }: Fault, ohms: Ohms): ForcedPart => ({ ref, mode, ohms });

/**
 * The faults with the resistances, one of nine per mode, that bring the predictions closest to the readings; at most
 * two faults are fitted together.
 */
export function fitFaults(
  network: Network,
  faults: readonly Fault[],
  readings: readonly Taken[],
): ForcedPart[] {
  const [first, second] = faults;
  if (!first) return [];
  let best: { faults: ForcedPart[]; off: number } | null = null;
  for (const one of valuesOf(network, first))
    for (const other of second ? valuesOf(network, second) : [null]) {
      const tried = [forced(first, one)];
      if (second && other !== null) tried.push(forced(second, other));
      const shown = predictUnder(network, tried, readings);
      const off = readings.reduce((sum, r, i) => sum + apart(r.value, shown[i] ?? 'OL'), 0);
      if (!best || off < best.off) best = { faults: tried, off };
    }
  return best?.faults ?? [];
}

/** A value in the middle of a mode's range, for asking what a fault would have shown. */
export function typicalFault(network: Network, ref: string, mode: Mode): ForcedPart {
  const values = valuesOf(network, { ref, mode });
  return forced({ ref, mode }, values[Math.floor(values.length / 2)] ?? 'OL');
}
