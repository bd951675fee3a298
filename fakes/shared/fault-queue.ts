/** A fault still to happen `times` times. */
export interface Fault {
  times: number;
}

/** Faults asked for, in order: the oldest that fits happens first. */
export class FaultQueue<F extends Fault> {
  #waiting: F[] = [];

  add(fault: F): void {
    this.#waiting.push({ ...fault });
  }

  clear(): number {
    const count = this.#waiting.length;
    this.#waiting = [];
    return count;
  }

  list(): readonly F[] {
    return this.#waiting;
  }

  /** The first waiting fault that fits, counted as happened once. */
  take(fits: (fault: F) => boolean): F | undefined {
    const fault = this.#waiting.find(fits);
    if (fault === undefined) return undefined;
    fault.times -= 1;
    if (fault.times <= 0) this.#waiting = this.#waiting.filter((other) => other !== fault);
    return fault;
  }
}
