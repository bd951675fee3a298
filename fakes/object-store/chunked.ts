import { createHash } from 'node:crypto';
import type { Proof } from './authorise';
import { ByteReader } from './byte-reader';
import { StoreError } from './errors';
import { sameSignature, sha256, sign } from './signature';

/** The words of `x-amz-content-sha256` that announce a body in chunks (aws-chunked). */
export const streamingWords = [
  'STREAMING-AWS4-HMAC-SHA256-PAYLOAD',
  'STREAMING-AWS4-HMAC-SHA256-PAYLOAD-TRAILER',
  'STREAMING-UNSIGNED-PAYLOAD-TRAILER',
] as const;

const lineLimit = 4096;
const trailerLimit = 8;
/** Largest single chunk a header may announce, in bytes. */
const chunkLimit = 0x40000000;

const mismatch = (what: string) =>
  new StoreError('SignatureDoesNotMatch', `The signature of ${what} does not match.`);

/** Trailing headers of a chunked body by lower-case name. */
export type Trailers = Map<string, string>;

function parseHeader(line: string, signed: boolean): { size: number; signature: string } {
  const pattern = signed
    ? /^([0-9a-fA-F]{1,8});chunk-signature=([0-9a-f]{64})$/
    : /^([0-9a-fA-F]{1,8})()$/;
  const match = pattern.exec(line);
  const size = parseInt(match?.[1] ?? '', 16);
  if (match === null || size > chunkLimit) {
    throw new StoreError('InvalidRequest', 'A chunk header of the body is malformed.');
  }
  return { size, signature: match[2] ?? '' };
}

async function readTrailers(reader: ByteReader, trailers: Trailers): Promise<void> {
  for (let count = 0; ; count += 1) {
    const line = await reader.line(lineLimit);
    if (line === '') return;
    const colon = line.indexOf(':');
    if (colon < 1 || count >= trailerLimit) {
      throw new StoreError('InvalidRequest', 'The trailing headers of the body are malformed.');
    }
    trailers.set(line.slice(0, colon).trim().toLowerCase(), line.slice(colon + 1).trim());
  }
}

/**
 * Takes a body out of its chunks, verifying the chain of chunk signatures when the body is signed,
 * and the trailer's when there is one. Trailing headers are put into `trailers` at the end.
 * Bytes are passed on before their chunk is verified: keep them only when the iteration ends well.
 *
 * @throws StoreError SignatureDoesNotMatch, IncompleteBody, InvalidRequest
 */
export async function* unchunk(
  source: AsyncIterable<Buffer>,
  proof: Proof,
  trailers: Trailers,
): AsyncGenerator<Buffer> {
  const signed = proof.payloadHash.startsWith('STREAMING-AWS4');
  const reader = new ByteReader(source);
  let previous = proof.signature;
  for (;;) {
    const { size, signature } = parseHeader(await reader.line(lineLimit), signed);
    const hash = createHash('sha256');
    for await (const piece of reader.bytes(size)) {
      if (signed) hash.update(piece);
      yield piece;
    }
    if (signed) {
      const lines = ['AWS4-HMAC-SHA256-PAYLOAD', proof.time, proof.scope, previous, sha256('')];
      previous = sign(proof.signingKey, [...lines, hash.digest('hex')]);
      if (!sameSignature(signature, previous)) throw mismatch('a chunk');
    }
    if (size === 0) break;
    if ((await reader.line(lineLimit)) !== '') {
      throw new StoreError('InvalidRequest', 'A chunk of the body does not end where it should.');
    }
  }
  await readTrailers(reader, trailers);
  if (proof.payloadHash === 'STREAMING-AWS4-HMAC-SHA256-PAYLOAD-TRAILER') {
    const given = trailers.get('x-amz-trailer-signature') ?? '';
    trailers.delete('x-amz-trailer-signature');
    const text = [...trailers].map(([name, value]) => `${name}:${value}\n`).join('');
    const lines = ['AWS4-HMAC-SHA256-TRAILER', proof.time, proof.scope, previous, sha256(text)];
    if (!sameSignature(given, sign(proof.signingKey, lines))) throw mismatch('the trailer');
  }
}
