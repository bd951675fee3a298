/** From the uploaded file to a ready photo, or to a refusal that leaves nothing behind. Repeating it is harmless. */
import { and, eq } from 'drizzle-orm';
import { inTransaction } from '@/db/client';
import { users } from '@/db/schema/people';
import { photos, type PhotoVariant } from '@/db/schema/photos';
import { PHOTO_MAX_BYTES, refuseSize } from '@/domain/photos/files';
import { done, refuse, type Outcome, type RefusalKind } from '../refusal';
import { reencode } from '../storage/reencode';
import { fromStore } from '../storage/trouble';
import { turns } from '../storage/turns';
import { DAMAGED, verifyPhoto } from '../storage/verify';
import { leaveEvent } from '../tickets/commands';
import { putVariants, removeUnclaimed } from './objects';
import { photoById } from './queries';
import type { PhotoRow, PhotoShop } from './types';

/** Decoding holds a core and up to 200 MB: two at a time leave room for the pages. */
const inTurn = turns(2);

const REMOVED = refuse('absent', 'The photo was removed meanwhile.');
const NOT_ARRIVED = refuse('conflict', 'The file has not arrived: upload it first.');

const stillWaiting = (id: number) => and(eq(photos.id, id), eq(photos.state, 'waiting'));

/** Takes the file away first: a refused row never leaves one behind. */
async function refuseUpload(
  { db, store }: PhotoShop,
  row: PhotoRow,
  uploadKey: string,
  why: string,
  kind: RefusalKind = 'invalid',
): Promise<Outcome<null>> {
  await fromStore(store.remove(uploadKey));
  await db
    .update(photos)
    .set({ state: 'refused', refusal: why, uploadKey: null, sha256: null })
    .where(stillWaiting(row.id));
  return refuse(kind, why, { errors: [{ path: 'file', message: why }] });
}

async function hashOf(file: Buffer): Promise<string> {
  const digest = await crypto.subtle.digest('SHA-256', file as unknown as ArrayBuffer);
  return Buffer.from(digest).toString('hex');
}

/**
 * The row becomes ready and the event is written, together; false when it no longer waits with this hash: another
 * finished it, or it was removed, or the file was put anew meanwhile.
 */
async function makeReady(
  { db }: PhotoShop,
  row: PhotoRow,
  sha256: string,
  variants: PhotoVariant[],
  now: Date,
): Promise<boolean> {
  const { width, height } = variants[0] ?? { width: null, height: null };
  return inTransaction(db, async (tx) => {
    const [changed] = await tx
      .update(photos)
      .set({ state: 'ready', variants, width, height, uploadKey: null, readyAt: now })
      .where(and(stillWaiting(row.id), eq(photos.sha256, sha256)));
    if (changed.affectedRows !== 1) return false;
    if (row.ticketId === null) return true;
    const [uploader] = await tx
      .select({ id: users.id, name: users.name })
      .from(users)
      .where(eq(users.id, row.uploaderId));
    if (!uploader) throw new Error(`Photo ${row.id} has no uploader.`);
    const note = `Photo added: ${row.side}, ${row.phase} repair`;
    const event = { kind: 'photo', step: 'added', note, open: row.shared } as const;
    await leaveEvent(tx, row.ticketId, uploader, event, now);
    return true;
  });
}

async function finish(shop: PhotoShop, id: number, now: Date): Promise<Outcome<null>> {
  const { db, store } = shop;
  const row = await photoById(db, id);
  if (!row) return REMOVED;
  if (row.state === 'ready') return done(null);
  if (row.state === 'refused' || !row.uploadKey)
    return refuse('conflict', row.refusal ?? 'The upload was refused.');
  const { uploadKey } = row;
  const head = await fromStore(store.head(uploadKey));
  if (!head) return NOT_ARRIVED;
  const size = refuseSize(head.bytes);
  const kind = head.bytes > PHOTO_MAX_BYTES ? 'too-large' : 'invalid';
  if (size) return refuseUpload(shop, row, uploadKey, size, kind);
  const got = await fromStore(store.get(uploadKey, PHOTO_MAX_BYTES));
  if (!got) return NOT_ARRIVED;
  const file = Buffer.from(got.buffer, got.byteOffset, got.byteLength);
  const verdict = await verifyPhoto(file, row.declaredType);
  if (!verdict.fit) return refuseUpload(shop, row, uploadKey, verdict.why);
  const made = await reencode(file).catch(() => null);
  if (!made) return refuseUpload(shop, row, uploadKey, DAMAGED);
  const sha256 = await hashOf(file);
  await inTransaction(db, (tx) => tx.update(photos).set({ sha256 }).where(stillWaiting(id)));
  const variants = await putVariants(shop, sha256, made);
  if (!(await makeReady(shop, row, sha256, variants, now))) return outrun(shop, id, sha256);
  // The picture stands without this; what stays behind is swept.
  await store
    .remove(uploadKey)
    .catch((error: unknown) => shop.log.warn({ err: error, photo: id }, 'upload not removed'));
  return done(null);
}

/** Somebody else settled the photo while it was worked on. */
async function outrun(shop: PhotoShop, id: number, sha256: string): Promise<Outcome<null>> {
  await removeUnclaimed(shop, sha256);
  const row = await photoById(shop.db, id);
  if (row?.state === 'ready') return done(null);
  return row
    ? refuse('conflict', row.refusal ?? 'The file was put anew meanwhile: ask again.')
    : REMOVED;
}

/**
 * Makes an uploaded photo ready: verified, re-encoded, its variants in the store before its row points to them.
 *
 * @throws StoreTrouble when the store fails: the upload stays and the work can be repeated.
 */
export const finishPhoto = (shop: PhotoShop, id: number, now: Date): Promise<Outcome<null>> =>
  inTurn(() => finish(shop, id, now));
