/** Lists in pages: the cursor is the offset, opaque to clients. */
import { done, refuseField, type Outcome } from '../refusal';

const encode = (offset: number) => Buffer.from(`o${offset}`).toString('base64url');

function decode(cursor: string | undefined): number | null {
  if (cursor === undefined) return 0;
  const offset = /^o(\d{1,9})$/.exec(Buffer.from(cursor, 'base64url').toString('latin1'))?.[1];
  return offset === undefined ? null : Number(offset);
}

type Page<T> = { json: { items: T[]; next: string | null } };

/** One page of a list: asks for one row more than shown, to know whether there is a next page. */
export async function pageByOffset<T>(
  query: { limit: number; cursor?: string | undefined },
  read: (limit: number, offset: number) => Promise<T[]>,
): Promise<Outcome<Page<T>>> {
  const offset = decode(query.cursor);
  if (offset === null)
    return refuseField('cursor', 'Not a cursor of this list: take `next` of the page before.');
  const rows = await read(query.limit + 1, offset);
  const more = rows.length > query.limit;
  return done({
    json: { items: rows.slice(0, query.limit), next: more ? encode(offset + query.limit) : null },
  });
}
