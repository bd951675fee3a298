import { expect, test } from 'vitest';
import { dayOf, startOfDay } from '@/domain/time/shop-day';

// Offsets and changes of clocks as in the IANA time zone database.
test.each([
  ['2026-12-01', 'Europe/Amsterdam', '2026-11-30T23:00:00.000Z'],
  ['2026-07-01', 'Europe/Amsterdam', '2026-06-30T22:00:00.000Z'],
  // Clocks go forward at 02:00 and back at 03:00: those days begin by the offset before the change.
  ['2026-03-29', 'Europe/Amsterdam', '2026-03-28T23:00:00.000Z'],
  ['2026-10-25', 'Europe/Amsterdam', '2026-10-24T22:00:00.000Z'],
  ['2026-12-01', 'America/New_York', '2026-12-01T05:00:00.000Z'],
  ['2026-12-01', 'Asia/Kathmandu', '2026-11-30T18:15:00.000Z'],
  ['2026-12-01', 'Pacific/Kiritimati', '2026-11-30T10:00:00.000Z'],
  ['2024-02-29', 'UTC', '2024-02-29T00:00:00.000Z'],
])('%s begins in %s at %s', (day, zone, moment) => {
  expect(startOfDay(day, zone).toISOString()).toBe(moment);
});

test.each([
  ['2026-03-29', 23],
  ['2026-10-25', 25],
  ['2026-12-31', 24],
])('%s is %i hours long in Amsterdam', (day, hours) => {
  const zone = 'Europe/Amsterdam';
  const length = startOfDay(day, zone, 1).getTime() - startOfDay(day, zone).getTime();
  expect(length / 3_600_000).toBe(hours);
});

test.each(['', '2026-13', 'tomorrow', '2026-12-1'])('%j is no day', (day) => {
  expect(() => startOfDay(day, 'UTC')).toThrow(/year-month-day is needed/);
});

test('a zone that is not known is refused', () => {
  expect(() => startOfDay('2026-12-01', 'Europe/Nowhere')).toThrow(RangeError);
});

test.each([
  ['2026-11-30T23:30:00Z', 'Europe/Amsterdam', '2026-12-01'],
  ['2026-12-01T04:59:00Z', 'America/New_York', '2026-11-30'],
])('%s is in %s the day %s', (moment, zone, day) => {
  expect(dayOf(new Date(moment), zone)).toBe(day);
});
