/** Reading photos and pins. */
import { and, asc, count, eq, inArray, ne, or, sql, type SQL } from 'drizzle-orm';
import type { PhotoView, PinView } from '@/contracts/photos';
import type { Queryable } from '@/db/client';
import { faultNotes, faultRevisions } from '@/db/schema/faults';
import { users } from '@/db/schema/people';
import { photos, pins } from '@/db/schema/photos';
import { boardParts } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import type { PhotoRow } from './types';

/** The ticket's key and board by its number, or null. */
export async function ticketOfPhotos(db: Queryable, number: string) {
  const [found] = await db
    .select({ id: tickets.id, boardId: tickets.boardId })
    .from(tickets)
    .where(eq(tickets.number, number));
  return found ?? null;
}

export async function photoByPublicId(db: Queryable, publicId: string): Promise<PhotoRow | null> {
  const [row] = await db.select().from(photos).where(eq(photos.publicId, publicId));
  return row ?? null;
}

export async function photoById(db: Queryable, id: number): Promise<PhotoRow | null> {
  const [row] = await db.select().from(photos).where(eq(photos.id, id));
  return row ?? null;
}

/** Photos of a ticket that are ready or on their way. */
export async function countPhotos(db: Queryable, ticketId: number): Promise<number> {
  const [row] = await db
    .select({ n: count() })
    .from(photos)
    .where(and(eq(photos.ticketId, ticketId), ne(photos.state, 'refused')));
  return row?.n ?? 0;
}

/** What serving a picture needs, in one read: its variants and who may see it. Null unless it is ready. */
export async function photoForViewing(db: Queryable, publicId: string) {
  const [row] = await db
    .select({
      shared: photos.shared,
      ticketId: photos.ticketId,
      customerId: tickets.customerId,
      variants: photos.variants,
    })
    .from(photos)
    .leftJoin(tickets, eq(tickets.id, photos.ticketId))
    .where(and(eq(photos.publicId, publicId), eq(photos.state, 'ready')));
  return row ?? null;
}

const pinFields = {
  id: pins.id,
  photoId: pins.photoId,
  x: pins.x,
  y: pins.y,
  partId: pins.partId,
  label: pins.label,
  version: pins.version,
};

const asPin = ({ photoId: _photo, ...pin }: PinView & { photoId: number }): PinView => pin;

export async function pinsOf(db: Queryable, photoId: number): Promise<PinView[]> {
  const rows = await db
    .select(pinFields)
    .from(pins)
    .where(eq(pins.photoId, photoId))
    .orderBy(asc(pins.id));
  return rows.map(asPin);
}

export async function pinById(db: Queryable, photoId: number, id: number): Promise<PinView | null> {
  const [row] = await db
    .select(pinFields)
    .from(pins)
    .where(and(eq(pins.id, id), eq(pins.photoId, photoId)));
  return row ? asPin(row) : null;
}

/** The reference of a part of this board, or null. */
export async function partOfBoard(db: Queryable, boardId: number | null, partId: number) {
  if (boardId === null) return null;
  const [part] = await db
    .select({ ref: boardParts.ref })
    .from(boardParts)
    .where(and(eq(boardParts.id, partId), eq(boardParts.boardId, boardId)));
  return part?.ref ?? null;
}

/** The board whose parts can be pinned on a photo: its own, or that of its ticket. */
export async function boardOfPhoto(db: Queryable, photo: PhotoRow): Promise<number | null> {
  if (photo.boardId !== null || photo.ticketId === null) return photo.boardId;
  const [ticket] = await db
    .select({ boardId: tickets.boardId })
    .from(tickets)
    .where(eq(tickets.id, photo.ticketId));
  return ticket?.boardId ?? null;
}

const shown = {
  key: photos.id,
  id: photos.publicId,
  fileName: photos.fileName,
  side: photos.side,
  phase: photos.phase,
  shared: photos.shared,
  caption: photos.caption,
  width: photos.width,
  height: photos.height,
  by: users.name,
  at: photos.createdAt,
  version: photos.version,
};
const views = (db: Queryable) =>
  db.select(shown).from(photos).innerJoin(users, eq(users.id, photos.uploaderId));
type Shown = Awaited<ReturnType<typeof views>>[number];

const asView = ({ key: _key, ...row }: Shown, marks: PinView[]): PhotoView => ({
  ...row,
  width: row.width ?? 0,
  height: row.height ?? 0,
  at: row.at.toISOString(),
  pins: marks,
});

/** One ready photo as it is shown. */
export async function photoView(db: Queryable, id: number): Promise<PhotoView | null> {
  const [row] = await views(db).where(and(eq(photos.id, id), eq(photos.state, 'ready')));
  return row ? asView(row, await pinsOf(db, id)) : null;
}

/** The ready photos of a ticket with their pins, in the order they were begun. */
export const photosOfTicket = (db: Queryable, ticketId: number): Promise<PhotoView[]> =>
  readyPhotos(db, eq(photos.ticketId, ticketId));

/** The ready photos of a board file with their pins, in the order they were begun. */
export const photosOfBoard = (db: Queryable, boardId: number): Promise<PhotoView[]> =>
  readyPhotos(db, eq(photos.boardId, boardId));

async function readyPhotos(db: Queryable, whose: SQL): Promise<PhotoView[]> {
  const rows = await views(db)
    .where(and(whose, eq(photos.state, 'ready')))
    .orderBy(asc(photos.id));
  if (rows.length === 0) return [];
  const marks = await db
    .select(pinFields)
    .from(pins)
    .where(
      inArray(
        pins.photoId,
        rows.map((row) => row.key),
      ),
    )
    .orderBy(asc(pins.id));
  return rows.map((row) => asView(row, marks.filter((pin) => pin.photoId === row.key).map(asPin)));
}

/** The title of a fault note whose published or latest text shows the photo, or null. */
export async function noteThatShows(db: Queryable, publicId: string): Promise<string | null> {
  const [note] = await db
    .select({ title: faultNotes.title })
    .from(faultRevisions)
    .innerJoin(faultNotes, eq(faultNotes.id, faultRevisions.noteId))
    .where(
      and(
        or(
          eq(faultRevisions.revision, faultNotes.revision),
          eq(faultRevisions.revision, faultNotes.publishedRevision),
        ),
        sql`LOCATE(${publicId}, ${faultRevisions.body}) > 0`,
      ),
    )
    .limit(1);
  return note?.title ?? null;
}
