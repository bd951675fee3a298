/** The pictures as they go out: our own encodings, from the store as a stream, to those who may see them. */
import type { PhotoVariantName } from '@/contracts/photos';
import type { PhotoVariant } from '@/db/schema/photos';
import type { Actor } from '../auth/actor';
import { absent, done, refuse, type Outcome } from '../refusal';
import { refuseView } from './policy';
import { photoForViewing } from './queries';
import type { PhotoShop } from './types';

/** AVIF where there is one and the browser says it takes it; WebP for everybody else. */
function choose(
  variants: readonly PhotoVariant[],
  name: PhotoVariantName,
  accept: string,
): PhotoVariant | undefined {
  const named = variants.filter((v) => v.name === name);
  const avif = accept.includes('image/avif')
    ? named.find((v) => v.type === 'image/avif')
    : undefined;
  return avif ?? named.find((v) => v.type === 'image/webp');
}

const tagsIn = (header: string | null) =>
  (header ?? '').split(',').map((tag) => tag.trim().replace(/^W\//, ''));

export type PictureAsked = {
  id: string;
  variant: PhotoVariantName;
  accept: string;
  ifNoneMatch: string | null;
};

/**
 * How long a browser may show what it keeps without asking. Customers may sit at a borrowed screen, and a photo may be
 * shared with them no longer: theirs is asked about every time. Staff turn photos over all day.
 */
const keeping = (actor: Actor | null) =>
  actor?.kind === 'staff' ? 'private, max-age=600' : 'private, no-cache';

/** Answers a variant of a photo; what an address answers never changes, so an ETag saves sending it again. */
export async function servePicture(
  { db, store, log }: PhotoShop,
  actor: Actor | null,
  asked: PictureAsked,
): Promise<Outcome<Response>> {
  const photo = await photoForViewing(db, asked.id);
  const refusal = refuseView(actor, photo);
  if (refusal) return refusal;
  const variant = choose(photo?.variants ?? [], asked.variant, asked.accept);
  if (!variant) return absent('photo');
  const etag = `"${variant.key.slice(variant.key.lastIndexOf('/') + 1)}"`;
  const headers = {
    etag,
    'cache-control': keeping(actor),
    // The answer is for who asked: the next person at this browser has another cookie.
    vary: 'accept, cookie, authorization',
  };
  if (tagsIn(asked.ifNoneMatch).includes(etag))
    return done(new Response(null, { status: 304, headers }));
  const object = await store.open(variant.key).catch((error: unknown) => {
    log.warn({ err: error, key: variant.key }, 'picture not read');
    return null;
  });
  if (!object)
    return refuse('unavailable', 'The photo store does not answer: try again in a moment.', {
      retryAfter: 3,
    });
  return done(
    new Response(object.body, {
      headers: {
        ...headers,
        'content-type': variant.type,
        'content-length': String(object.bytes),
        'content-disposition': 'inline',
      },
    }),
  );
}
