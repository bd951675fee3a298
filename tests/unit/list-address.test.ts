import { describe, expect, it } from 'vitest';
import { pagesShown, sortAddress, withParameter } from '@/components/list-address';
import { readTheme } from '@/components/theme';
import { sectionsFor } from '@/layouts/sections';
import { writeMoney, writeTime } from '@/islands/shared/writing';

const url = new URL('http://shop.example/queue?q=a%26b&stage=ready&stage=approved&page=4');

describe('the address of a list in another state', () => {
  it('keeps search and filters, repeated ones too', () => {
    expect(withParameter(url, 'page', '5')).toBe(
      '/queue?q=a%26b&stage=ready&stage=approved&page=5',
    );
    expect(withParameter(url, 'page', null)).toBe('/queue?q=a%26b&stage=ready&stage=approved');
  });

  it('sorts upwards first, downwards when sorted upwards already, and from the first page', () => {
    expect(sortAddress(url, 'number', 'promised')).toBe(
      '/queue?q=a%26b&stage=ready&stage=approved&sort=number',
    );
    expect(sortAddress(url, 'number', 'number')).toMatch(/&sort=-number$/);
    expect(sortAddress(url, 'number', '-number')).toMatch(/&sort=number$/);
  });

  it('shows the ends, the current page and its neighbours, with gaps of two or more pages only', () => {
    expect(pagesShown(7, 16)).toEqual([1, 2, null, 6, 7, 8, null, 15, 16]);
    expect(pagesShown(1, 1)).toEqual([1]);
    expect(pagesShown(4, 7)).toEqual([1, 2, 3, 4, 5, 6, 7]);
    expect(pagesShown(5, 9)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
  });
});

describe('writing', () => {
  const at = new Date('2026-12-04T23:40:00Z');

  it('writes times on the clock of the shop, whatever the machine thinks', () => {
    expect(writeTime(at, 'Europe/Dublin')).toBe('4 Dec 2026, 23:40');
    expect(writeTime(at, 'Asia/Tokyo', 'short')).toBe('5 Dec, 08:40');
    expect(writeTime('2026-12-04T00:05:00Z', 'UTC', 'clock')).toBe('00:05');
    expect(writeTime(at, 'UTC', 'day')).toBe('Fri, 4 Dec 2026');
    expect(() => writeTime(at, 'Moon/Tycho')).toThrow(RangeError);
  });

  it('writes sums with the decimals of their currency', () => {
    expect(writeMoney(7248, 'EUR')).toBe('€72.48');
    expect(writeMoney(-5, 'GBP')).toBe('-£0.05');
    expect(writeMoney(500, 'JPY')).toBe('JP¥500');
    expect(() => writeMoney(0.5, 'EUR')).toThrow(RangeError);
  });
});

describe('what the layouts ask', () => {
  it('shows people to the owner alone', () => {
    expect(sectionsFor('owner').map(({ key }) => key)).toContain('people');
    expect(sectionsFor('senior').map(({ key }) => key)).toEqual([
      'queue',
      'intake',
      'faults',
      'boards',
    ]);
  });

  it('takes only a known theme from the cookie', () => {
    expect(readTheme('dark')).toBe('dark');
    for (const other of ['', 'system', 'DARK', '"><script>', undefined])
      expect(readTheme(other)).toBeNull();
  });
});
