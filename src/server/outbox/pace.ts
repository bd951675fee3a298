/** How long and how often the worker tries. */

/** A job is laid aside after so many tries. */
export const TRIES = 10;
/** A job taken in hand is hidden from other workers so long; a worker that dies gives it back by itself. */
export const LEASE_MS = 60_000;
/** The pause after a failed try: 2 s, 4 s, 8 s … up to an hour. */
export const pauseMs = (attempts: number): number => Math.min(3_600_000, 1000 * 2 ** attempts);
