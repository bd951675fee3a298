/** What the ticket page gives the bench panel. */
import type { BenchReading, Suspects } from '@/contracts/bench';
import type { PartKind } from '@/domain/parts/kinds';

export type Phase = BenchReading['phase'];

/** A net of the board; `probe` when a lead reaches it. */
export type BoardNet = { name: string; label: string; probe: boolean };

/** A part of the board, drawn into the network (`nets`) or not. */
export type BoardPart = {
  id: number;
  ref: string;
  kind: PartKind;
  nets: [string, string] | null;
  ohms: number | null;
  tolerance: number | null;
  closed: string[] | null;
  value: string;
  protection: boolean;
  note: string;
};

/** What the sheet knows of the ticket's board; all empty when it has none. */
export type Board = { positions: string[]; nets: BoardNet[]; parts: BoardPart[] };

export type BenchPanelProps = Board & {
  ticketNumber: string;
  canEdit: boolean;
  cautionsTicked: boolean;
  closed: boolean;
  /** Both phases. */
  readings: BenchReading[];
  /** What the readings said as the page was made. */
  suspects: { asFound: Suspects; afterRepair: Suspects | null };
};
