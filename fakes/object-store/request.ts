import type { IncomingMessage } from 'node:http';
import { decode } from './encoding';
import { StoreError } from './errors';

/** A request as the store reads it: percent-decoded, header names in lower case. */
export interface StoreRequest {
  method: string;
  /** Path as decoded, with its leading slash: what a signature is made over. */
  path: string;
  bucket: string;
  key: string;
  query: ReadonlyArray<readonly [name: string, value: string]>;
  headers: ReadonlyMap<string, string>;
  body: AsyncIterable<Buffer>;
}

/** Longest key, in bytes of UTF-8. */
const keyLimit = 1024;

function parseQuery(text: string): Array<[string, string]> {
  if (text === '') return [];
  return text.split('&').map((pair) => {
    const at = pair.indexOf('=');
    return at < 0 ? [decode(pair), ''] : [decode(pair.slice(0, at)), decode(pair.slice(at + 1))];
  });
}

/**
 * Reads address and headers. The path is taken as sent, never normalised: `..` and encoded slashes
 * are letters of a key like any other.
 *
 * @throws StoreError InvalidURI, KeyTooLongError
 */
export function parseRequest(incoming: IncomingMessage): StoreRequest {
  const url = incoming.url ?? '';
  if (!url.startsWith('/')) throw new StoreError('InvalidURI', 'The address must start with /.');
  const mark = url.indexOf('?');
  const path = decode(mark < 0 ? url : url.slice(0, mark));
  const slash = path.indexOf('/', 1);
  const bucket = slash < 0 ? path.slice(1) : path.slice(1, slash);
  const key = slash < 0 ? '' : path.slice(slash + 1);
  if (Buffer.byteLength(key) > keyLimit) {
    throw new StoreError('KeyTooLongError', `A key may have ${keyLimit} bytes.`);
  }
  const headers = new Map<string, string>();
  for (const [name, values] of Object.entries(incoming.headersDistinct)) {
    if (values !== undefined) headers.set(name, values.join(','));
  }
  return {
    method: incoming.method ?? 'GET',
    path,
    bucket,
    key,
    query: parseQuery(mark < 0 ? '' : url.slice(mark + 1)),
    headers,
    // A handler that stops reading must still be able to answer: the connection stays.
    body: incoming.iterator({ destroyOnReturn: false }),
  };
}

/** The value of a query parameter, or undefined when it is not there. */
export function parameter(request: StoreRequest, name: string): string | undefined {
  return request.query.find(([given]) => given === name)?.[1];
}

/**
 * An `x-amz-` header, or the query parameter a presigned address carries in its place.
 * Query names are compared without case, as clients write them both ways.
 */
export function amz(request: StoreRequest, name: string): string | undefined {
  const header = request.headers.get(name);
  if (header !== undefined) return header;
  return request.query.find(([given]) => given.toLowerCase() === name)?.[1];
}
