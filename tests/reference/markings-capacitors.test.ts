import { describe, expect, test } from 'vitest';
import { decodeMarking } from '@/domain/markings/decode';

/** [T] read in a stored text of the standard, [M] from memory, [C] computed, [P] common practice. */
const farads = (text: string) =>
  decodeMarking(text, 'capacitor').map(({ value, tolerance }) => [value, tolerance]);

describe('values, IEC 60062:2016', () => {
  test.each([
    ['103', 10e-9, null], // [T]
    ['104K', 100e-9, 0.1], // [C]
    ['471J', 470e-12, 0.05], // [C]
    ['220', 22e-12, null], // [C]
    ['104M', 100e-9, 0.2], // [C]
    ['4n7', 4.7e-9, null], // [C]
    ['4p7', 4.7e-12, null], // [C]
    ['µ47', 470e-9, null], // [C]
    ['1u5K', 1.5e-6, 0.1], // [C]
    ['100nJ', 100e-9, 0.05], // [C]
    ['0.1µF', 100e-9, null], // [C]
    ['22pF', 22e-12, null], // [C]
    ['.047', 47e-9, null], // [P]
    ['22', 22e-12, null], // [P]
    ['109', 1e-12, null], // [M]
    ['228', 0.22e-12, null], // [M]
  ])('%s', (text, value, tolerance) => expect(farads(text)).toEqual([[value, tolerance]]));
});

describe('tolerance letters', () => {
  test.each([
    ['B', 0.1e-12], // [T]
    ['C', 0.25e-12], // [T]
    ['D', 0.5e-12], // [T]
    ['F', 1e-12], // [M]
    ['G', 2e-12], // [M]
  ])('under 10 pF %s is absolute', (letter, toleranceFarads) => {
    const [reading] = decodeMarking(`4p7${letter}`, 'capacitor');
    expect(reading?.ratings).toEqual({ toleranceFarads });
    expect(reading?.tolerance).toBeCloseTo(toleranceFarads / 4.7e-12, 12);
  });

  test('at 10 pF the letter may be absolute or relative', () => {
    expect(farads('100D')).toEqual([
      [10e-12, 0.05],
      [10e-12, 0.005],
    ]);
  });

  test.each([
    ['Z', -0.2, 0.8], // [T]
    ['S', -0.2, 0.5], // [T]
    ['T', -0.1, 0.5], // [T]
    ['P', 0, 1], // [T]
  ])('%s is not symmetric', (letter, toleranceLow, toleranceHigh) => {
    expect(decodeMarking(`104${letter}`, 'capacitor')).toMatchObject([
      { value: 100e-9, tolerance: null, ratings: { toleranceLow, toleranceHigh } },
    ]);
  });

  test('P is a tight tolerance on a resistor and a loose one on a capacitor', () => {
    expect(decodeMarking('4K7P', 'resistor')).toMatchObject([{ tolerance: 0.0002 }]); // [M]
    expect(decodeMarking('472P', 'capacitor')).toMatchObject([{ tolerance: null }]); // [T]
  });
});

describe('what stands beside the value, all from memory', () => {
  test('dielectric, voltage code, voltage and safety class', () => {
    expect(decodeMarking('104K X7R', 'capacitor')).toMatchObject([
      { value: 100e-9, ratings: { dielectric: 'X7R', coldestCelsius: -55, hottestCelsius: 125 } },
    ]);
    expect(decodeMarking('220J NP0', 'capacitor')).toMatchObject([
      { value: 22e-12, ratings: { dielectric: 'C0G' } },
    ]);
    expect(decodeMarking('Y5V 104Z', 'capacitor')).toMatchObject([
      { ratings: { dielectric: 'Y5V', changeOverTemperature: '+22/−82 %' } },
    ]);
    expect(decodeMarking('2A104K', 'capacitor')).toMatchObject([
      { value: 100e-9, tolerance: 0.1, ratings: { volts: 100 } },
    ]);
    expect(decodeMarking('2J473J', 'capacitor')).toMatchObject([
      { value: 47e-9, ratings: { volts: 630 } },
    ]);
    expect(decodeMarking('0.1µF X2 275V~', 'capacitor')).toMatchObject([
      { value: 100e-9, ratings: { safetyClass: 'X2', volts: 275 } },
    ]);
    for (const one of decodeMarking('104K X7R', 'capacitor')) {
      expect(one.source).toContain('from memory');
    }
  });

  test('two values, or a word with no meaning, are not read', () => {
    for (const text of ['104K 103K', 'X7R', '104K hello', '000', '0']) {
      expect(farads(text)).toEqual([]);
    }
  });
});

test('inductors carry the same codes in microhenries', () => {
  const henries = (text: string) =>
    decodeMarking(text, 'inductor').map(({ value, tolerance }) => [value, tolerance]);
  expect(henries('101K')).toEqual([[100e-6, 0.1]]); // [P]
  expect(henries('4R7')).toEqual([[4.7e-6, null]]); // [P]
  expect(henries('R47')).toEqual([[0.47e-6, null]]); // [P]
  expect(henries('22N')).toEqual([]);
  expect(henries('2N2')).toEqual([[2.2e-9, null]]); // [P]
  expect(henries('10mH')).toEqual([[0.01, null]]); // [P]
  expect(henries('brown-black-red-silver')).toEqual([[1e-3, 0.1]]); // [P]
});
