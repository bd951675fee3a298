import { randomBytes } from 'node:crypto';
import { mkdir, readFile, readdir, rm } from 'node:fs/promises';
import { join } from 'node:path';
import * as z from 'zod/v4';
import { sweep, writeWhole } from '../shared/disk';
import { readMail } from './parse';

const summary = z.strictObject({
  id: z.string(),
  /** ISO 8601. */
  receivedAt: z.string(),
  /** Envelope: what the mail server was told, not what the message says. */
  mailFrom: z.string(),
  recipients: z.array(z.string()),
  from: z.string(),
  to: z.string(),
  subject: z.string(),
  /** Bytes of the source. */
  size: z.number(),
  attachments: z.number(),
});
export type MessageSummary = z.infer<typeof summary>;

const idPattern = /^\d{13}-[0-9a-f]{12}$/;

/** Messages on the disk: `<id>.eml` the source, then `<id>.json` what the lists show. */
export class MessageStore {
  #messages = new Map<string, MessageSummary>();
  #lastTime = 0;

  private constructor(
    private readonly folder: string,
    private readonly limit: number,
  ) {}

  /** Opens the folder; a source without its summary was left by a crash and is removed. */
  static async open(data: string, limit: number): Promise<MessageStore> {
    const store = new MessageStore(join(data, 'messages'), limit);
    await mkdir(store.folder, { recursive: true });
    const files = new Set(await readdir(store.folder));
    await sweep(
      store.folder,
      (name) => name.endsWith('.part') || !files.has(name.replace(/\.eml$/, '.json')),
    );
    for (const file of [...files].filter((name) => name.endsWith('.json')).sort()) {
      const parsed = summary.parse(JSON.parse(await readFile(join(store.folder, file), 'utf8')));
      store.#messages.set(parsed.id, parsed);
      store.#lastTime = Number(parsed.id.slice(0, 13));
    }
    return store;
  }

  /** Keeps a message on the disk; beyond the limit the oldest goes. `now` in ms since 1970. */
  async add(
    source: Buffer,
    mailFrom: string,
    recipients: readonly string[],
    now: number,
  ): Promise<MessageSummary> {
    this.#lastTime = Math.max(now, this.#lastTime + 1);
    const id = `${String(this.#lastTime).padStart(13, '0')}-${randomBytes(6).toString('hex')}`;
    const { from, to, subject, attachments } = await readMail(source);
    const message: MessageSummary = {
      id,
      receivedAt: new Date(now).toISOString(),
      mailFrom,
      recipients: [...recipients],
      from,
      to,
      subject,
      size: source.length,
      attachments: attachments.length,
    };
    await writeWhole(join(this.folder, `${id}.eml`), source);
    await writeWhole(join(this.folder, `${id}.json`), JSON.stringify(message));
    this.#messages.set(id, message);
    const surplus = [...this.#messages.keys()].sort().slice(0, -this.limit);
    for (const old of surplus) await this.#remove(old);
    return message;
  }

  /** Newest first; `to` keeps those with that envelope recipient, compared without case. */
  list(to?: string): MessageSummary[] {
    const wanted = to?.trim().toLowerCase();
    return [...this.#messages.values()]
      .filter(
        ({ recipients }) =>
          wanted === undefined || recipients.some((each) => each.toLowerCase() === wanted),
      )
      .sort((a, b) => (a.id < b.id ? 1 : -1));
  }

  find(id: string): MessageSummary | undefined {
    return idPattern.test(id) ? this.#messages.get(id) : undefined;
  }

  source(message: MessageSummary): Promise<Buffer> {
    return readFile(join(this.folder, `${message.id}.eml`));
  }

  async clear(): Promise<number> {
    const ids = [...this.#messages.keys()];
    for (const id of ids) await this.#remove(id);
    return ids.length;
  }

  async #remove(id: string): Promise<void> {
    this.#messages.delete(id);
    await rm(join(this.folder, `${id}.json`), { force: true });
    await rm(join(this.folder, `${id}.eml`), { force: true });
  }
}
