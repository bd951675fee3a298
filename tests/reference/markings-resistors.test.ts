import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { decodeMarking } from '@/domain/markings/decode';

/** [T] read in a stored text of the standard, [M] from memory, [C] computed, [P] common practice. */
const ohms = (text: string) =>
  decodeMarking(text, 'resistor').map(({ value, tolerance }) => [value, tolerance]);

describe('letter codes, IEC 60062:2016', () => {
  test.each([
    ['R47', 0.47, null], // [T]
    ['4R7', 4.7, null], // [T]
    ['470R', 470, null], // [T]
    ['4K7', 4700, null], // [T]
    ['47K3', 47_300, null], // [T]
    ['4M7', 4.7e6, null], // [T]
    ['4k7', 4700, null], // [C]
    ['4K7J', 4700, 0.05], // letter [T]
    ['100RF', 100, 0.01], // letter [T]
    ['10KB', 10_000, 0.001], // letter [T]
    ['0R22K', 0.22, 0.1], // letter [T]
    ['1M0M', 1e6, 0.2], // letter [T]
    ['10KN', 10_000, 0.3], // letter [T]
    ['10KH', 10_000, 0.03], // letter [T], in one list
    ['0.22Ω J', 0.22, 0.05], // [P]
    ['4k7 5%', 4700, 0.05], // [P]
    ['4K7 ±0.1 %', 4700, 0.001], // [P]
  ])('%s', (text, value, tolerance) => expect(ohms(text)).toEqual([[value, tolerance]]));

  test('letters from memory say so', () => {
    for (const [letter, tolerance] of Object.entries({ E: 5e-5, L: 1e-4, P: 2e-4, W: 5e-4 })) {
      const [reading] = decodeMarking(`4K7${letter}`, 'resistor'); // [M]
      expect(reading).toMatchObject({ value: 4700, tolerance });
      expect(reading?.source).toContain('from memory');
    }
  });

  test('a power in front of the value is a rating', () => {
    expect(decodeMarking('5W 0R22J', 'resistor')).toMatchObject([
      { value: 0.22, tolerance: 0.05, ratings: { watts: 5 } }, // [P]
    ]);
  });

  test('below one ohm the marking may be a shunt, in milliohms too', () => {
    expect(decodeMarking('R005', 'shunt')).toMatchObject([{ value: 0.005, unit: 'Ω' }]); // [C]
    expect(decodeMarking('5m0', 'shunt')).toMatchObject([{ value: 0.005 }]); // [P]
    expect(decodeMarking('4R7', 'shunt')).toEqual([]);
  });
});

describe('digits on surface-mount resistors, IEC 60062:2016', () => {
  test.each([
    ['472', 4700], // [C]
    ['103', 10_000], // [C]
    ['220', 22], // [C]
    ['4701', 4700], // [C]
    ['1002', 10_000], // [C]
    ['1000', 100], // [C]
    ['0', 0], // [P]
    ['000', 0], // [P]
  ])('%s', (text, value) => expect(ohms(text)).toEqual([[value, null]]));

  test('a leading zero is no code', () => expect(ohms('047')).toEqual([]));
});

describe('EIA-96', () => {
  test.each([
    ['01C', 10_000],
    ['10C', 12_400],
    ['24B', 1740],
    ['47C', 30_100],
    ['68X', 49.9],
    ['92Z', 0.887],
    ['85D', 750_000],
    ['01Y', 1],
    ['96F', 97.6e6],
    ['12A', 130],
    ['12E', 1.3e6],
  ])('%s', (text, value) => expect(ohms(text)).toEqual([[value, 0.01]])); // [C]

  test('R and S stand for Y and X, H for B or 10^7: all from memory', () => {
    expect(ohms('68S')).toEqual([[49.9, 0.01]]); // [M]
    // The letter code reads 22 ohms, EIA-96 reads 165 x 0.01.
    expect(ohms('22R')).toEqual([
      [22, null],
      [1.65, 0.01],
    ]); // [M]
    expect(ohms('01H')).toEqual([
      [1000, 0.01],
      [1e9, 0.01],
    ]); // [M]
    for (const text of ['68S', '01H']) {
      for (const one of decodeMarking(text, 'resistor')) {
        expect(one.source).toContain('from memory');
      }
    }
  });

  test('00 and 97 to 99 are no codes', () => {
    for (const text of ['00A', '97A', '99A']) expect(ohms(text)).toEqual([]);
  });
});

describe('colour bands, IEC 60062:2016', () => {
  test.each([
    ['brown-black-red-gold', 1000, 0.05], // [T]
    ['yellow-violet-red-gold', 4700, 0.05], // [T]
    ['brown-black-black-gold-brown', 10, 0.01], // [T]
    ['green-blue-brown-brown', 560, 0.01], // [T]
    ['brown-black-red', 1000, 0.2], // no band, 20 % [T]
    ['brown black red none', 1000, 0.2], // [T]
    ['Yellow, Purple, Silver, Silver', 0.47, 0.1], // [C]
    ['bn-bk-pk-bu', 0.01, 0.0025], // pink x0.001 [T], names [M]
    ['red-red-black-red-green', 22_000, 0.005], // [C]
    ['brown-black-black-orange-violet', 100_000, 0.001], // [C]
    ['white-brown-yellow-red', 910_000, 0.02], // [C]
  ])('%s', (text, value, tolerance) => expect(ohms(text)).toEqual([[value, tolerance]]));

  test.each([
    ['black', 250],
    ['brown', 100],
    ['red', 50],
    ['orange', 15],
    ['yellow', 25],
    ['green', 20],
    ['blue', 10],
    ['violet', 5],
    ['grey', 1],
  ])('a sixth band of %s is %i ppm/K', (colour, ppmPerKelvin) => {
    expect(decodeMarking(`brown-black-black-brown-brown-${colour}`, 'resistor')).toMatchObject([
      { value: 1000, tolerance: 0.01, ratings: { ppmPerKelvin } }, // [T]
    ]);
  });

  test('where charts differ both readings are given', () => {
    expect(ohms('brown-black-red-grey')).toEqual([
      [1000, 0.0001],
      [1000, 0.0005],
    ]); // [M]
    expect(ohms('brown-black-red-orange')).toEqual([
      [1000, 0.0005],
      [1000, 0.03],
    ]); // .05 % [T], 3 % of older charts
  });

  test('an order that cannot be read is tried from the other end', () => {
    expect(decodeMarking('gold-red-black-brown', 'resistor')).toMatchObject([
      { value: 1000, tolerance: 0.05, ratings: { note: 'read from the other end' } },
    ]);
  });

  test('two bands, seven bands, words that are no colour', () => {
    const seven = 'red-red-red-red-red-red-red';
    for (const text of ['red-red', seven, 'red-mauve-red', 'white-white-white-white']) {
      expect(ohms(text)).toEqual([]);
    }
  });

  test('every letter code agrees with its bands', () => {
    const names = 'black brown red orange yellow green blue violet grey white'.split(' ');
    fc.assert(
      fc.property(
        fc.integer({ min: 10, max: 99 }),
        fc.integer({ min: 0, max: 4 }),
        (two, zeros) => {
          const bands = [...String(two), String(zeros)].map((digit) => names[Number(digit)]);
          expect(ohms(`${bands.join('-')}-gold`)[0]?.[0]).toBe(ohms(`${two}${zeros}`)[0]?.[0]);
        },
      ),
    );
  });
});
