import { describe, expect, test } from 'vitest';
import { decodeMarking } from '@/domain/markings/decode';
import { VARISTORS } from '@/domain/markings/varistor-table';

/** [T] read in a maker's data sheet, [M] from memory, [C] computed. A is document 29082, B 29081. */
const mov = (text: string) => decodeMarking(text, 'mov')[0];

describe('the code, IEC 61051', () => {
  test('14D471K is a 14 mm disc of 470 V at 1 mA, 10 %', () => {
    expect(decodeMarking('14D471K')).toMatchObject([
      { kind: 'mov', value: 470, unit: 'V', tolerance: 0.1, ratings: { discMillimetres: 14 } }, // [T]
    ]);
  });

  test.each([
    ['471K', 423, 517], // [C]
    ['561K', 504, 616], // [C]
    ['471J', 446.5, 493.5], // [C]
  ])('%s spans %d to %d V', (text, lowVolts, highVolts) => {
    expect(mov(text)?.ratings).toMatchObject({ lowVolts, highVolts });
  });

  test('S14K275 names the AC voltage: about 430 V at 1 mA', () => {
    expect(mov('S14K275')).toMatchObject({
      value: 430,
      unit: 'V',
      tolerance: 0.1,
      ratings: { acVolts: 275, discMillimetres: 14 },
    }); // [T]
    expect(mov('S20K40')).toMatchObject({ value: 40, unit: 'V rms', ratings: { acVolts: 40 } });
  });

  test.each(['7D471K', '07D471K', '471KD07', '471K D7'])('%s carries its disc', (text) => {
    expect(mov(text)).toMatchObject({ value: 470, ratings: { discMillimetres: 7, clampAmps: 10 } });
  });

  test.each(['103', '050K', '99D471K', '14D471KD14', '3D471K', 'S14K3', '471X', '14D'])(
    '%s is no varistor',
    (text) => expect(mov(text)).toBeUndefined(),
  );
});

describe('continuous and clamping voltage', () => {
  test.each([
    ['331', 210, 275, 550, [28, 58, 115]], // A [T]
    ['361', 230, 300, 595, [32, 65, 130]], // A [T]
    ['391', 250, 320, 650, [35, 70, 140]], // A [T]
    ['431', 275, 350, 710, [40, 80, 155]], // A [T]
    ['471', 300, 385, 775, [42, 85, 175]], // A [T]
    ['511', 320, 420, 842, [45, 92, 190]], // A [T]
    ['621', 385, 505, 1025, [51, 67, 110]], // B [T]
    ['681', 420, 560, 1120, [56, 73, 120]], // B [T]
    ['751', 460, 615, 1240, [63, 82, 135]], // B [T]
    ['821', 510, 670, 1355, [undefined, 89, 145]], // B [T]
    ['911', 550, 745, 1500, [undefined, 98, 160]], // B [T]
  ] as const)('%sK', (code, acVolts, dcVolts, clampVolts, joules) => {
    for (const [i, [disc, clampAmps]] of [
      [7, 10],
      [10, 25],
      [14, 50],
    ].entries()) {
      const ratings = mov(`${disc}D${code}K`)?.ratings;
      expect(ratings).toMatchObject({ acVolts, dcVolts, clampVolts, clampAmps });
      expect(ratings?.['joules']).toBe(joules[i]);
    }
    expect(mov(`${code}K`)?.source).not.toContain('memory');
  });

  test('rows from memory, whole or in part, say so', () => {
    expect(mov('201K')).toMatchObject({
      ratings: { acVolts: 130, dcVolts: 170, clampVolts: 340 }, // [M]
    });
    // 350 V AC [T], 460 V DC [M], 910 to 925 V [M]: sources differ, both ends are shown.
    expect(mov('561K')).toMatchObject({
      ratings: { acVolts: 350, dcVolts: 460, clampVolts: 925, clampVoltsLow: 910 },
    });
    // 625 V AC [T], 825 V DC [M], 1650 V [M].
    expect(mov('102K')).toMatchObject({
      ratings: { acVolts: 625, dcVolts: 825, clampVolts: 1650 },
    });
    for (const code of ['201', '561', '102']) {
      expect(mov(`${code}K`)?.source).toContain('from memory');
    }
  });

  test('low-voltage discs', () => {
    expect(mov('10D180K')).toMatchObject({
      value: 18,
      ratings: { acVolts: 11, dcVolts: 14, clampVolts: 36, clampAmps: 5 }, // [T]
    });
    expect(mov('14D820K')).toMatchObject({
      value: 82,
      ratings: { acVolts: 50, dcVolts: 65, clampVolts: 135, clampAmps: 50 }, // [T]
    });
    // The sheet prints 16 to 20 and 74 to 90 V, rounded: a strict 10 % lies within half a volt of that.
    expect(mov('10D180K')?.ratings).toMatchObject({ lowVolts: 16.2, highVolts: 19.8 });
    expect(mov('14D820K')?.ratings).toMatchObject({ lowVolts: 73.8, highVolts: 90.2 });
  });

  test('a code outside the table has no ratings made up for it', () => {
    expect(mov('241K')).toMatchObject({ value: 240, tolerance: 0.1 });
    expect(mov('241K')?.ratings).not.toHaveProperty('clampVolts');
    expect(mov('241K')?.source).toContain('not in the table');
  });

  test('within each series every rating rises with the code', () => {
    const series = VARISTORS.filter((row) => row.joules);
    for (const [i, row] of series.entries()) {
      const next = series[i + 1];
      if (!next) continue;
      expect(next.acVolts).toBeGreaterThan(row.acVolts);
      expect(next.dcVolts).toBeGreaterThan(row.dcVolts);
      expect(next.clampVolts[0]).toBeGreaterThan(row.clampVolts[0]);
    }
  });

  test('the cold ohms range cannot see a worn varistor, and the reading says so', () => {
    expect(mov('471K')?.ratings?.['note']).toContain('cannot be seen on the ohms range'); // [T]
  });
});
