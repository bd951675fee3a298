import type { Proof } from './authorise';
import {
  checksumName,
  checksumNames,
  startDigest,
  type ChecksumName,
  type Checksums,
  type Digest,
} from './checksum';
import { streamingWords, unchunk, type Trailers } from './chunked';
import { sha256 } from './signature';
import { StoreError } from './errors';
import { amz, type StoreRequest } from './request';

/** What is known of a body once it has come in whole and matched all its promises. */
export interface Received {
  size: number;
  /** Hexadecimal. */
  md5: string;
  checksums: Checksums;
}

/** A fault on the way in: `corrupt` changes the first byte, `truncate` loses the second half. */
export type Damage = 'corrupt' | 'truncate' | undefined;

const prefix = 'x-amz-checksum-';
const notChecksums = ['algorithm', 'type', 'mode'];

function wholeNumber(text: string | undefined): number {
  return text !== undefined && /^\d{1,15}$/.test(text) ? Number(text) : NaN;
}

/** Length that the request declares for its content, in bytes. */
function declaredSize(request: StoreRequest, streaming: boolean): number {
  const header = streaming ? 'x-amz-decoded-content-length' : 'content-length';
  const size = wholeNumber(request.headers.get(header));
  if (Number.isNaN(size)) throw new StoreError('MissingContentLength', `${header} is needed.`);
  return size;
}

/** Checksums promised in headers, or by `x-amz-trailer` with the value still to come. */
function promises(request: StoreRequest): Map<ChecksumName, string | undefined> {
  const found = new Map<ChecksumName, string | undefined>();
  const add = (header: string, value: string | undefined) => {
    const name = checksumName(header.slice(prefix.length));
    if (name === undefined) {
      throw new StoreError('NotImplemented', `Checksums kept are ${checksumNames.join(', ')}.`);
    }
    found.set(name, value);
  };
  for (const [given, value] of [...request.headers, ...request.query]) {
    const name = given.toLowerCase();
    if (name.startsWith(prefix) && !notChecksums.includes(name.slice(prefix.length))) {
      add(name, value);
    }
  }
  const trailer = amz(request, 'x-amz-trailer')?.trim().toLowerCase();
  if (trailer !== undefined) {
    if (!trailer.startsWith(prefix)) {
      throw new StoreError('InvalidRequest', 'x-amz-trailer may announce a checksum only.');
    }
    add(trailer, undefined);
  }
  return found;
}

function checkPayloadWord(word: string): boolean {
  if (streamingWords.some((known) => known === word)) return true;
  if (word === 'UNSIGNED-PAYLOAD' || /^[0-9a-f]{64}$/.test(word)) return false;
  throw new StoreError(
    'InvalidArgument',
    `x-amz-content-sha256 must be UNSIGNED-PAYLOAD, a SHA-256 or one of ${streamingWords.join(', ')}.`,
  );
}

function checkMd5(request: StoreRequest, actual: Buffer): void {
  const given = request.headers.get('content-md5');
  if (given === undefined) return;
  const expected = Buffer.from(given, 'base64');
  if (expected.length !== 16) throw new StoreError('InvalidDigest', 'Content-MD5 is no MD5.');
  if (!expected.equals(actual)) {
    throw new StoreError('BadDigest', 'The Content-MD5 does not match the body received.');
  }
}

/** Cuts or changes a stream as a fault asks. `size` is the declared length. */
async function* damaged(source: AsyncIterable<Buffer>, damage: Damage, size: number) {
  let seen = 0;
  for await (const piece of source) {
    if (damage === 'corrupt' && seen === 0 && piece.length > 0) {
      piece.writeUInt8(piece.readUInt8(0) ^ 0xff, 0);
    }
    seen += piece.length;
    if (damage === 'truncate' && seen * 2 >= size) {
      throw new StoreError('IncompleteBody', 'The body ended too early.');
    }
    yield piece;
  }
}

/**
 * Takes in a body, hands it to `keep` piece by piece and verifies all that was promised of it:
 * length, SHA-256 of the signature or chunk signatures, Content-MD5, checksums in headers or trailer.
 * What `keep` was given counts only when this returns.
 *
 * @throws StoreError EntityTooLarge above `limit` bytes, else S3's code for what does not match.
 */
export async function receiveBody(
  request: StoreRequest,
  proof: Proof,
  limit: number,
  keep: (piece: Buffer) => Promise<void> | void,
  damage?: Damage,
): Promise<Received> {
  const streaming = checkPayloadWord(proof.payloadHash);
  const declared = declaredSize(request, streaming);
  const tooLarge = () => new StoreError('EntityTooLarge', `An upload may have ${limit} bytes.`);
  if (declared > limit) throw tooLarge();

  const promised = promises(request);
  const digests = new Map<ChecksumName | 'md5' | 'sha256', Digest>();
  for (const name of ['md5', 'crc32', ...promised.keys()] as const) {
    digests.set(name, startDigest(name));
  }
  if (!streaming && proof.payloadHash !== 'UNSIGNED-PAYLOAD') {
    digests.set('sha256', startDigest('sha256'));
  }

  const trailers: Trailers = new Map();
  const content = streaming ? unchunk(request.body, proof, trailers) : request.body;
  let size = 0;
  for await (const piece of damaged(content, damage, declared)) {
    size += piece.length;
    if (size > declared) throw size > limit ? tooLarge() : lengthWrong(declared);
    for (const digest of digests.values()) digest.update(piece);
    await keep(piece);
  }
  if (size !== declared) throw lengthWrong(declared);

  const result = new Map([...digests].map(([name, digest]) => [name, digest.digest()]));
  const md5 = result.get('md5') ?? Buffer.alloc(0);
  if (!streaming && proof.payloadHash !== 'UNSIGNED-PAYLOAD') {
    if (result.get('sha256')?.toString('hex') !== proof.payloadHash) {
      throw new StoreError(
        'XAmzContentSHA256Mismatch',
        'The x-amz-content-sha256 does not match the body received.',
      );
    }
  }
  checkMd5(request, md5);
  const checksums: Checksums = { crc32: result.get('crc32')?.toString('base64') };
  for (const [name, value] of promised) {
    const actual = result.get(name)?.toString('base64');
    if ((value ?? trailers.get(prefix + name)) !== actual) {
      throw new StoreError('BadDigest', `The ${name} given does not match the body received.`);
    }
    checksums[name] = actual;
  }
  return { size, md5: md5.toString('hex'), checksums };
}

const lengthWrong = (declared: number) =>
  new StoreError('IncompleteBody', `The body does not have the ${declared} bytes it declares.`);

/** Takes in a small body, such as an XML document. */
export async function receiveText(
  request: StoreRequest,
  proof: Proof,
  limit: number,
): Promise<string> {
  const pieces: Buffer[] = [];
  await receiveBody(request, proof, limit, (piece) => {
    pieces.push(Buffer.from(piece));
  });
  return Buffer.concat(pieces).toString('utf8');
}

/** Verifies that a request which needs no body has none that was left unsigned. */
export function refuseBody(request: StoreRequest, proof: Proof): void {
  const size = wholeNumber(request.headers.get('content-length') ?? '0');
  const empty = proof.payloadHash === 'UNSIGNED-PAYLOAD' || proof.payloadHash === sha256('');
  if (size !== 0 || !empty) {
    throw new StoreError('InvalidRequest', 'This request has no body.');
  }
}
