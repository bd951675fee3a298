/** Wheel, drag and pinch over the stage. Arrow keys and buttons are the viewer's own. */
import { useEffect, useRef, type PointerEvent, type RefObject } from 'react';
import type { Point } from './view';

/** A page that was scrolled so lately goes on scrolling: a photo under the pointer must not catch the wheel. */
const SCROLLING_MS = 400;
/** Pixels a pointer may stray and still have tapped. */
const STRAY = 5;

export type Gestures = {
  onZoom: (factor: number, about: Point) => void;
  onPan: (by: Point) => void;
  /** The pointer moves without anything pressed. */
  onHover: (at: Point) => void;
  onTap: (at: Point) => void;
  /** A pin is dragged about, and let go; `data-pin` holds its key. */
  onDrag: (pin: number, at: Point) => void;
  onDrop: (pin: number, at: Point) => void;
  /** Zooming by this factor would do nothing: the wheel is the page's. */
  idle: (factor: number) => boolean;
};

export function useGestures(stage: RefObject<HTMLElement | null>, gestures: Gestures) {
  const latest = useRef(gestures);
  latest.current = gestures;
  const held = useRef(new Map<number, Point>());
  const strayed = useRef(false);
  const grabbed = useRef<number | null>(null);

  const place = (event: { clientX: number; clientY: number }): Point => {
    const box = stage.current?.getBoundingClientRect();
    return { x: event.clientX - (box?.left ?? 0), y: event.clientY - (box?.top ?? 0) };
  };

  useEffect(() => {
    const element = stage.current;
    if (!element) return;
    let scrolled = -Infinity;
    const note = () => (scrolled = performance.now());
    const wheel = (event: WheelEvent) => {
      const pinched = event.ctrlKey;
      if (!pinched && performance.now() - scrolled < SCROLLING_MS) return;
      const lines = event.deltaMode === WheelEvent.DOM_DELTA_LINE ? 30 : 1;
      const factor = Math.exp((-event.deltaY * lines) / (pinched ? 120 : 400));
      if (latest.current.idle(factor)) return;
      event.preventDefault();
      latest.current.onZoom(factor, place(event));
    };
    element.addEventListener('wheel', wheel, { passive: false });
    window.addEventListener('scroll', note, { passive: true });
    return () => {
      element.removeEventListener('wheel', wheel);
      window.removeEventListener('scroll', note);
    };
  }, [stage]);

  return {
    onPointerDown(event: PointerEvent<HTMLElement>) {
      if (event.button !== 0) return;
      if (held.current.size === 0) strayed.current = false;
      else strayed.current = true;
      const pin = (event.target as Element).closest('[data-pin]')?.getAttribute('data-pin');
      grabbed.current = pin == null || held.current.size > 0 ? null : Number(pin);
      held.current.set(event.pointerId, place(event));
    },
    onPointerMove(event: PointerEvent<HTMLElement>) {
      const before = held.current.get(event.pointerId);
      const now = place(event);
      if (!before) {
        if (event.pointerType === 'mouse') latest.current.onHover(now);
        return;
      }
      const by = { x: now.x - before.x, y: now.y - before.y };
      if (!strayed.current && Math.hypot(by.x, by.y) < STRAY) return;
      if (!strayed.current) {
        strayed.current = true;
        event.currentTarget.setPointerCapture(event.pointerId);
      }
      if (grabbed.current !== null) return latest.current.onDrag(grabbed.current, now);
      const other = [...held.current].find(([id]) => id !== event.pointerId)?.[1];
      held.current.set(event.pointerId, now);
      if (!other) return latest.current.onPan(by);
      const middle = { x: (now.x + other.x) / 2, y: (now.y + other.y) / 2 };
      const apart = Math.hypot(before.x - other.x, before.y - other.y);
      const factor = Math.hypot(now.x - other.x, now.y - other.y) / Math.max(1, apart);
      latest.current.onZoom(factor, middle);
      latest.current.onPan({ x: by.x / 2, y: by.y / 2 });
    },
    onPointerUp(event: PointerEvent<HTMLElement>) {
      if (!held.current.delete(event.pointerId)) return;
      const pin = grabbed.current;
      grabbed.current = null;
      if (!strayed.current) {
        if (pin === null) latest.current.onTap(place(event));
      } else if (pin !== null) latest.current.onDrop(pin, place(event));
    },
    onPointerCancel(event: PointerEvent<HTMLElement>) {
      held.current.delete(event.pointerId);
    },
  };
}
