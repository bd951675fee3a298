import { at } from './geometry';
import type { Package } from './packages/pads';
import type { Part } from './types';

export const MIDDLE = at(0, 0);
/** A part that has no place yet, unless `more` says so. */
export const stand = (ref: string, packed: Package, more: Partial<Part> = {}): Part => ({
  ref,
  kind: null,
  side: 'front',
  at: MIDDLE,
  turn: 0,
  fixed: false,
  protection: false,
  aside: false,
  ...packed,
  ...more,
});
