/** What a healthy board would show at a row's points, before anything is measured. */
import { predict } from '../diagnosis/predict';
import type { Ohms } from '../network/types';
import { violations } from '../network/validate';
import { expectedOf } from '../parts/check-expected';
import { formatOhms } from '../quantities/format';
import { drawnNetwork, placePoints } from './points';
import type { Points, SheetBoard, SheetPart } from './types';

export type Expectation = {
  ohms: Ohms;
  /** What still fits, Ω. */
  low: number;
  high: Ohms;
};

/** What is known of a row's points: the healthy reading, or why it cannot be told. */
export type Outlook = { expected: Expectation | null; unusable: string | null };

/** The prediction with its 95 % band, which is a half-width of ln R. */
function banded(ohms: Ohms, band: number, overRange = 60e6): Expectation {
  if (ohms === 'OL') return { ohms, low: overRange, high: 'OL' };
  return { ohms, low: ohms * Math.exp(-band), high: ohms * Math.exp(band) };
}

/** A part that is not drawn is held against what it is judged by: its value with its tolerance, or its kind's floor. */
function expectedOfPart({ kind, ohms, tolerance }: SheetPart, points: Points): Expectation | null {
  const { position } = points;
  const { band, judgedBy } = expectedOf({
    kind,
    ohms,
    tolerance,
    position,
    marked: null,
    unread: false,
  });
  if (judgedBy === 'unknown') return null;
  if (judgedBy === 'floor') return { ohms: 'OL', low: band.low, high: 'OL' };
  return { ohms: ohms ?? Math.sqrt(Math.max(band.low, band.high / 100) * band.high), ...band };
}

/**
 * Answers, for the points of any row of this board, what the healthy board shows there. The network is checked
 * once; one that is not sound predicts nothing.
 */
export function outlookOn(board: SheetBoard): (points: Points) => Outlook {
  const network = drawnNetwork(board.positions, board.parts);
  const sound = network.parts.length > 0 && violations(network).length === 0;
  return (points) => {
    const placed = placePoints(board, points);
    if (placed.kind === 'unusable') return { expected: null, unusable: placed.reason };
    if (placed.kind === 'alone')
      return { expected: expectedOfPart(placed.part, points), unusable: null };
    if (!sound) return { expected: null, unusable: null };
    const [healthy] = predict(network, [{ ...placed.probe, value: 'OL' }]);
    return {
      expected: healthy ? banded(healthy.ohms, healthy.band) : null,
      unusable: null,
    };
  };
}

/** A healthy value as written: three digits are all that tolerances leave. */
export function writeExpected(ohms: Ohms): string {
  return ohms === 'OL' ? 'OL' : formatOhms(Number(ohms.toPrecision(3)));
}
