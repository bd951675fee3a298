/**
 * A part pointed at in one island lights up in the others: a row of the bench sheet, a suspect, a pin on a photo.
 * They speak through one event of the window, `mw:point` with `{ ref }`, because islands share no state.
 */
import { useEffect, useState } from 'react';

const EVENT = 'mw:point';

/** Says which part the pointer or the keyboard is on; null when it is on none. */
export function pointAt(ref: string | null): void {
  window.dispatchEvent(new CustomEvent(EVENT, { detail: { ref } }));
}

/** Handlers for whatever stands for a part; null where it stands for none. */
export const pointing = (ref: string | null) => ({
  onPointerEnter: () => pointAt(ref),
  onPointerLeave: () => pointAt(null),
  onFocus: () => pointAt(ref),
  onBlur: () => pointAt(null),
});

/** Tells `heed` of every part pointed at on the page, null for none; answers how to stop it. */
export function heedPointed(heed: (ref: string | null) => void): () => void {
  const hear = (event: Event) => {
    const { ref } = (event as CustomEvent<{ ref?: unknown }>).detail;
    heed(typeof ref === 'string' ? ref : null);
  };
  window.addEventListener(EVENT, hear);
  return () => window.removeEventListener(EVENT, hear);
}

/** The reference pointed at anywhere on the page, or null. */
export function usePointed(): string | null {
  const [pointed, setPointed] = useState<string | null>(null);
  useEffect(() => heedPointed(setPointed), []);
  return pointed;
}
