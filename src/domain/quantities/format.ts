import { GREATEST_PREFIX, LEAST_PREFIX, PRINTED_PREFIXES } from './prefixes';

/** Significant digits printed when the resolution of a value is not known. */
const DEFAULT_DIGITS = 4;

/**
 * A value in engineering notation, `1.600 kΩ`.
 *
 * With a resolution (in the same unit) exactly the digits the meter had are printed, and the prefix is
 * chosen so that none is invented: 470 Ω known to 10 Ω is `0.47 kΩ`. Without one, four significant digits at
 * most, trailing zeros dropped.
 *
 * @throws RangeError when the value is not finite or the resolution not positive and finite.
 */
export function formatQuantity(value: number, unit: string, resolution?: number): string {
  if (!Number.isFinite(value)) {
    throw new RangeError(`${value} given, a finite number of ${unit} is needed`);
  }
  const sign = value < 0 ? '\u2212' : '';
  const size = Math.abs(value);
  const [number, exponent] = resolution === undefined ? short(size) : kept(size, resolution);
  return `${sign}${number} ${PRINTED_PREFIXES.get(exponent) ?? ''}${unit}`;
}

/** Ohms in engineering notation, see {@link formatQuantity}. @throws RangeError as there. */
export function formatOhms(ohms: number, resolution?: number): string {
  return formatQuantity(ohms, 'Ω', resolution);
}

export function formatVolts(volts: number, resolution?: number): string {
  return formatQuantity(volts, 'V', resolution);
}

export function formatAmps(amps: number, resolution?: number): string {
  return formatQuantity(amps, 'A', resolution);
}

export function formatWatts(watts: number, resolution?: number): string {
  return formatQuantity(watts, 'W', resolution);
}

export function formatFarads(farads: number, resolution?: number): string {
  return formatQuantity(farads, 'F', resolution);
}

/**
 * Ohms in trade notation, `1k6`, `4M7`, `0R33`, `470R`: six significant digits at most, trailing zeros
 * dropped. The meter's resolution is not kept; {@link formatOhms} keeps it.
 *
 * @throws RangeError when the value is negative or not finite.
 */
export function formatTrade(ohms: number): string {
  if (!Number.isFinite(ohms) || ohms < 0) {
    throw new RangeError(`${ohms} given, a finite resistance of zero or more is needed`);
  }
  const rounded = Number(ohms.toPrecision(6));
  const exponent = rounded < 1e-3 && rounded > 0 ? -3 : Math.max(0, prefixOf(rounded));
  const letter = exponent === 0 ? 'R' : (PRINTED_PREFIXES.get(exponent) ?? 'R');
  const [whole = '0', fraction = ''] = plain(shift(rounded, -exponent)).split('.');
  return `${whole}${letter}${fraction}`;
}

/** Four significant digits, zeros dropped, and the power of ten of the prefix. */
function short(size: number): [string, number] {
  const rounded = Number(size.toPrecision(DEFAULT_DIGITS));
  const exponent = prefixOf(rounded);
  return [plain(shift(rounded, -exponent)), exponent];
}

/** The digits down to the resolution, and the power of ten of a prefix that invents none. */
function kept(size: number, resolution: number): [string, number] {
  if (!Number.isFinite(resolution) || resolution <= 0) {
    throw new RangeError(`resolution ${resolution} given, a positive finite number is needed`);
  }
  const last = Math.floor(Math.log10(resolution) + 1e-9);
  const rounded = shift(Math.round(shift(size, -last)), last);
  const exponent = clampPrefix(Math.max(prefixOf(rounded), Math.ceil(last / 3) * 3));
  return [shift(rounded, -exponent).toFixed(Math.min(100, Math.max(0, exponent - last))), exponent];
}

/** The prefix that leaves 1 to 999 before the point; none for zero. */
function prefixOf(size: number): number {
  if (size === 0) return 0;
  const order = Number(size.toExponential().split('e')[1]);
  return clampPrefix(Math.floor(order / 3) * 3);
}

function clampPrefix(exponent: number): number {
  return Math.min(GREATEST_PREFIX, Math.max(LEAST_PREFIX, exponent));
}

/** Times a power of ten, rounded once as decimal text is, so that 0.1 x 10^3 is 100. */
function shift(value: number, power: number): number {
  const [digits = '0', exponent = '0'] = value.toExponential().split('e');
  return Number(`${digits}e${Number(exponent) + power}`);
}

/** A number without an exponent and without trailing zeros. */
function plain(value: number): string {
  const text = value.toFixed(15);
  return Math.abs(value) >= 1e-6 || value === 0 ? String(value) : text.replace(/0+$/, '');
}
