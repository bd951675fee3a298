import { StoreError } from './errors';

/** Reads lines and counted bytes from a stream of buffers. */
export class ByteReader {
  readonly #source: AsyncIterator<Buffer>;
  #rest: Buffer = Buffer.alloc(0);

  constructor(source: AsyncIterable<Buffer>) {
    this.#source = source[Symbol.asyncIterator]();
  }

  async #more(): Promise<Buffer> {
    const next = await this.#source.next();
    if (next.done === true) throw new StoreError('IncompleteBody', 'The body ended too early.');
    return next.value;
  }

  /**
   * The next line without its CR LF, as Latin-1.
   *
   * @throws StoreError InvalidRequest above `limit` bytes, IncompleteBody at the end of the stream.
   */
  async line(limit: number): Promise<string> {
    for (;;) {
      const end = this.#rest.indexOf('\r\n');
      if (end > limit || (end < 0 && this.#rest.length > limit)) {
        throw new StoreError('InvalidRequest', `A line of the body is over ${limit} bytes.`);
      }
      if (end >= 0) {
        const line = this.#rest.toString('latin1', 0, end);
        this.#rest = this.#rest.subarray(end + 2);
        return line;
      }
      this.#rest = Buffer.concat([this.#rest, await this.#more()]);
    }
  }

  /** The next `count` bytes in pieces as they come. */
  async *bytes(count: number): AsyncGenerator<Buffer> {
    let left = count;
    while (left > 0) {
      if (this.#rest.length === 0) this.#rest = await this.#more();
      const piece = this.#rest.subarray(0, left);
      this.#rest = this.#rest.subarray(piece.length);
      left -= piece.length;
      if (piece.length > 0) yield piece;
    }
  }
}
