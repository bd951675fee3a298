/**
 * Metal-oxide varistors by their code: continuous AC and DC voltage, clamping voltage and energy.
 *
 * Certainty of a row: `sheet` read in a maker's data sheet; `memory` not re-read. Rows in which the two are
 * mixed say which figure is which. Printed limits are rounded by the makers, so a strict +-10 % of the
 * nominal differs a little from what a sheet prints.
 */
export interface VaristorRow {
  readonly code: string;
  readonly acVolts: number;
  readonly dcVolts: number;
  /** At the disc's class current, {@link CLASS_AMPS}, 8/20 us; two figures where sources differ. */
  readonly clampVolts: readonly [number] | readonly [number, number];
  /** At this current instead of the class current. */
  readonly clampAmps?: number;
  /** Joules at 10/1000 us for discs of 7, 10 and 14 mm. */
  readonly joules?: readonly [number | null, number, number];
  readonly source: string;
}

/** The current at which a disc's clamping voltage is stated, in amps, by diameter in millimetres. */
export const CLASS_AMPS: Readonly<Record<number, number>> = { 7: 10, 10: 25, 14: 50 };
/** The discs that {@link VaristorRow.joules} covers, in its order. */
export const ENERGY_DISCS = [7, 10, 14] as const;

const SHEET_A = 'maker’s data sheet, standard series (document 29082, 2015)';
const SHEET_B = 'maker’s data sheet, standard series (document 29081)';
const LOW_VOLTAGE = 'maker’s data sheet, low-voltage series';

type Joules = readonly [number | null, number, number];
const row = (
  source: string,
  code: string,
  acVolts: number,
  dcVolts: number,
  clampVolts: number,
  joules: Joules,
): VaristorRow => ({ code, acVolts, dcVolts, clampVolts: [clampVolts], joules, source });

export const VARISTORS: readonly VaristorRow[] = [
  row(SHEET_A, '331', 210, 275, 550, [28, 58, 115]),
  row(SHEET_A, '361', 230, 300, 595, [32, 65, 130]),
  row(SHEET_A, '391', 250, 320, 650, [35, 70, 140]),
  row(SHEET_A, '431', 275, 350, 710, [40, 80, 155]),
  row(SHEET_A, '471', 300, 385, 775, [42, 85, 175]),
  row(SHEET_A, '511', 320, 420, 842, [45, 92, 190]),
  row(SHEET_B, '621', 385, 505, 1025, [51, 67, 110]),
  row(SHEET_B, '681', 420, 560, 1120, [56, 73, 120]),
  row(SHEET_B, '751', 460, 615, 1240, [63, 82, 135]),
  row(SHEET_B, '821', 510, 670, 1355, [null, 89, 145]),
  row(SHEET_B, '911', 550, 745, 1500, [null, 98, 160]),
  {
    code: '201',
    acVolts: 130,
    dcVolts: 170,
    clampVolts: [340],
    source: 'ratings from memory, unverified',
  },
  {
    code: '561',
    acVolts: 350,
    dcVolts: 460,
    clampVolts: [910, 925],
    source: 'AC rating read in a data sheet; DC rating and clamping voltage from memory',
  },
  {
    code: '102',
    acVolts: 625,
    dcVolts: 825,
    clampVolts: [1650],
    source: 'AC rating read in a data sheet; DC rating and clamping voltage from memory',
  },
  {
    code: '180',
    acVolts: 11,
    dcVolts: 14,
    clampVolts: [36],
    clampAmps: 5,
    source: `${LOW_VOLTAGE}, 10 mm disc (prints 16 to 20 V at 1 mA)`,
  },
  {
    code: '820',
    acVolts: 50,
    dcVolts: 65,
    clampVolts: [135],
    clampAmps: 50,
    source: `${LOW_VOLTAGE}, 14 mm disc (prints 74 to 90 V at 1 mA)`,
  },
];
