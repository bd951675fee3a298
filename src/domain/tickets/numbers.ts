/** Ticket numbers: the month of intake in the shop's zone and a running number, "2612-0047". */

/** The month of a moment in a zone: "2612". */
export function monthOf(moment: Date, timeZone: string): string {
  const format = new Intl.DateTimeFormat('en-CA', { timeZone, year: '2-digit', month: '2-digit' });
  const part = (type: string) =>
    format.formatToParts(moment).find((p) => p.type === type)?.value ?? '';
  return part('year') + part('month');
}

export const numberOf = (month: string, running: number): string =>
  `${month}-${String(running).padStart(4, '0')}`;
