/** How sides and phases of photos are written. */
import type { PhotoView } from '@/contracts/photos';
import type { PhotoPhase, PhotoSide } from '@/domain/photos/files';

export const SIDE_LABELS: Readonly<Record<PhotoSide, string>> = {
  front: 'Front',
  back: 'Back',
  other: 'Other',
};
export const PHASE_LABELS: Readonly<Record<PhotoPhase, string>> = {
  before: 'Before repair',
  after: 'After repair',
};

/** "Front, before repair". */
export const photoTitle = ({ side, phase }: Pick<PhotoView, 'side' | 'phase'>): string =>
  `${SIDE_LABELS[side]}, ${PHASE_LABELS[phase].toLowerCase()}`;

/** "Front": a photo of a board file stands for every board of its kind, repaired or not. */
export const boardPhotoTitle = ({ side }: Pick<PhotoView, 'side'>): string => SIDE_LABELS[side];

/** What a picture shows, for those who do not see it. */
export const photoWords = (title: string, { caption }: Pick<PhotoView, 'caption'>): string =>
  [title, caption].filter(Boolean).join(': ');

export const counted = (n: number, one: string, many = `${one}s`): string =>
  `${n} ${n === 1 ? one : many}`;
