/** The object store did not do what was asked: it may the next time. */
export class StoreTrouble extends Error {
  readonly code = 'store-trouble';
  constructor(cause: unknown) {
    super(`The object store failed: ${cause instanceof Error ? cause.message : String(cause)}`, {
      cause,
    });
    this.name = 'StoreTrouble';
  }
}

/** The answer of the store. @throws StoreTrouble when there is none. */
export const fromStore = <T>(asked: Promise<T>): Promise<T> =>
  asked.catch((error: unknown) => {
    throw new StoreTrouble(error);
  });
