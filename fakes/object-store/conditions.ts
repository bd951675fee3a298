import { StoreError } from './errors';
import type { RecordFacts } from './record';

type Headers = ReadonlyMap<string, string>;

const unquote = (text: string) => text.trim().replace(/^(W\/)?"(.*)"$/, '$2');

/** Whether an If-Match or If-None-Match list names this ETag; `*` names any. */
function names(list: string, etag: string): boolean {
  return list.split(',').some((item) => item.trim() === '*' || unquote(item) === etag);
}

const failed = (header: string) =>
  new StoreError('PreconditionFailed', `The condition of ${header} does not hold.`);

/**
 * The guard of a conditional write: `If-None-Match: *` (nothing there yet) and `If-Match` (this
 * very version there).
 *
 * @throws StoreError PreconditionFailed, NoSuchKey; NotImplemented for If-None-Match with an ETag
 */
export function writeGuard(headers: Headers): (existing: RecordFacts | undefined) => void {
  const noneMatch = headers.get('if-none-match');
  const match = headers.get('if-match');
  if (noneMatch !== undefined && noneMatch.trim() !== '*') {
    throw new StoreError('NotImplemented', 'If-None-Match on a write may be * only.');
  }
  return (existing) => {
    if (noneMatch !== undefined && existing !== undefined) throw failed('If-None-Match');
    if (match === undefined) return;
    if (existing === undefined) throw new StoreError('NoSuchKey', 'The key does not exist.');
    if (!names(match, existing.etag)) throw failed('If-Match');
  };
}

/** Seconds since 1970 of an HTTP date, NaN when it is none; the header's resolution is a second. */
const seconds = (date: string | undefined) => Math.floor(Date.parse(date ?? '') / 1000);

/**
 * Conditions of a read (RFC 9110, 13.2.2): the ETag ones come before the dates.
 * `prefix` is `x-amz-copy-source-` for the source of a copy.
 *
 * @returns 'not-modified' for a 304
 * @throws StoreError PreconditionFailed
 */
export function checkRead(
  headers: Headers,
  facts: RecordFacts,
  prefix = '',
): 'go' | 'not-modified' {
  const [match, noneMatch, since, unmodified] = [
    'if-match',
    'if-none-match',
    'if-modified-since',
    'if-unmodified-since',
  ].map((name) => headers.get(prefix + name));
  const modified = Math.floor(facts.modified / 1000);
  if (match !== undefined) {
    if (!names(match, facts.etag)) throw failed('If-Match');
  } else if (modified > seconds(unmodified)) {
    throw failed('If-Unmodified-Since');
  }
  if (noneMatch !== undefined) return names(noneMatch, facts.etag) ? 'not-modified' : 'go';
  return modified <= seconds(since) ? 'not-modified' : 'go';
}

/** First and last byte of a range, both included. */
export interface ByteRange {
  first: number;
  last: number;
}

/**
 * The bytes a Range header asks for. Undefined (the whole) when there is none, several, or no bytes
 * range, as S3 does.
 *
 * @throws StoreError InvalidRange when it starts beyond the end
 */
export function readRange(header: string | undefined, size: number): ByteRange | undefined {
  const match = /^bytes=(\d{0,15})-(\d{0,15})$/.exec(header?.trim() ?? '');
  const [, from = '', to = ''] = match ?? [];
  if (match === null || (from === '' && to === '')) return undefined;
  const first = from === '' ? Math.max(0, size - Number(to)) : Number(from);
  const last = from === '' || to === '' ? size - 1 : Math.min(Number(to), size - 1);
  if (from !== '' && to !== '' && Number(from) > Number(to)) return undefined;
  if (first > last) throw new StoreError('InvalidRange', 'The range is not satisfiable.');
  return { first, last };
}
