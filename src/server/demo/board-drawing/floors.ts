/** The floors of the demo boards, by the code of the board. */
import { CX_7 } from './floors/cx-7';
import type { Floor } from './floors/floor';
import { IT_5 } from './floors/it-5';
import { LB_22 } from './floors/lb-22';
import { LB_40 } from './floors/lb-40';
import { PS_3 } from './floors/ps-3';

const FLOORS: Readonly<Record<string, Floor>> = {
  'LB-40': LB_40,
  'LB-22': LB_22,
  'CX-7': CX_7,
  'IT-5': IT_5,
  'PS-3': PS_3,
};

/** @throws RangeError for a board no floor was drawn for. */
export function floorOf(code: string): Floor {
  const floor = FLOORS[code];
  if (!floor) throw new RangeError(`No floor is drawn for board ${code}.`);
  return floor;
}
