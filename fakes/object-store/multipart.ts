import { randomBytes } from 'node:crypto';
import { renameSync } from 'node:fs';
import { mkdir, readFile, readdir, rm } from 'node:fs/promises';
import { join } from 'node:path';
import * as z from 'zod/v4';
import { syncFolder, writeWhole } from '../shared/disk';
import { StoreError } from './errors';
import { readFacts, type RecordFacts } from './record';

const uploadFacts = z.strictObject({
  bucket: z.string(),
  key: z.string(),
  /** Milliseconds since 1970. */
  started: z.number(),
  headers: z.record(z.string(), z.string()),
  metadata: z.record(z.string(), z.string()),
});
export type UploadFacts = z.infer<typeof uploadFacts>;

/** A multipart upload that is neither completed nor aborted. */
export class Upload {
  readonly parts = new Map<number, RecordFacts>();
  /** Set while the parts are joined: nothing may change under it. */
  joining = false;

  constructor(
    readonly id: string,
    readonly folder: string,
    readonly facts: UploadFacts,
  ) {}

  partPath(number: number): string {
    return join(this.folder, `part-${number}`);
  }

  /** @throws StoreError OperationAborted while the upload is being completed */
  refuseWhileJoining(): void {
    if (this.joining) {
      throw new StoreError('OperationAborted', 'The upload is being completed by another request.');
    }
  }

  /** Puts a sealed draft in place as a part, over an earlier one of that number. */
  async place(draft: string, number: number, facts: RecordFacts): Promise<void> {
    this.refuseWhileJoining();
    renameSync(draft, this.partPath(number));
    this.parts.set(number, facts);
    await syncFolder(this.folder);
  }
}

/** The uploads of a data folder; they outlive a restart. */
export class Uploads {
  readonly #uploads = new Map<string, Upload>();

  private constructor(private readonly folder: string) {}

  static async open(data: string): Promise<Uploads> {
    const uploads = new Uploads(join(data, 'uploads'));
    await mkdir(uploads.folder, { recursive: true });
    for (const id of await readdir(uploads.folder)) await uploads.#load(id);
    return uploads;
  }

  async #load(id: string): Promise<void> {
    const folder = join(this.folder, id);
    const text = await readFile(join(folder, 'upload.json'), 'utf8').catch(() => undefined);
    if (text === undefined) {
      await rm(folder, { recursive: true, force: true });
      return;
    }
    const upload = new Upload(id, folder, uploadFacts.parse(JSON.parse(text)));
    for (const file of await readdir(folder)) {
      const number = Number(/^part-(\d{1,5})$/.exec(file)?.[1] ?? NaN);
      const facts = Number.isNaN(number) ? undefined : await readFacts(join(folder, file));
      if (facts !== undefined) upload.parts.set(number, facts);
    }
    this.#uploads.set(id, upload);
  }

  list(bucket: string): readonly Upload[] {
    return [...this.#uploads.values()].filter(({ facts }) => facts.bucket === bucket);
  }

  async create(facts: UploadFacts): Promise<Upload> {
    const id = randomBytes(24).toString('base64url');
    const upload = new Upload(id, join(this.folder, id), facts);
    await mkdir(upload.folder);
    await writeWhole(join(upload.folder, 'upload.json'), JSON.stringify(facts));
    await syncFolder(this.folder);
    this.#uploads.set(id, upload);
    return upload;
  }

  /** @throws StoreError NoSuchUpload when there is none of that id for that bucket and key */
  get(id: string, bucket: string, key: string): Upload {
    const upload = this.#uploads.get(id);
    if (upload?.facts.bucket !== bucket || upload.facts.key !== key) {
      throw new StoreError('NoSuchUpload', 'The upload was completed, aborted or never begun.');
    }
    return upload;
  }

  /** Forgets an upload and removes its parts. */
  async remove(upload: Upload): Promise<void> {
    this.#uploads.delete(upload.id);
    await rm(upload.folder, { recursive: true, force: true });
  }
}
