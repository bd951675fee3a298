import { randomUUID } from 'node:crypto';
import { closeSync, createReadStream } from 'node:fs';
import { mkdir, open, rm, type FileHandle } from 'node:fs/promises';
import { join } from 'node:path';
import { sweep } from '../shared/disk';
import { sealRecord, type RecordFacts } from './record';

/** A file being written, not yet part of the store. */
export class Draft {
  constructor(
    readonly path: string,
    private readonly handle: FileHandle,
  ) {}

  /** Adds content; pieces land in the order they are given. */
  async write(piece: Buffer): Promise<void> {
    await this.handle.appendFile(piece);
  }

  /** Adds the first `size` bytes of another file, given open; closes it. */
  async copy(descriptor: number, size: number): Promise<void> {
    if (size === 0) {
      closeSync(descriptor);
      return;
    }
    for await (const piece of createReadStream('', { fd: descriptor, start: 0, end: size - 1 })) {
      await this.handle.appendFile(piece as Buffer);
    }
  }

  /** Ends the file with its facts, on the disk. Only then may it be renamed into place. */
  async seal(facts: RecordFacts): Promise<void> {
    await sealRecord(this.handle, facts);
    await this.handle.close();
  }

  /** Throws the file away; harmless after it was renamed. */
  async discard(): Promise<void> {
    await this.handle.close().catch(() => undefined);
    await rm(this.path, { force: true });
  }
}

/** The folder of drafts. What lies there at the start was left by a crash and is removed. */
export class Drafts {
  private constructor(private readonly folder: string) {}

  static async open(data: string): Promise<Drafts> {
    const folder = join(data, 'drafts');
    await mkdir(folder, { recursive: true });
    await sweep(folder, () => true);
    return new Drafts(folder);
  }

  /** Runs `write` with a new draft, which is gone afterwards unless it was renamed. */
  async with<T>(write: (draft: Draft) => Promise<T>): Promise<T> {
    const path = join(this.folder, randomUUID());
    const draft = new Draft(path, await open(path, 'wx'));
    try {
      return await write(draft);
    } finally {
      await draft.discard();
    }
  }
}
