import { describe, expect, test } from 'vitest';
import { decodeMarking } from '@/domain/markings/decode';

/** Speed and breaking-capacity letters of IEC 60127: [M] from memory. The rest is as printed. */
describe('fuse markings', () => {
  test.each([
    [
      'F 11A 1000V 10x38',
      11,
      { speed: 'F', speedWords: 'quick acting', volts: 1000, sizeMillimetres: '10x38' },
    ],
    [
      'T630mA L 250V',
      0.63,
      { speed: 'T', speedWords: 'time lag', volts: 250, breaking: 'L', breakingAmps: 35 },
    ],
    ['FF440mA', 0.44, { speed: 'FF', speedWords: 'very quick acting' }],
    [
      'F10AH250V',
      10,
      { speed: 'F', speedWords: 'quick acting', volts: 250, breaking: 'H', breakingAmps: 1500 },
    ],
    [
      'T6.3AL250V',
      6.3,
      { speed: 'T', speedWords: 'time lag', volts: 250, breaking: 'L', breakingAmps: 63 },
    ],
    ['440 mA 1000 V AC/DC 10 kA', 0.44, { volts: 1000, breakingAmps: 10_000 }],
    ['T3,15A 5×20 mm', 3.15, { speed: 'T', speedWords: 'time lag', sizeMillimetres: '5x20' }],
    [
      '10A 600V 30kAIC 10.3x38',
      10,
      { volts: 600, breakingAmps: 30_000, sizeMillimetres: '10.3x38' },
    ],
    ['20A aR 690V', 20, { volts: 690, class: 'aR' }],
    [
      'M 500mA E',
      0.5,
      { speed: 'M', speedWords: 'medium time lag', breaking: 'E', breakingAmps: 150 },
    ],
  ])('%s', (text, value, ratings) => {
    expect(decodeMarking(text, 'fuse')).toMatchObject([
      { kind: 'fuse', value, unit: 'A', tolerance: null },
    ]);
    expect(decodeMarking(text, 'fuse')[0]?.ratings).toEqual(ratings);
  });

  test('letters are said to be from memory, a bare rating is as printed', () => {
    expect(decodeMarking('T2A')[0]?.source).toContain('from memory');
    expect(decodeMarking('2A')).toEqual([
      { kind: 'fuse', value: 2, unit: 'A', tolerance: null, source: 'Rated current as printed' },
    ]);
  });

  test.each(['F', '250V', 'T A', '0A', 'F 10A hello', 'F T 10A', '10A 5A', 'F F 10A', '5000A'])(
    '%s is not read as a fuse',
    (text) => expect(decodeMarking(text, 'fuse')).toEqual([]),
  );
});
