/** Where a photo stands in its stage: zoom and place, in CSS pixels of the stage. */

export type Size = { width: number; height: number };
export type Point = { x: number; y: number };
/** The photo's top left corner in the stage, and stage pixels per photo pixel. */
export type View = Point & { scale: number };

/** Stage pixels per photo pixel at the closest. */
const CLOSEST = 4;

/** The whole photo, centred, as large as it fits. */
export function fit(photo: Size, stage: Size): View {
  const scale = Math.min(stage.width / photo.width, stage.height / photo.height);
  return {
    scale,
    x: (stage.width - photo.width * scale) / 2,
    y: (stage.height - photo.height * scale) / 2,
  };
}

const between = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value));

/** The nearest view that neither is smaller than the whole photo nor leaves its edge inside the stage. */
export function hold(view: View, photo: Size, stage: Size): View {
  const whole = fit(photo, stage);
  const scale = between(view.scale, whole.scale, Math.max(CLOSEST, whole.scale));
  const along = (at: number, length: number, room: number) =>
    length <= room ? (room - length) / 2 : between(at, room - length, 0);
  return {
    scale,
    x: along(view.x, photo.width * scale, stage.width),
    y: along(view.y, photo.height * scale, stage.height),
  };
}

/** Zooms by a factor about a point of the stage, which stays where it is. */
export function zoom(view: View, factor: number, about: Point, photo: Size, stage: Size): View {
  const whole = fit(photo, stage).scale;
  const scale = between(view.scale * factor, whole, Math.max(CLOSEST, whole));
  const ratio = scale / view.scale;
  const moved = {
    scale,
    x: about.x - (about.x - view.x) * ratio,
    y: about.y - (about.y - view.y) * ratio,
  };
  return hold(moved, photo, stage);
}

/** Moves the photo by stage pixels. */
export const pan = (view: View, by: Point, photo: Size, stage: Size): View =>
  hold({ ...view, x: view.x + by.x, y: view.y + by.y }, photo, stage);

/** A place given in shares of the photo, in the stage. */
export const toStage = (place: Point, view: View, photo: Size): Point => ({
  x: view.x + place.x * photo.width * view.scale,
  y: view.y + place.y * photo.height * view.scale,
});

/** A point of the stage in shares of the photo; a point outside goes to the nearest edge. */
export const toPhoto = (point: Point, view: View, photo: Size): Point => ({
  x: between((point.x - view.x) / (photo.width * view.scale), 0, 1),
  y: between((point.y - view.y) / (photo.height * view.scale), 0, 1),
});

/** True when the whole photo is in sight. */
export const isWhole = (view: View, photo: Size, stage: Size): boolean =>
  view.scale <= fit(photo, stage).scale * 1.001;

/** The view moved so that a place of the photo is in the middle, as far as the edges allow. */
export function centreOn(place: Point, view: View, photo: Size, stage: Size): View {
  const at = toStage(place, view, photo);
  return pan(view, { x: stage.width / 2 - at.x, y: stage.height / 2 - at.y }, photo, stage);
}
