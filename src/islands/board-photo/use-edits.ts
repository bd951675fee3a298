/** Changes to a photo and its pins, sent one after another; a refusal becomes a sentence and nothing is lost. */
import { useCallback, useRef, useState } from 'react';
import type { EditPhoto, photoRoutes, PhotoView, PinView } from '@/contracts/photos';
import { ask, type Asked, type Refused } from '../shared/ask';
import type { PinChoice } from './PinForm';
import type { Point } from './view';

type Routes = typeof photoRoutes;

/** What the other person left, from the refusal of a stale edit. */
const currentOf = <T>({ problem }: Refused): T | null => (problem?.['current'] as T) ?? null;

const sentenceOf = (refusal: Refused): string =>
  refusal.status === 412
    ? 'Somebody changed it meanwhile; it now shows their change. Make yours again if it is still needed.'
    : refusal.sentence;

const withPin = (photo: PhotoView, pin: PinView): PhotoView => ({
  ...photo,
  pins: photo.pins.some(({ id }) => id === pin.id)
    ? photo.pins.map((other) => (other.id === pin.id ? pin : other))
    : [...photo.pins, pin],
});
const withoutPin = (photo: PhotoView, pin: PinView): PhotoView => ({
  ...photo,
  pins: photo.pins.filter(({ id }) => id !== pin.id),
});

/**
 * @param latest the photo as it is now, however long an answer took.
 * @param onPhoto told the photo after each change. @param onGone told when it is removed.
 */
export function useEdits(
  id: string,
  latest: (id: string) => PhotoView | undefined,
  onPhoto: (photo: PhotoView) => void,
  onGone: (id: string) => void,
) {
  const [busy, setBusy] = useState(0);
  const [error, setError] = useState('');
  const line = useRef<Promise<unknown>>(Promise.resolve());
  const path = `/api/photos/${id}`;
  const clear = useCallback(() => setError(''), []);

  /** After the deed before it, so that each carries the version the last one made. */
  function inLine<T>(
    deed: (photo: PhotoView) => Promise<Asked<T>>,
    then: (photo: PhotoView, value: T) => void,
    onStale: (photo: PhotoView, refusal: Refused) => void,
  ): Promise<boolean> {
    setBusy((n) => n + 1);
    const done = line.current.then(async () => {
      const before = latest(id);
      if (!before) return false;
      const asked = await deed(before);
      const now = latest(id) ?? before;
      if (asked.ok) then(now, asked.value);
      else if (asked.status === 412) onStale(now, asked);
      setError(asked.ok ? '' : sentenceOf(asked));
      return asked.ok;
    });
    line.current = done.catch(() => undefined);
    return done.finally(() => setBusy((n) => n - 1));
  }

  const keepPhoto = (now: PhotoView, refusal: Refused) =>
    onPhoto(currentOf<PhotoView>(refusal) ?? now);
  const keepPin = (now: PhotoView, refusal: Refused) => {
    const current = currentOf<PinView>(refusal);
    if (current) onPhoto(withPin(now, current));
  };
  const versionOf = (photo: PhotoView, pin: PinView) =>
    photo.pins.find((other) => other.id === pin.id)?.version ?? pin.version;
  const setPin = (now: PhotoView, pin: PinView) => onPhoto(withPin(now, pin));

  /**
   * Shows the change before the server has it, and takes it back when the server will not; after a stale edit the
   * photo already is what the other person made of it, and `undo` leaves it so.
   */
  async function shownAtOnce(
    show: (photo: PhotoView) => PhotoView,
    undo: (now: PhotoView, before: PhotoView) => PhotoView,
    keep: () => Promise<boolean>,
  ): Promise<boolean> {
    const before = latest(id);
    if (!before) return false;
    onPhoto(show(before));
    const kept = await keep();
    const now = latest(id);
    if (!kept && now) onPhoto(undo(now, before));
    return kept;
  }

  const changePin = (pin: PinView, body: Point | PinChoice) =>
    inLine(
      (photo) =>
        ask<Routes['editPin']>({
          method: 'PATCH',
          path: `${path}/pins/${pin.id}`,
          body,
          version: versionOf(photo, pin),
        }),
      setPin,
      keepPin,
    );

  return {
    busy: busy > 0,
    error,
    clear,

    edit: (body: EditPhoto) =>
      shownAtOnce(
        (photo) => ({ ...photo, ...body }),
        (now, { version, side, phase, shared, caption }) =>
          now.version === version ? { ...now, side, phase, shared, caption } : now,
        () =>
          inLine(
            ({ version }) => ask<Routes['edit']>({ method: 'PATCH', path, body, version }),
            (_now, photo) => onPhoto(photo),
            keepPhoto,
          ),
      ),

    remove: () =>
      inLine(
        ({ version }) => ask<Routes['remove']>({ method: 'DELETE', path, version }),
        () => onGone(id),
        keepPhoto,
      ),

    /** @param key the same for every try at this pin */
    addPin: (at: Point, choice: PinChoice, key: string) => {
      const body = { ...at, ...choice };
      return inLine(
        () => ask<Routes['addPin']>({ method: 'POST', path: `${path}/pins`, body, key }),
        setPin,
        keepPin,
      );
    },

    movePin: (pin: PinView, { x, y }: Point) =>
      shownAtOnce(
        (photo) => withPin(photo, { ...pin, x, y }),
        (now) => (versionOf(now, pin) === pin.version ? withPin(now, pin) : now),
        () => changePin(pin, { x, y }),
      ),

    namePin: changePin,

    removePin: (pin: PinView) =>
      inLine(
        (photo) =>
          ask<Routes['removePin']>({
            method: 'DELETE',
            path: `${path}/pins/${pin.id}`,
            version: versionOf(photo, pin),
          }),
        (now) => onPhoto(withoutPin(now, pin)),
        keepPin,
      ),
  };
}
