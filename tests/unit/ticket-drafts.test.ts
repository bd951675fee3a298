import { beforeEach, describe, expect, test } from 'vitest';
import { draftFor, draftKey, keepDraft, markSent, type Shown } from '@/components/ticket/drafts';

let store: Map<string, string>;
const storage = {
  getItem: (key: string) => store.get(key) ?? null,
  setItem: (key: string, value: string) => void store.set(key, value),
  removeItem: (key: string) => void store.delete(key),
};
/** A page on which these texts stand. */
const page = (written: string[] = [], version: string | null = null): Shown => ({
  version,
  times: (text) => written.filter((one) => one === text).length,
});
const key = draftKey('7:2612-0047', 'message', 'body');

beforeEach(() => {
  store = new Map();
});

describe('a draft', () => {
  test('comes back after the page was loaded again, for its person, ticket, form and field alone', () => {
    keepDraft(storage, key, 'Your meter is');
    expect(draftFor(storage, key, page())).toBe('Your meter is');
    for (const other of [
      draftKey('8:2612-0047', 'message', 'body'),
      draftKey('7:2612-0048', 'message', 'body'),
      draftKey('7:2612-0047', 'note', 'body'),
      draftKey('7:2612-0047', 'message', 'note'),
    ])
      expect(draftFor(storage, other, page())).toBeNull();
  });

  test('emptied by hand is forgotten', () => {
    keepDraft(storage, key, 'Your meter is');
    keepDraft(storage, key, ' \n');
    expect(store.size).toBe(0);
  });

  test('sent and arrived is forgotten', () => {
    markSent(storage, key, ' Ready\r\non Friday ', page(['Hello']));
    expect(draftFor(storage, key, page(['Hello', 'Ready\non Friday']))).toBeNull();
    expect(store.size).toBe(0);
  });

  test('sent into an ended session is still there', () => {
    markSent(storage, key, 'Called, no answer', page(['Called, no answer']));
    expect(draftFor(storage, key, page(['Called, no answer']))).toBe('Called, no answer');
    expect(draftFor(storage, key, page(Array(2).fill('Called, no answer')))).toBeNull();
  });

  test('of a step is forgotten once the ticket moved on', () => {
    markSent(storage, key, 'RT1 and RV1', page([], '4'));
    expect(draftFor(storage, key, page([], '4'))).toBe('RT1 and RV1');
    expect(draftFor(storage, key, page([], '5'))).toBeNull();
  });

  test('in a store that is full, closed or spoilt is none, and nothing breaks', () => {
    const full = {
      ...storage,
      setItem: () => {
        throw new DOMException('full', 'QuotaExceededError');
      },
    };
    expect(() => keepDraft(full, key, 'x')).not.toThrow();
    store.set(key, '{');
    expect(draftFor(storage, key, page())).toBeNull();
  });
});
