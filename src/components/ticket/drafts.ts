/**
 * Words typed on a ticket page outlive its reloads: posting one form of it, or signing in again, must not cost what
 * stands in another. Kept by the tab alone (sessionStorage), for one person and one ticket, until they were sent.
 */
type Store = Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>;

/** What the page shows of the ticket when it is opened. */
export type Shown = {
  /** The ticket's version, where a form of the page carries it. */
  version: string | null;
  /** How often this text stands on the page among what was written. */
  times: (text: string) => number;
};
type Kept = { text: string; sent?: { times: number; version: string | null } };

/** A field by its page's place (person and ticket), its form's deed and its name. */
export const draftKey = (place: string, deed: string, field: string): string =>
  `draft:${place}:${deed}:${field}`;

const plain = (text: string) => text.replace(/\r\n?/g, '\n').trim();

function read(store: Store, key: string): Kept | null {
  try {
    return JSON.parse(store.getItem(key) ?? 'null') as Kept | null;
  } catch {
    return null;
  }
}

function write(store: Store, key: string, kept: Kept): void {
  try {
    store.setItem(key, JSON.stringify(kept));
  } catch {
    // A full or forbidden store keeps nothing; the page works without.
  }
}

/** Keeps what was typed; nothing typed is nothing kept. */
export function keepDraft(store: Store, key: string, text: string): void {
  if (text.trim() === '') store.removeItem(key);
  else write(store, key, { text });
}

/** The form of this field is being sent: whether it arrives shows when the page is next opened. */
export function markSent(store: Store, key: string, text: string, shown: Shown): void {
  if (text.trim() === '') return;
  const sent = { times: shown.times(plain(text)), version: shown.version };
  write(store, key, { text, sent });
}

/**
 * What to put back into the field; null for nothing. Words that were sent are forgotten once they stand on the page
 * (or the ticket has moved on with them), and come back when they did not arrive, as after an ended session.
 */
export function draftFor(store: Store, key: string, shown: Shown): string | null {
  const kept = read(store, key);
  if (!kept) return null;
  const { text, sent } = kept;
  const arrived =
    sent &&
    (shown.times(plain(text)) > sent.times ||
      (sent.version !== null && sent.version !== shown.version));
  if (!arrived) return text;
  store.removeItem(key);
  return null;
}
