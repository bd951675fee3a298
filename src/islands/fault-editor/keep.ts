/** What was typed and not saved is kept in this browser, so that a closed lid or a lost line costs nothing. */
import type { Draft } from './types';

export type Kept = {
  draft: Draft;
  /** The version it was made from; 0 for a new note. */
  version: number;
  /** When, in milliseconds. */
  at: number;
};

const FOR_DAYS = 30;

export const keyOf = (person: number, noteId: number | null, ticket: string | null): string =>
  `meterwright.fault.${person}.${noteId ?? `new.${ticket ?? 'plain'}`}`;

/** The kept draft, or null: none, unreadable, or too old to be of use. */
export function readKept(key: string, now: number): Kept | null {
  try {
    const text = localStorage.getItem(key);
    if (text === null) return null;
    const kept = JSON.parse(text) as Kept;
    const usable = typeof kept.draft.title === 'string' && Array.isArray(kept.draft.body.symptom);
    return usable && now - kept.at < FOR_DAYS * 86_400_000 ? kept : null;
  } catch {
    return null;
  }
}

/** False when the browser does not keep it (full, or private): the page then says so. */
export function keep(key: string, kept: Kept): boolean {
  try {
    localStorage.setItem(key, JSON.stringify(kept));
    return true;
  } catch {
    return false;
  }
}

export function forget(key: string): void {
  try {
    localStorage.removeItem(key);
  } catch {
    // A browser that keeps nothing has nothing to forget.
  }
}
