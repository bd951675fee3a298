/**
 * The objects behind photos. Their keys come from the hash of the file that came, so two photos of one file share
 * them. A photo claims its hash in its row before it puts the first object; whoever removes objects holds the hash
 * in the index meanwhile, so that no claim can slip in between looking and removing.
 */
import { eq } from 'drizzle-orm';
import { inTransaction } from '@/db/client';
import { photos, type PhotoVariant } from '@/db/schema/photos';
import type { Encoded } from '../storage/reencode';
import { fromStore } from '../storage/trouble';
import type { PhotoShop } from './types';

export const UPLOADS = 'uploads/';
export const PICTURES = 'photos/';

const EXTENSIONS = { 'image/webp': 'webp', 'image/avif': 'avif' } as const;

const keyOf = (sha256: string, { name, type }: Pick<Encoded, 'name' | 'type'>): string =>
  `${PICTURES}${sha256.slice(0, 2)}/${sha256}-${name}.${EXTENSIONS[type]}`;

/** The hash in an object's key, or null when the key is none of ours. */
export const hashInKey = (key: string): string | null =>
  /^photos\/[0-9a-f]{2}\/([0-9a-f]{64})-/.exec(key)?.[1] ?? null;

/** Puts every variant. @throws StoreTrouble */
export async function putVariants(
  { store }: Pick<PhotoShop, 'store'>,
  sha256: string,
  made: readonly Encoded[],
): Promise<PhotoVariant[]> {
  return Promise.all(
    made.map(async ({ bytes, ...variant }) => {
      const key = keyOf(sha256, variant);
      await fromStore(store.put(key, bytes, variant.type));
      return { ...variant, key, bytes: bytes.length };
    }),
  );
}

/**
 * Removes the objects of a hash that no photo claims any more.
 *
 * @throws StoreTrouble when the store fails; what is left is swept later.
 */
export async function removeUnclaimed(shop: PhotoShop, sha256: string): Promise<void> {
  await inTransaction(shop.db, async (tx) => {
    // Locks the place of this hash in the index: a claim of it waits until the objects are gone, then puts its own.
    const claims = await tx
      .select({ id: photos.id })
      .from(photos)
      .where(eq(photos.sha256, sha256))
      .for('update');
    if (claims.length > 0) return;
    const { objects } = await fromStore(
      shop.store.list(`${PICTURES}${sha256.slice(0, 2)}/${sha256}-`),
    );
    for (const { key } of objects) await fromStore(shop.store.remove(key));
  });
}
