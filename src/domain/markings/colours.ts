/** The colours of IEC 60062:2016, as digit, multiplier, tolerance and temperature coefficient. */

/** One meaning of a tolerance band; a colour on which charts disagree has two. */
export interface BandTolerance {
  readonly fraction: number;
  /** What to add to the source when the current edition, read in a copy, is not what says so. */
  readonly note?: string;
}

export interface Colour {
  readonly digit?: number;
  /** Power of ten. */
  readonly multiplier?: number;
  readonly tolerances?: readonly BandTolerance[];
  /** Parts per million per kelvin. */
  readonly ppm?: number;
}

export const COLOURS: Readonly<Record<string, Colour>> = {
  black: { digit: 0, multiplier: 0, ppm: 250 },
  brown: { digit: 1, multiplier: 1, tolerances: [{ fraction: 0.01 }], ppm: 100 },
  red: { digit: 2, multiplier: 2, tolerances: [{ fraction: 0.02 }], ppm: 50 },
  orange: {
    digit: 3,
    multiplier: 3,
    tolerances: [{ fraction: 0.0005 }, { fraction: 0.03, note: 'as older charts give orange' }],
    ppm: 15,
  },
  yellow: { digit: 4, multiplier: 4, tolerances: [{ fraction: 0.0002 }], ppm: 25 },
  green: { digit: 5, multiplier: 5, tolerances: [{ fraction: 0.005 }], ppm: 20 },
  blue: { digit: 6, multiplier: 6, tolerances: [{ fraction: 0.0025 }], ppm: 10 },
  violet: { digit: 7, multiplier: 7, tolerances: [{ fraction: 0.001 }], ppm: 5 },
  grey: {
    digit: 8,
    multiplier: 8,
    tolerances: [
      { fraction: 0.0001, note: 'grey of the 2016 edition from memory' },
      { fraction: 0.0005, note: 'as older charts give grey, from memory' },
    ],
    ppm: 1,
  },
  white: { digit: 9, multiplier: 9 },
  gold: { multiplier: -1, tolerances: [{ fraction: 0.05 }] },
  silver: { multiplier: -2, tolerances: [{ fraction: 0.1 }] },
  pink: { multiplier: -3 },
  none: { tolerances: [{ fraction: 0.2 }] },
};

const OTHER_NAMES: Readonly<Record<string, string>> = {
  purple: 'violet',
  gray: 'grey',
  bk: 'black',
  bn: 'brown',
  rd: 'red',
  og: 'orange',
  ye: 'yellow',
  gn: 'green',
  bu: 'blue',
  vt: 'violet',
  gy: 'grey',
  wh: 'white',
  gd: 'gold',
  sr: 'silver',
  pk: 'pink',
};

/** The colours named in a text, in order; `null` when a word in it is no colour. */
export function coloursIn(text: string): Colour[] | null {
  const words = text.toLowerCase().split(/[-\s,/]+/);
  const found: Colour[] = [];
  for (const word of words) {
    const name = Object.hasOwn(OTHER_NAMES, word) ? OTHER_NAMES[word] : word;
    if (name === undefined || !Object.hasOwn(COLOURS, name)) return null;
    const colour = COLOURS[name];
    if (colour) found.push(colour);
  }
  return found;
}
