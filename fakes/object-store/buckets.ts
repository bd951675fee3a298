import { createHash } from 'node:crypto';
import { openSync, renameSync, rmSync } from 'node:fs';
import { mkdir, readdir, rmdir, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { syncFolder } from '../shared/disk';
import { StoreError } from './errors';
import { readFacts, type RecordFacts } from './record';

/** One bucket: its objects by key, each a file named by the hash of its key. */
export class Bucket {
  readonly #objects = new Map<string, RecordFacts>();
  #sorted: string[] | undefined;

  private constructor(
    readonly name: string,
    readonly folder: string,
    readonly created: number,
  ) {}

  static async open(name: string, folder: string): Promise<Bucket> {
    const bucket = new Bucket(name, folder, (await stat(folder)).birthtimeMs);
    for (const file of await readdir(folder)) {
      const facts = await readFacts(join(folder, file));
      if (facts !== undefined) bucket.#objects.set(facts.key, facts);
      else console.error(`object store: ${name}/${file} is no whole object and is left out`);
    }
    return bucket;
  }

  /** Keys may hold anything; a hash can neither leave the folder nor be too long a name. */
  #path(key: string): string {
    return join(this.folder, createHash('sha256').update(key).digest('hex'));
  }

  find(key: string): RecordFacts | undefined {
    return this.#objects.get(key);
  }

  list(): Iterable<RecordFacts> {
    return this.#objects.values();
  }

  get size(): number {
    return this.#objects.size;
  }

  /** All keys in the order of their UTF-8 bytes. */
  sortedKeys(): readonly string[] {
    this.#sorted ??= [...this.#objects.keys()]
      .map((key) => [key, Buffer.from(key)] as const)
      .sort(([, a], [, b]) => Buffer.compare(a, b))
      .map(([key]) => key);
    return this.#sorted;
  }

  /** An open descriptor on the content of an object that `find` has just returned. */
  openContent(facts: RecordFacts): number {
    return openSync(this.#path(facts.key), 'r');
  }

  /**
   * Puts a sealed draft in place. `guard` sees what is there now and throws to refuse; nothing can
   * come between it and the rename, so of several conditional writes one wins.
   */
  async place(
    draft: string,
    facts: RecordFacts,
    guard: (existing: RecordFacts | undefined) => void,
  ): Promise<void> {
    guard(this.#objects.get(facts.key));
    renameSync(draft, this.#path(facts.key));
    if (!this.#objects.has(facts.key)) this.#sorted = undefined;
    this.#objects.set(facts.key, facts);
    await syncFolder(this.folder);
  }

  /** Removes objects; keys that are not there are no error. */
  async remove(keys: readonly string[]): Promise<void> {
    for (const key of keys) {
      if (!this.#objects.delete(key)) continue;
      this.#sorted = undefined;
      rmSync(this.#path(key), { force: true });
    }
    await syncFolder(this.folder);
  }
}

const bucketName = /^(?=.{3,63}$)[a-z0-9]+([.-]?[a-z0-9]+)*$/;

/** The buckets of a data folder. */
export class Buckets {
  readonly #buckets = new Map<string, Bucket>();

  private constructor(private readonly folder: string) {}

  static async open(data: string): Promise<Buckets> {
    const buckets = new Buckets(join(data, 'buckets'));
    await mkdir(buckets.folder, { recursive: true });
    for (const name of await readdir(buckets.folder)) {
      buckets.#buckets.set(name, await Bucket.open(name, join(buckets.folder, name)));
    }
    return buckets;
  }

  list(): readonly Bucket[] {
    return [...this.#buckets.values()];
  }

  /** @throws StoreError NoSuchBucket */
  get(name: string): Bucket {
    const bucket = this.#buckets.get(name);
    if (bucket === undefined) throw new StoreError('NoSuchBucket', 'The bucket does not exist.');
    return bucket;
  }

  /** @throws StoreError InvalidBucketName, BucketAlreadyOwnedByYou */
  async create(name: string): Promise<void> {
    if (!bucketName.test(name)) {
      throw new StoreError(
        'InvalidBucketName',
        'A bucket name has 3 to 63 of a-z, 0-9, dot and hyphen, and starts and ends with a letter or digit.',
      );
    }
    if (this.#buckets.has(name)) {
      throw new StoreError('BucketAlreadyOwnedByYou', 'The bucket is there already.');
    }
    const folder = join(this.folder, name);
    await mkdir(folder, { recursive: true });
    await syncFolder(this.folder);
    if (!this.#buckets.has(name)) this.#buckets.set(name, await Bucket.open(name, folder));
  }

  /** @throws StoreError NoSuchBucket, BucketNotEmpty */
  async remove(name: string): Promise<void> {
    const bucket = this.get(name);
    if (bucket.size > 0) throw new StoreError('BucketNotEmpty', 'The bucket still holds objects.');
    this.#buckets.delete(name);
    await rmdir(bucket.folder);
  }
}
