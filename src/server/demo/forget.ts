/** Takes a half-written demo shop's objects out of the store, before its tables go. */
import { photos } from '@/db/schema/photos';
import { PICTURES } from '../photos/objects';
import type { PhotoShop } from '../photos/types';

/**
 * Removes the objects of every photo. Each row names its objects before the first of them is put, and the rows stay,
 * so nothing is left behind and the work can be repeated. For a shop whose tables are dropped next.
 */
export async function forgetPhotos({ db, store }: Pick<PhotoShop, 'db' | 'store'>): Promise<void> {
  const rows = await db.select({ uploadKey: photos.uploadKey, sha256: photos.sha256 }).from(photos);
  for (const { uploadKey, sha256 } of rows) {
    if (uploadKey !== null) await store.remove(uploadKey);
    if (sha256 === null) continue;
    const { objects } = await store.list(`${PICTURES}${sha256.slice(0, 2)}/${sha256}-`);
    for (const { key } of objects) await store.remove(key);
  }
}
