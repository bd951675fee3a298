/** What a healthy board would show at a row's points, before anything is measured. */
import { predict } from '../diagnosis/predict';
import type { Ohms } from '../network/types';
import { violations } from '../network/validate';
import { defaultOhms, defaultTolerance, healthyFloor } from '../parts/defaults';
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

/** A part that is not drawn: its own value with its tolerance, or the floor of its kind. */
function expectedOfPart(part: SheetPart): Expectation | null {
  const floor = part.ohms === null ? healthyFloor(part.kind) : null;
  if (floor !== null) return { ohms: 'OL', low: floor, high: 'OL' };
  const ohms = part.ohms ?? defaultOhms(part.kind);
  if (ohms === null) return null;
  const tolerance = part.tolerance ?? defaultTolerance(part.kind);
  return { ohms, low: ohms * (1 - tolerance), high: ohms * (1 + tolerance) };
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
    if (placed.kind === 'alone') return { expected: expectedOfPart(placed.part), unusable: null };
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
