/** Writing photos: begin an upload, finish it, change and remove. */
import { and, eq, sql } from 'drizzle-orm';
import type { BeginPhoto, EditPhoto, PhotoView, Upload } from '@/contracts/photos';
import { inTransaction } from '@/db/client';
import { photos } from '@/db/schema/photos';
import {
  kindByName,
  PHOTO_MAX_BYTES,
  refuseKind,
  refuseSize,
  typeOfKind,
} from '@/domain/photos/files';
import type { Granted } from '../auth/actor';
import { newPublicId } from '../auth/secrets';
import { promise } from '../outbox/commands';
import { absent, done, refuse, refuseField, type Outcome } from '../refusal';
import { fromStore, StoreTrouble } from '../storage/trouble';
import { leaveEvent } from '../tickets/commands';
import { finishPhoto } from './finish';
import { removeUnclaimed, UPLOADS } from './objects';
import { countPhotos, noteThatShows, photoByPublicId, photoView, ticketOfPhotos } from './queries';
import { refuseClosed } from './policy';
import type { PhotoRow, PhotoShop } from './types';

type Bench = Granted<'ticket.bench'>;

const MOST_PHOTOS = 200;
/** The request itself finishes the photo; the promised job is there for when it cannot. */
const JOB_DELAY_MS = 60_000;
const UPLOAD_MS = 600_000;

/** Promises an upload: a waiting row and the address at which its file is put. */
export async function beginPhoto(
  shop: PhotoShop,
  actor: Bench,
  { number, ...input }: BeginPhoto & { number: string },
  now: Date,
): Promise<Outcome<Upload>> {
  const ticket = await ticketOfPhotos(shop.db, number);
  if (!ticket) return absent('ticket');
  const closed = await refuseClosed(shop.db, { ticketId: ticket.id }, now);
  if (closed) return closed;
  const size = refuseSize(input.bytes);
  if (size) {
    const refused = input.bytes > PHOTO_MAX_BYTES ? 'too-large' : 'invalid';
    return refuse(refused, size, { errors: [{ path: 'bytes', message: size }] });
  }
  const kind = kindByName(input.fileName, input.type);
  const type = typeOfKind(kind);
  if (!type) return refuseField('type', refuseKind(kind) ?? '');
  if ((await countPhotos(shop.db, ticket.id)) >= MOST_PHOTOS)
    return refuse('conflict', `The ticket has ${MOST_PHOTOS} photos: remove some first.`);
  const publicId = newPublicId();
  const uploadKey = `${UPLOADS}${publicId}`;
  const url = await shop.store.presignPut(uploadKey, type);
  await shop.db.insert(photos).values({
    publicId,
    ticketId: ticket.id,
    uploaderId: actor.id,
    state: 'waiting',
    uploadKey,
    fileName: input.fileName,
    declaredType: type,
    declaredBytes: input.bytes,
    side: input.side,
    phase: input.phase,
    createdAt: now,
  });
  return done({
    photo: publicId,
    version: 1,
    url,
    headers: { 'content-type': type },
    expiresAt: new Date(now.getTime() + UPLOAD_MS).toISOString(),
  });
}

const storeIsAway = refuse(
  'unavailable',
  'The photo store does not answer: the upload is kept, try again in a moment.',
  { retryAfter: 3 },
);

/** The file is put: makes the photo ready, or refuses it with the reason. Asking again is harmless. */
export async function completePhoto(
  shop: PhotoShop,
  _actor: Bench,
  publicId: string,
  now: Date,
): Promise<Outcome<PhotoView>> {
  const row = await photoByPublicId(shop.db, publicId);
  if (!row) return absent('photo');
  const closed = row.state === 'waiting' ? await refuseClosed(shop.db, row, now) : null;
  if (closed) return closed;
  try {
    if (row.state === 'waiting' && row.uploadKey) {
      const arrived = await fromStore(shop.store.head(row.uploadKey));
      if (arrived) {
        const due = new Date(now.getTime() + JOB_DELAY_MS);
        const job = { kind: 'photo', photoId: row.id } as const;
        await promise(shop.db, shop.settings.secret, `photo:${row.id}`, job, due);
      }
    }
    const finished = await finishPhoto(shop, row.id, now);
    if (!finished.ok) return finished;
  } catch (error) {
    if (!(error instanceof StoreTrouble)) throw error;
    shop.log.warn({ err: error, photo: row.id }, 'photo not finished');
    return storeIsAway;
  }
  const view = await photoView(shop.db, row.id);
  return view ? done(view) : absent('photo');
}

