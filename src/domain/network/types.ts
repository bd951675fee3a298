import type { Mode, PartKind } from '@/domain/parts/kinds';

/** A part between two nets. `closed` belongs to contacts: the positions in which the contact conducts. */
export interface NetworkPart {
  readonly ref: string;
  readonly kind: PartKind;
  readonly nets: readonly [string, string];
  /** Nominal resistance, Ω. Kinds that insulate or have a usual value may leave it out. */
  readonly ohms?: number | undefined;
  /** Half-width of the nominal's tolerance as a fraction: 0.01 is ±1 %. */
  readonly tolerance?: number | undefined;
  readonly closed?: readonly string[] | undefined;
}

/** The input circuit as parts between named nets, and the switch positions that connect them. */
export interface Network {
  readonly positions: readonly string[];
  readonly parts: readonly NetworkPart[];
}

/** What a meter shows, or would show: Ω, or over range. */
export type Ohms = number | 'OL';

/** A rule of the network that does not hold: where (`parts[3].nets[1]`) and what is needed instead. */
export interface Violation {
  readonly path: string;
  readonly message: string;
}

/** Where the leads stand: two nets, at a switch position, with some parts' leads lifted. */
export interface Probe {
  readonly from: string;
  readonly to: string;
  /** Missing: the network's first position. */
  readonly position?: string | undefined;
  readonly lifted?: readonly string[] | undefined;
}

/** A part whose resistance is not the nominal: Ω, or `OL` for gone. */
export interface ForcedPart {
  readonly ref: string;
  readonly ohms: Ohms;
  /** Matters for a contact: a short or a leak shows in the positions where the contact should be open. */
  readonly mode?: Mode | undefined;
}
