/** How times and sums are written on screens and papers; formatters are made once and kept. */

export type TimeForm = 'day' | 'minute' | 'short' | 'clock';

const FORMS: Readonly<Record<TimeForm, Intl.DateTimeFormatOptions>> = {
  // Fri 4 Dec 2026
  day: { weekday: 'short', day: 'numeric', month: 'short', year: 'numeric' },
  // 4 Dec 2026, 09:40
  minute: { day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit' },
  // 4 Dec, 09:40
  short: { day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit' },
  // 09:40
  clock: { hour: '2-digit', minute: '2-digit' },
};

const times = new Map<string, Intl.DateTimeFormat>();
const sums = new Map<string, Intl.NumberFormat>();

/**
 * A moment as the shop's clock shows it.
 *
 * @param zone IANA time zone, e.g. `Europe/Dublin`; the shop's setting, never the machine's.
 * @throws RangeError when the zone is not known or the date is not valid.
 */
export function writeTime(at: Date | string, zone: string, form: TimeForm = 'minute'): string {
  const key = `${zone} ${form}`;
  let format = times.get(key);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', { ...FORMS[form], timeZone: zone, hourCycle: 'h23' });
    times.set(key, format);
  }
  return format.format(new Date(at));
}

/**
 * A sum in minor units (cents) as a price: `writeMoney(7248, 'EUR')` is `€72.48`.
 *
 * @param currency ISO 4217 code; its number of decimals is used.
 * @throws RangeError when `minor` is not a whole number or the currency is malformed.
 */
export function writeMoney(minor: number, currency: string): string {
  if (!Number.isSafeInteger(minor)) {
    throw new RangeError(`Sum given as ${minor}; whole minor units are needed.`);
  }
  let format = sums.get(currency);
  if (!format) {
    format = new Intl.NumberFormat('en-GB', { style: 'currency', currency });
    sums.set(currency, format);
  }
  return format.format(minor / 10 ** (format.resolvedOptions().maximumFractionDigits ?? 2));
}
