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

export type BenchPanelProps = {
  ticketNumber: string;
  canEdit: boolean;
  cautionsTicked: boolean;
  closed: boolean;
  /** Switch positions, nets and parts of the board; empty when the ticket has none. */
  positions: string[];
  nets: BoardNet[];
  parts: BoardPart[];
  /** Both phases. */
  readings: BenchReading[];
  /** What the readings said as the page was made. */
  suspects: { asFound: Suspects; afterRepair: Suspects | null };
};
