import { StoreError } from './errors';

export interface ListQuery {
  prefix: string;
  /** Empty for none. */
  delimiter: string;
  /** 0 to 1000. */
  limit: number;
  /** Start strictly after this key. */
  startAfter: string;
  /** Where the page before ended. */
  token: string | undefined;
}

export interface ListPage {
  keys: string[];
  prefixes: string[];
  /** Set when there is more. */
  nextToken: string | undefined;
}

const compare = (a: string, b: string) => Buffer.compare(Buffer.from(a), Buffer.from(b));

/** Index of the first key for which `past` holds; `past` turns from false to true once. */
function firstIndex(keys: readonly string[], past: (key: string) => boolean): number {
  let [low, high] = [0, keys.length];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (past(keys[middle] ?? '')) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** A token names the last thing listed: `k` and a key, or `p` and a common prefix. */
function readToken(token: string): { last: string; wholePrefix: boolean } {
  const text = Buffer.from(token, 'base64url').toString('utf8');
  const wholePrefix = text.startsWith('p');
  if (!wholePrefix && !text.startsWith('k')) {
    throw new StoreError('InvalidArgument', 'The continuation token is not one of ours.');
  }
  return { last: text.slice(1), wholePrefix };
}

const makeToken = (kind: 'k' | 'p', last: string) => Buffer.from(kind + last).toString('base64url');

/**
 * One page of a listing in the order of UTF-8 bytes; keys sharing a beginning up to the delimiter
 * count as one common prefix.
 *
 * @throws StoreError InvalidArgument for a foreign token
 */
export function listPage(sortedKeys: readonly string[], query: ListQuery): ListPage {
  const { prefix, delimiter, limit, startAfter } = query;
  const token = query.token === undefined ? undefined : readToken(query.token);
  const after = token?.last ?? startAfter;
  let index = firstIndex(sortedKeys, (key) => compare(key, after) > 0 && compare(key, prefix) >= 0);
  const page: ListPage = { keys: [], prefixes: [], nextToken: undefined };
  let last = '';
  for (; index < sortedKeys.length; index += 1) {
    const key = sortedKeys[index] ?? '';
    if (!key.startsWith(prefix)) break;
    if (token?.wholePrefix === true && key.startsWith(token.last)) continue;
    const cut = delimiter === '' ? -1 : key.indexOf(delimiter, prefix.length);
    const common = cut < 0 ? undefined : key.slice(0, cut + delimiter.length);
    if (common !== undefined && common === page.prefixes.at(-1)) continue;
    if (page.keys.length + page.prefixes.length >= limit) {
      if (limit > 0) page.nextToken = last;
      break;
    }
    if (common === undefined) page.keys.push(key);
    else page.prefixes.push(common);
    last = common === undefined ? makeToken('k', key) : makeToken('p', common);
  }
  return page;
}
