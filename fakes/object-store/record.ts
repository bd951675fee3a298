import { open, type FileHandle } from 'node:fs/promises';
import * as z from 'zod/v4';
import { checksumNames } from './checksum';

/**
 * A file of the store: content, then its facts as JSON, then 8 bytes (length of the JSON, a mark).
 * Content and facts are thus renamed into place together.
 */
const recordFacts = z.strictObject({
  key: z.string(),
  size: z.int().min(0),
  etag: z.string(),
  /** Milliseconds since 1970. */
  modified: z.number(),
  /** Content-Type and its kin as they are sent back. */
  headers: z.record(z.string(), z.string()),
  /** `x-amz-meta-` by name without the prefix. */
  metadata: z.record(z.string(), z.string()),
  checksums: z.partialRecord(z.enum(checksumNames), z.string()),
});
export type RecordFacts = z.infer<typeof recordFacts>;

const mark = 0x4d57_4f31;
const tailBytes = 8;

/** Ends a record: writes the facts after the content and syncs the file to the disk. */
export async function sealRecord(handle: FileHandle, facts: RecordFacts): Promise<void> {
  const json = Buffer.from(JSON.stringify(facts));
  const tail = Buffer.alloc(tailBytes);
  tail.writeUInt32BE(json.length, 0);
  tail.writeUInt32BE(mark, 4);
  await handle.appendFile(Buffer.concat([json, tail]));
  await handle.sync();
}

/** The facts of a record file, or undefined when the file is no whole record. */
export async function readFacts(path: string): Promise<RecordFacts | undefined> {
  const handle = await open(path, 'r');
  try {
    const { size } = await handle.stat();
    const tail = Buffer.alloc(tailBytes);
    if (size < tailBytes) return undefined;
    await handle.read(tail, 0, tailBytes, size - tailBytes);
    const length = tail.readUInt32BE(0);
    if (tail.readUInt32BE(4) !== mark || length > size - tailBytes) return undefined;
    const json = Buffer.alloc(length);
    await handle.read(json, 0, length, size - tailBytes - length);
    const facts = recordFacts.safeParse(JSON.parse(json.toString('utf8')));
    return facts.success && facts.data.size === size - tailBytes - length ? facts.data : undefined;
  } catch (error) {
    if (error instanceof SyntaxError) return undefined;
    throw error;
  } finally {
    await handle.close();
  }
}
