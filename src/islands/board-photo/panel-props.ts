/** What the ticket page gives the photo panel. */
import type { PhotoView } from '@/contracts/photos';
import type { PartKind } from '@/domain/parts/kinds';

/** A part of the ticket's board that a pin can stand for. */
export type PinnablePart = { id: number; ref: string; kind: PartKind; value: string };

export type PhotoPanelProps = {
  ticketNumber: string;
  /** False: photos and pins are shown, nothing can be changed. */
  canEdit: boolean;
  /** The board's parts; empty when the ticket has no board. */
  parts: PinnablePart[];
  /** The photos as the page was made, so that they show without script. */
  initial: PhotoView[];
};
