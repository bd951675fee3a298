import type { Ohms } from '../network/types';
import type { PartKind } from '../parts/kinds';

/** A part of the board, drawn into the network (`nets`) or only listed. */
export type SheetPart = {
  ref: string;
  kind: PartKind;
  nets: [string, string] | null;
  ohms: number | null;
  tolerance: number | null;
  closed: string[] | null;
};

/** What the sheet knows of its board. */
export type SheetBoard = { positions: readonly string[]; parts: readonly SheetPart[] };

/** Where the leads stood: two nets, or straight on one part. */
export type Points = {
  from: string | null;
  to: string | null;
  part: string | null;
  position: string | null;
  lifted: string[];
};

export type SheetReading = Points & {
  id: number;
  value: Ohms;
  /** Weight of the last digit typed, Ω. */
  resolution: number | null;
};