/** The refusal of an edit made from another version than the row has. */
async function stale(shop: PhotoShop, row: PhotoRow, given: number) {
  const current = await photoView(shop.db, row.id);
  if (!current) return absent('photo');
  return refuse(
    'stale',
    `Version ${given} was given, the photo is at ${current.version}: look again.`,
    {
      more: { given, current },
    },
  );
}

/** Changes side, phase, caption or sharing; a photo shared for the first time is told in the ticket's history. */
export async function editPhoto(
  shop: PhotoShop,
  actor: Bench,
  { id, version, ...change }: EditPhoto & { id: string; version: number },
  now: Date,
): Promise<Outcome<PhotoView>> {
  const row = await photoByPublicId(shop.db, id);
  if (row?.state !== 'ready') return absent('photo');
  const refusal = await inTransaction(shop.db, async (tx) => {
    const closed = await refuseClosed(tx, row, now);
    if (closed) return closed;
    const [result] = await tx
      .update(photos)
      .set({ ...change, version: sql`${photos.version} + 1` })
      .where(and(eq(photos.id, row.id), eq(photos.version, version), eq(photos.state, 'ready')));
    if (result.affectedRows !== 1) return stale(shop, row, version);
    const { shared } = change;
    // The version stood still, so what was read of `shared` is what the row had.
    if (row.ticketId !== null && shared !== undefined && shared !== row.shared) {
      const step = shared ? 'shared' : 'unshared';
      const note = shared ? 'Photo shared with the customer' : 'Photo no longer shared';
      await leaveEvent(tx, row.ticketId, actor, { kind: 'photo', step, note, open: shared }, now);
    }
    return null;
  });
  if (refusal) return refusal;
  const view = await photoView(shop.db, row.id);
  return view ? done(view) : absent('photo');
}

/** Removes a photo with its pins and, when no other photo uses them, its objects. */
export async function removePhoto(
  shop: PhotoShop,
  actor: Bench,
  { id, version }: { id: string; version: number },
  now: Date,
): Promise<Outcome<null>> {
  const row = await photoByPublicId(shop.db, id);
  if (!row) return absent('photo');
  const mine = and(eq(photos.id, row.id), eq(photos.version, version));
  const refusal = await inTransaction(shop.db, async (tx) => {
    const closed = await refuseClosed(tx, row, now);
    if (closed) return closed;
    // The lock makes a note that is just being saved with this photo wait, or be seen here.
    const [held] = await tx.select({ id: photos.id }).from(photos).where(mine).for('update');
    if (!held) return row.state === 'ready' ? stale(shop, row, version) : absent('photo');
    const note = await noteThatShows(tx, row.publicId);
    if (note !== null)
      return refuse(
        'conflict',
        `The fault note “${note}” shows this photo: take it out there first.`,
      );
    await tx.delete(photos).where(mine);
    if (row.ticketId !== null && row.state === 'ready') {
      const words = `Photo removed: ${row.side}, ${row.phase} repair`;
      const event = { kind: 'photo', step: 'removed', note: words, open: false } as const;
      await leaveEvent(tx, row.ticketId, actor, event, now);
    }
    return null;
  });
  if (refusal) return refusal;
  try {
    if (row.uploadKey) await fromStore(shop.store.remove(row.uploadKey));
    if (row.sha256) await removeUnclaimed(shop, row.sha256);
  } catch (error) {
    if (!(error instanceof StoreTrouble)) throw error;
    // The photo is gone for everybody; its objects go with the next sweep.
    shop.log.warn({ err: error, photo: row.id }, 'objects not removed');
  }
  return done(null);
}
