/** The last entries of a log, oldest first; older ones fall off. */
export class RecentLog<Entry> {
  #entries: Entry[] = [];

  constructor(private readonly limit = 2000) {}

  add(entry: Entry): void {
    this.#entries.push(entry);
    if (this.#entries.length > this.limit) this.#entries.shift();
  }

  list(): readonly Entry[] {
    return this.#entries;
  }

  clear(): number {
    const count = this.#entries.length;
    this.#entries = [];
    return count;
  }
}
