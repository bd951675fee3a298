/** Rows, parts and photo pins light each other up: whoever points at a part says so on the window. */
import { useEffect, useState } from 'react';
import type { Points } from '@/domain/bench/types';
import type { BoardPart } from './panel-props';

const NAME = 'mw:point';
type Pointed = CustomEvent<{ ref: string | null }>;

/** Says which part is pointed at; null for none. */
export const pointAt = (ref: string | null) =>
  window.dispatchEvent(new CustomEvent(NAME, { detail: { ref } }));

/** The part somebody points at, here or on another panel. */
export function usePointed(): string | null {
  const [ref, setRef] = useState<string | null>(null);
  useEffect(() => {
    const listen = (event: Event) => setRef((event as Pointed).detail.ref);
    window.addEventListener(NAME, listen);
    return () => window.removeEventListener(NAME, listen);
  }, []);
  return ref;
}

/** Attributes of an element that stands for a part. */
export const pointing = (ref: string | null) => ({
  onPointerEnter: () => pointAt(ref),
  onPointerLeave: () => pointAt(null),
  onFocus: () => pointAt(ref),
  onBlur: () => pointAt(null),
});

/** The one part that a row is about: the part measured straight, or the only one across its two nets. */
export function partOf(points: Points, parts: readonly BoardPart[]): string | null {
  if (points.part !== null) return points.part;
  const { from, to } = points;
  if (from === null || to === null) return null;
  const across = parts.filter(({ nets }) => nets?.includes(from) && nets.includes(to));
  return across.length === 1 ? (across[0]?.ref ?? null) : null;
}
