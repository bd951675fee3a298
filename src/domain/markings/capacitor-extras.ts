/** What is printed on a capacitor beside its value: dielectric, voltage, safety class. */

const COLDEST: Readonly<Record<string, number>> = { X: -55, Y: -30, Z: 10 };
const HOTTEST: Readonly<Record<string, number>> = {
  '2': 45,
  '4': 65,
  '5': 85,
  '6': 105,
  '7': 125,
  '8': 150,
  '9': 200,
};
const CHANGE: Readonly<Record<string, string>> = {
  A: '±1.0 %',
  B: '±1.5 %',
  C: '±2.2 %',
  D: '±3.3 %',
  E: '±4.7 %',
  F: '±7.5 %',
  P: '±10 %',
  R: '±15 %',
  S: '±22 %',
  T: '+22/−33 %',
  U: '+22/−56 %',
  V: '+22/−82 %',
};

// Digit and letter before the value on film capacitors: 2A is 100 V. From memory.
const VOLT_FIGURES: Readonly<Record<string, string>> = {
  A: '10',
  C: '16',
  D: '20',
  E: '25',
  F: '31.5',
  V: '35',
  G: '40',
  H: '50',
  J: '63',
  K: '80',
};

/** The word's meaning as ratings, or `null` when it has none. All of these from memory of EIA-198 and JIS. */
export function capacitorExtra(word: string): Record<string, number | string> | null {
  const upper = word.toUpperCase();
  if (/^(?:C0G|COG|NP0|NPO)$/.test(upper)) {
    return { dielectric: 'C0G', changeOverTemperature: '0 ±30 ppm/K' };
  }
  const [, cold = '', hot = '', change = ''] = /^([XYZ])([24-9])([A-FPR-V])$/.exec(upper) ?? [];
  const [coldest, hottest] = [COLDEST[cold], HOTTEST[hot]];
  if (coldest !== undefined && hottest !== undefined) {
    return {
      dielectric: upper,
      coldestCelsius: coldest,
      hottestCelsius: hottest,
      changeOverTemperature: CHANGE[change] ?? 'not known',
    };
  }
  if (/^[XY][1-3]$/.test(upper)) return { safetyClass: upper };
  const volts = /^(\d{1,4}(?:\.\d)?) ?V(?:AC|DC|~)?$/.exec(upper)?.[1];
  if (volts) return { volts: Number(volts) };
  return voltCode(upper);
}

/** The two-character voltage code, `2A` for 100 V. */
export function voltCode(code: string): { volts: number } | null {
  const [, power = '', letter = ''] = /^([0-3])([ACDEFVGHJK])$/.exec(code) ?? [];
  const figure = VOLT_FIGURES[letter];
  return figure === undefined ? null : { volts: Number(`${figure}e${Number(power) - 1}`) };
}
