import { StoreError } from './errors';
import { amz, type StoreRequest } from './request';
import type { RecordFacts } from './record';

const kept = [
  'content-type',
  'cache-control',
  'content-disposition',
  'content-encoding',
  'content-language',
  'expires',
] as const;

const metadataLimit = 2048;
const metaPrefix = 'x-amz-meta-';

/** Content-Type and its kin as a write gives them; aws-chunked is of the transfer, not the object. */
export function keptHeaders(request: StoreRequest): Record<string, string> {
  const headers: Record<string, string> = {};
  for (const name of kept) {
    let value = request.headers.get(name);
    if (name === 'content-encoding') {
      value = value
        ?.split(',')
        .map((coding) => coding.trim())
        .filter((coding) => coding !== 'aws-chunked')
        .join(', ');
    }
    if (value !== undefined && value !== '') headers[name] = value;
  }
  headers['content-type'] ??= 'binary/octet-stream';
  return headers;
}

/** @throws StoreError MetadataTooLarge above 2 KB of names and values */
export function keptMetadata(request: StoreRequest): Record<string, string> {
  const metadata: Record<string, string> = {};
  let size = 0;
  for (const [given, value] of [...request.query, ...request.headers]) {
    const name = given.toLowerCase();
    if (!name.startsWith(metaPrefix)) continue;
    const short = name.slice(metaPrefix.length);
    size += short.length + Buffer.byteLength(value);
    metadata[short] = value;
  }
  if (size > metadataLimit) {
    throw new StoreError('MetadataTooLarge', `Metadata may have ${metadataLimit} bytes.`);
  }
  return metadata;
}

/**
 * Everything here is private to the account.
 *
 * @throws StoreError AccessControlListNotSupported for any other wish
 */
export function refusePublic(request: StoreRequest): void {
  const list = amz(request, 'x-amz-acl');
  if (list !== undefined && list !== 'private' && list !== 'bucket-owner-full-control') {
    throw new StoreError('AccessControlListNotSupported', 'Objects here are private.');
  }
}

/** ETag and checksums of an object as headers. */
export function digestHeaders(facts: RecordFacts): Record<string, string> {
  return {
    etag: `"${facts.etag}"`,
    ...Object.fromEntries(
      Object.entries(facts.checksums).map(([name, value]) => [`x-amz-checksum-${name}`, value]),
    ),
  };
}

const overrides = kept.map((name) => [name, `response-${name}`] as const);

/** Headers of a read: those kept, what the address overrides, ETag, date and metadata. */
export function readHeaders(request: StoreRequest, facts: RecordFacts): Record<string, string> {
  const headers: Record<string, string> = {
    ...facts.headers,
    etag: `"${facts.etag}"`,
    'last-modified': new Date(facts.modified).toUTCString(),
    'accept-ranges': 'bytes',
  };
  for (const [name, value] of Object.entries(facts.metadata)) headers[metaPrefix + name] = value;
  for (const [name, wish] of overrides) {
    const value = request.query.find(([given]) => given === wish)?.[1];
    if (value === undefined) continue;
    if (/[^\t\x20-\x7e\x80-\xff]/.test(value)) {
      throw new StoreError('InvalidArgument', `${wish} must be a header value.`);
    }
    headers[name] = value;
  }
  return headers;
}
