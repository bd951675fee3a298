/** Days of the shop's calendar as moments in UTC. */

const formats = new Map<string, Intl.DateTimeFormat>();

function offsetAt(moment: number, zone: string): number {
  let format = formats.get(zone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', {
      timeZone: zone,
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
      hourCycle: 'h23',
    });
    formats.set(zone, format);
  }
  const part = Object.fromEntries(
    format.formatToParts(moment).map(({ type, value }) => [type, Number(value)]),
  );
  const { year = 0, month = 1, day = 1, hour = 0, minute = 0, second = 0 } = part;
  return Date.UTC(year, month - 1, day, hour, minute, second) - Math.floor(moment / 1000) * 1000;
}

/**
 * When a day begins by the shop's clock.
 *
 * @param day year-month-day, 1970 to 2199.
 * @param zone IANA time zone, e.g. `Europe/Dublin`.
 * @param later days to add first: 1 gives the end of the day.
 * @throws RangeError when the day or the zone is not valid.
 */
export function startOfDay(day: string, zone: string, later = 0): Date {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day);
  const [year, month, date] = match ? match.slice(1).map(Number) : [];
  if (year === undefined || month === undefined || date === undefined)
    throw new RangeError(`Day given as ${day}; year-month-day is needed.`);
  const asUtc = Date.UTC(year, month - 1, date + later);
  if (!Number.isFinite(asUtc)) throw new RangeError(`Day given as ${day}; a date is needed.`);
  // The offset a few hours off may be that of the other side of a change of clocks: look again from the answer.
  const first = asUtc - offsetAt(asUtc, zone);
  return new Date(asUtc - offsetAt(first, zone));
}

/** The calendar day of a moment in the shop's zone, as year-month-day. */
export function dayOf(moment: Date, timeZone: string): string {
  return new Intl.DateTimeFormat('en-CA', { timeZone }).format(moment);
}
