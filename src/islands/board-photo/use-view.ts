/** The view of one photo and how it is changed; a new photo or a stage of another size starts whole or is held. */
import { useState } from 'react';
import { centreOn, fit, hold, isWhole, pan, zoom, type Point, type Size, type View } from './view';

/** Before the stage is measured: the shape its styles give it. */
const FIRST: Size = { width: 800, height: 520 };

export function useView(photo: { id: string } & Size) {
  const [stage, setStage] = useState(FIRST);
  const [kept, setKept] = useState<{ id: string; view: View } | null>(null);
  const current = kept?.id === photo.id ? kept.view : fit(photo, stage);
  const set = (change: (view: View) => View) =>
    setKept((before) => ({
      id: photo.id,
      view: change(before?.id === photo.id ? before.view : fit(photo, stage)),
    }));
  const middle = { x: stage.width / 2, y: stage.height / 2 };
  return {
    stage,
    view: current,
    whole: isWhole(current, photo, stage),
    percent: Math.round(current.scale * 100),
    resize(size: Size): void {
      setStage(size);
      setKept((before) => {
        if (before?.id !== photo.id || isWhole(before.view, photo, stage)) return null;
        return { id: photo.id, view: hold(before.view, photo, size) };
      });
    },
    zoom: (factor: number, about: Point = middle) =>
      set((view) => zoom(view, factor, about, photo, stage)),
    pan: (by: Point) => set((view) => pan(view, by, photo, stage)),
    showAll: () => setKept(null),
    centreOn: (place: Point) => set((view) => centreOn(place, view, photo, stage)),
  };
}
