import { createHash } from 'node:crypto';
import { crc32 } from 'node:zlib';

/** Checksums of the `x-amz-checksum-` family that the store verifies. */
export const checksumNames = ['crc32', 'crc32c', 'sha1', 'sha256'] as const;
export type ChecksumName = (typeof checksumNames)[number];

/** Checksums by name, in base 64 as the headers carry them. */
export type Checksums = Partial<Record<ChecksumName, string>>;

/** A checksum fed piece by piece. */
export interface Digest {
  update(data: Buffer): void;
  digest(): Buffer;
}

/** Table of CRC-32C (Castagnoli), reflected polynomial 0x82F63B78 (RFC 3720, appendix B.4). */
const castagnoli = Uint32Array.from({ length: 256 }, (_, index) => {
  let value = index;
  for (let bit = 0; bit < 8; bit += 1) value = value & 1 ? (value >>> 1) ^ 0x82f63b78 : value >>> 1;
  return value >>> 0;
});

function crc32c(data: Buffer, before: number): number {
  let value = ~before >>> 0;
  for (const byte of data) value = (castagnoli[(value ^ byte) & 0xff] ?? 0) ^ (value >>> 8);
  return ~value >>> 0;
}

function cyclic(step: (data: Buffer, before: number) => number): Digest {
  let value = 0;
  return {
    update: (data) => {
      value = step(data, value);
    },
    digest: () => {
      const bytes = Buffer.alloc(4);
      bytes.writeUInt32BE(value);
      return bytes;
    },
  };
}

/** A fresh digest: CRCs give 4 bytes, most significant first. */
export function startDigest(name: ChecksumName | 'md5'): Digest {
  if (name === 'crc32') return cyclic((data, before) => crc32(data, before));
  if (name === 'crc32c') return cyclic(crc32c);
  return createHash(name);
}

/** `CRC32` of a header or an XML field to our name for it; undefined when it is none of ours. */
export function checksumName(text: string): ChecksumName | undefined {
  return checksumNames.find((name) => name === text.toLowerCase());
}

/** Checksum of a multipart object: that over the parts' raw checksums, with their number. */
export function composite(name: ChecksumName, parts: readonly string[]): string {
  const digest = startDigest(name);
  for (const part of parts) digest.update(Buffer.from(part, 'base64'));
  return `${digest.digest().toString('base64')}-${parts.length}`;
}
