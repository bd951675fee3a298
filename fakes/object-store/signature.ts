import { createHash, createHmac, timingSafeEqual } from 'node:crypto';
import { encode, encodePath } from './encoding';
import { StoreError } from './errors';
import type { StoreRequest } from './request';

/** What both sides of a signature know. */
export interface Scope {
  secret: string;
  /** yyyymmdd */
  day: string;
  region: string;
}

const hmac = (key: Buffer | string, text: string) =>
  createHmac('sha256', key).update(text).digest();

/** Lower-case hexadecimal SHA-256. */
export const sha256 = (data: string | Buffer): string =>
  createHash('sha256').update(data).digest('hex');

/** The signing key of a day, region and service `s3` (AWS Signature Version 4). */
export function signingKey({ secret, day, region }: Scope): Buffer {
  return hmac(hmac(hmac(hmac(`AWS4${secret}`, day), region), 's3'), 'aws4_request');
}

/** Signs a text of lines with a signing key. */
export const sign = (key: Buffer, lines: readonly string[]): string =>
  hmac(key, lines.join('\n')).toString('hex');

/** Whether two signatures are equal, in constant time. */
export function sameSignature(given: string, expected: string): boolean {
  const [a, b] = [Buffer.from(given), Buffer.from(expected)];
  return a.length === b.length && timingSafeEqual(a, b);
}

function canonicalQuery(query: StoreRequest['query']): string {
  return query
    .filter(([name]) => name !== 'X-Amz-Signature')
    .map(([name, value]) => [encode(name), encode(value)] as const)
    .sort(([a, x], [b, y]) => (a < b ? -1 : a > b ? 1 : x < y ? -1 : x > y ? 1 : 0))
    .map(([name, value]) => `${name}=${value}`)
    .join('&');
}

function canonicalHeader(request: StoreRequest, name: string): string {
  const value = request.headers.get(name) ?? '';
  return `${name}:${value.trim().replace(/ +/g, ' ')}`;
}

/**
 * The canonical request of AWS Signature Version 4 as S3 makes it: the path is encoded once and not
 * normalised, a signed header that is missing counts as empty.
 */
export function canonicalRequest(
  request: StoreRequest,
  signedHeaders: readonly string[],
  payloadHash: string,
): string {
  return [
    request.method,
    encodePath(request.path),
    canonicalQuery(request.query),
    ...signedHeaders.map((name) => canonicalHeader(request, name)),
    '',
    signedHeaders.join(';'),
    payloadHash,
  ].join('\n');
}

/**
 * Headers that a signature must cover: host and every `x-amz-` header that is there.
 *
 * @throws StoreError AccessDenied naming those left out.
 */
export function requireSigned(request: StoreRequest, signedHeaders: readonly string[]): void {
  const names = [...request.headers.keys()].filter(
    (name) => name === 'host' || name.startsWith('x-amz-'),
  );
  const left = names.filter((name) => !signedHeaders.includes(name));
  if (left.length > 0 || !signedHeaders.includes('host')) {
    throw new StoreError(
      'AccessDenied',
      `There were headers present in the request which were not signed: ${left.join(', ')}`,
    );
  }
}
