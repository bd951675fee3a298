/** Photos of a ticket's instrument, their variants, and the pins on them. */
import * as z from 'zod/v4';
import { PHOTO_PHASES, PHOTO_SIDES } from '@/domain/photos/files';
import { Id, Moment, TicketNumber, line, listOf } from './common';
import { defineRoute } from './route';

export const PHOTO_VARIANTS = ['thumb', 'page', 'full'] as const;
export type PhotoVariantName = (typeof PHOTO_VARIANTS)[number];

const Share = z
  .number('A number from 0 to 1 is needed.')
  .min(0, 'Outside the photo: 0 to 1 is needed.')
  .max(1, 'Outside the photo: 0 to 1 is needed.');

/** A mark; x and y are shares of the photo's width and height from the top left. */
export const Pin = z.object({
  id: z.int(),
  x: z.number(),
  y: z.number(),
  /** The board's part, or null for a mark with a label of its own. */
  partId: z.int().nullable(),
  /** The part's reference, or the label typed. */
  label: z.string(),
  version: z.int(),
});
export type PinView = z.input<typeof Pin>;

export const Photo = z.object({
  id: z.string(),
  fileName: z.string(),
  side: z.enum(PHOTO_SIDES),
  phase: z.enum(PHOTO_PHASES),
  shared: z.boolean(),
  caption: z.string(),
  /** Pixels of the largest variant. */
  width: z.int(),
  height: z.int(),
  by: z.string(),
  at: Moment,
  version: z.int(),
  pins: z.array(Pin),
});
export type PhotoView = z.input<typeof Photo>;

export const BeginPhoto = z.object({
  fileName: line(200, 1),
  /** What the file is said to be; the content decides later. */
  type: z.string().trim().max(60).default(''),
  bytes: z.number().int().min(0).max(Number.MAX_SAFE_INTEGER),
  side: z.enum(PHOTO_SIDES),
  phase: z.enum(PHOTO_PHASES),
});
export type BeginPhoto = z.output<typeof BeginPhoto>;

/** Where to put the file: one PUT of its bytes, with these headers, before `expiresAt`. */
export const Upload = z.object({
  photo: z.string(),
  /** Of the waiting photo: `If-Match` when the upload is called off. */
  version: z.int(),
  url: z.string(),
  headers: z.record(z.string(), z.string()),
  expiresAt: Moment,
});
export type Upload = z.input<typeof Upload>;

const something = (value: object) => Object.values(value).some((v) => v !== undefined);

export const EditPhoto = z
  .object({
    side: z.enum(PHOTO_SIDES).optional(),
    phase: z.enum(PHOTO_PHASES).optional(),
    shared: z.boolean().optional(),
    caption: line(200).optional(),
  })
  .refine(something, 'Nothing was given: at least one of side, phase, shared, caption is needed.');
export type EditPhoto = z.output<typeof EditPhoto>;

const label = line(40, 1);
export const NewPin = z
  .object({ x: Share, y: Share, partId: Id.optional(), label: label.optional() })
  .refine((pin) => pin.partId !== undefined || pin.label !== undefined, {
    path: ['label'],
    message: 'Neither part nor label was given: one is needed.',
  });
export type NewPin = z.output<typeof NewPin>;
export const EditPin = z
  .object({
    x: Share.optional(),
    y: Share.optional(),
    partId: Id.optional(),
    label: label.optional(),
  })
  .refine(something, 'Nothing was given: at least one of x, y, partId, label is needed.');
export type EditPin = z.output<typeof EditPin>;

const PublicId = z.string().regex(/^[A-Za-z0-9_-]{22}$/);
const ofTicket = z.object({ number: TicketNumber });
const onePhoto = z.object({ id: PublicId });
const onePin = z.object({ id: PublicId, pin: Id });

export const photoRoutes = {
  list: defineRoute({
    method: 'GET',
    path: '/api/tickets/{number}/photos',
    summary: 'The photos of a ticket with their pins, oldest first.',
    who: 'ticket.read',
    params: ofTicket,
    answer: listOf(Photo),
    status: 200,
  }),
  begin: defineRoute({
    method: 'POST',
    path: '/api/tickets/{number}/photos',
    summary: 'Begin an upload: answers the address at which the file is put.',
    who: 'ticket.bench',
    params: ofTicket,
    body: BeginPhoto,
    bodyLimit: 4096,
    answer: Upload,
    status: 201,
    repeatable: true,
  }),
  done: defineRoute({
    method: 'POST',
    path: '/api/photos/{id}/done',
    summary: 'The file is put: it is verified and made ready, or refused with the reason.',
    who: 'ticket.bench',
    params: onePhoto,
    answer: Photo,
    status: 200,
  }),
  edit: defineRoute({
    method: 'PATCH',
    path: '/api/photos/{id}',
    summary: 'Change side, phase, caption, or whether the customer sees it.',
    who: 'ticket.bench',
    params: onePhoto,
    body: EditPhoto,
    bodyLimit: 4096,
    answer: Photo,
    status: 200,
    versioned: true,
  }),
  remove: defineRoute({
    method: 'DELETE',
    path: '/api/photos/{id}',
    summary: 'Remove a photo and its pins, or call off an upload.',
    who: 'ticket.bench',
    params: onePhoto,
    answer: null,
    status: 204,
    versioned: true,
  }),
  variant: defineRoute({
    method: 'GET',
    path: '/api/photos/{id}/{variant}',
    summary: 'The picture. For staff, and for the customer of the ticket when it is shared.',
    who: 'public',
    params: z.object({ id: PublicId, variant: z.enum(PHOTO_VARIANTS) }),
    answer: null,
    media: 'image/webp',
    status: 200,
  }),
  pins: defineRoute({
    method: 'GET',
    path: '/api/photos/{id}/pins',
    summary: 'The pins on a photo.',
    who: 'ticket.read',
    params: onePhoto,
    answer: listOf(Pin),
    status: 200,
  }),
  addPin: defineRoute({
    method: 'POST',
    path: '/api/photos/{id}/pins',
    summary: 'Put a pin on a photo, for a part of the ticket’s board or with a label.',
    who: 'ticket.bench',
    params: onePhoto,
    body: NewPin,
    bodyLimit: 4096,
    answer: Pin,
    status: 201,
    repeatable: true,
  }),
  editPin: defineRoute({
    method: 'PATCH',
    path: '/api/photos/{id}/pins/{pin}',
    summary: 'Move a pin or give it another part or label.',
    who: 'ticket.bench',
    params: onePin,
    body: EditPin,
    bodyLimit: 4096,
    answer: Pin,
    status: 200,
    versioned: true,
  }),
  removePin: defineRoute({
    method: 'DELETE',
    path: '/api/photos/{id}/pins/{pin}',
    summary: 'Take a pin off a photo.',
    who: 'ticket.bench',
    params: onePin,
    answer: null,
    status: 204,
    versioned: true,
  }),
};
