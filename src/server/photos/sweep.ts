/** Takes away what uploads leave behind: rows nobody came back to, objects no row points to. */
import { and, eq, inArray, isNotNull, lt } from 'drizzle-orm';
import { photos } from '@/db/schema/photos';
import { hashInKey, PICTURES, removeUnclaimed, UPLOADS } from './objects';
import type { PhotoShop } from './types';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const SLOT = 600_000;

/** Waiting rows without a file after an hour, with one after a day; refused ones after a day. */
async function sweepRows({ db, store }: PhotoShop, now: Date): Promise<void> {
  const ago = (ms: number) => new Date(now.getTime() - ms);
  const old = await db
    .select({ id: photos.id, uploadKey: photos.uploadKey, createdAt: photos.createdAt })
    .from(photos)
    .where(and(eq(photos.state, 'waiting'), lt(photos.createdAt, ago(HOUR))))
    .limit(200);
  for (const row of old) {
    const there = row.uploadKey !== null && (await store.head(row.uploadKey)) !== null;
    if (there && row.createdAt > ago(DAY)) continue;
    await db.delete(photos).where(and(eq(photos.id, row.id), eq(photos.state, 'waiting')));
    if (there && row.uploadKey) await store.remove(row.uploadKey);
  }
  await db.delete(photos).where(and(eq(photos.state, 'refused'), lt(photos.createdAt, ago(DAY))));
}

/** The keys under a prefix that have been there for a day, page by page. */
async function* oldKeys({ store }: PhotoShop, prefix: string, now: Date) {
  let after: string | undefined;
  do {
    const { objects, next } = await store.list(prefix, after);
    yield objects.filter((o) => now.getTime() - o.modified.getTime() > DAY).map((o) => o.key);
    after = next;
  } while (after);
}

async function sweepUploads(shop: PhotoShop, now: Date): Promise<void> {
  for await (const keys of oldKeys(shop, UPLOADS, now)) {
    if (keys.length === 0) continue;
    const rows = await shop.db
      .select({ key: photos.uploadKey })
      .from(photos)
      .where(and(eq(photos.state, 'waiting'), isNotNull(photos.uploadKey)));
    const held = new Set(rows.map((row) => row.key));
    for (const key of keys) if (!held.has(key)) await shop.store.remove(key);
  }
}

/** Objects of pictures under one prefix whose hash no row claims. */
export async function sweepPictures(shop: PhotoShop, prefix: string, now: Date): Promise<void> {
  for await (const keys of oldKeys(shop, prefix, now)) {
    const hashes = [...new Set(keys.flatMap((key) => hashInKey(key) ?? []))];
    if (hashes.length === 0) continue;
    const rows = await shop.db
      .select({ sha256: photos.sha256 })
      .from(photos)
      .where(inArray(photos.sha256, hashes));
    const claimed = new Set(rows.map((row) => row.sha256));
    for (const hash of hashes) if (!claimed.has(hash)) await removeUnclaimed(shop, hash);
  }
}

/** One round: all rows and uploads, and a sixteenth of the pictures, another one every ten minutes. */
export async function sweepPhotos(shop: PhotoShop, now: Date): Promise<void> {
  await sweepRows(shop, now);
  await sweepUploads(shop, now);
  const digit = (Math.floor(now.getTime() / SLOT) % 16).toString(16);
  await sweepPictures(shop, `${PICTURES}${digit}`, now);
}
