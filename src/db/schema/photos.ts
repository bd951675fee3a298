import {
  boolean,
  char,
  double,
  index,
  int,
  mysqlEnum,
  mysqlTable,
  uniqueIndex,
  varchar,
} from 'drizzle-orm/mysql-core';
import { id, jsonText, moment, ref } from '../columns';
import { users } from './people';
import { boardParts, boards } from './shop';
import { tickets } from './tickets';

export type PhotoVariant = {
  name: 'full' | 'page' | 'thumb';
  type: 'image/webp' | 'image/avif' | 'image/jpeg';
  key: string;
  width: number;
  height: number;
  bytes: number;
};

/** A photo of a ticket's instrument, or of a board in its board file. */
export const photos = mysqlTable(
  'photos',
  {
    id: id(),
    /** Unguessable: it stands in addresses. */
    publicId: char({ length: 22 }).notNull(),
    ticketId: ref().references(() => tickets.id),
    boardId: ref().references(() => boards.id),
    uploaderId: ref()
      .notNull()
      .references(() => users.id),
    /** `waiting`: an upload was promised; `ready`: every variant is in the store; `refused`: with the reason. */
    state: mysqlEnum(['waiting', 'ready', 'refused']).notNull(),
    refusal: varchar({ length: 300 }),
    /** Where the browser puts the raw file; gone once the photo is ready or refused. */
    uploadKey: varchar({ length: 200 }),
    fileName: varchar({ length: 200 }).notNull(),
    declaredType: varchar({ length: 60 }).notNull(),
    declaredBytes: int().notNull(),
    side: mysqlEnum(['front', 'back', 'other']).notNull(),
    phase: mysqlEnum(['before', 'after']).notNull(),
    shared: boolean().notNull().default(false),
    caption: varchar({ length: 200 }).notNull().default(''),
    width: int(),
    height: int(),
    /** Of the file as it came; names the objects of the variants. Set before the first of them is put. */
    sha256: char({ length: 64 }),
    variants: jsonText<PhotoVariant[]>(),
    createdAt: moment().notNull(),
    readyAt: moment(),
    version: int().notNull().default(1),
  },
  (t) => [
    uniqueIndex('photos_public').on(t.publicId),
    index('photos_ticket').on(t.ticketId),
    index('photos_board').on(t.boardId),
    index('photos_state').on(t.state, t.createdAt),
    // Also the lock by which two photos of one picture share their objects (server/photos/objects.ts).
    index('photos_sha').on(t.sha256),
  ],
);

/** A mark on a photo; x and y are fractions of its width and height from the top left. */
export const pins = mysqlTable(
  'pins',
  {
    id: id(),
    photoId: ref()
      .notNull()
      .references(() => photos.id, { onDelete: 'cascade' }),
    x: double().notNull(),
    y: double().notNull(),
    partId: ref().references(() => boardParts.id),
    /** The reference or test point as shown; kept when the board file has no such part. */
    label: varchar({ length: 40 }).notNull(),
    createdBy: ref()
      .notNull()
      .references(() => users.id),
    createdAt: moment().notNull(),
    version: int().notNull().default(1),
  },
  (t) => [index('pins_photo').on(t.photoId)],
);
