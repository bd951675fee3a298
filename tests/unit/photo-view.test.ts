import { expect, test } from 'vitest';
import fc from 'fast-check';
import { fit, hold, isWhole, pan, toPhoto, toStage, zoom } from '@/islands/board-photo/view';

const photo = { width: 4000, height: 3000 };
const stage = { width: 800, height: 500 };

test('the whole photo is centred and as large as it fits', () => {
  // 500 / 3000 is smaller than 800 / 4000; the width left over is (800 − 4000 / 6) / 2.
  expect(fit(photo, stage)).toEqual({ scale: 1 / 6, x: (800 - 4000 / 6) / 2, y: 0 });
});

const size = fc.record({
  width: fc.integer({ min: 1, max: 5000 }),
  height: fc.integer({ min: 1, max: 5000 }),
});
const share = fc.double({ min: 0, max: 1, noNaN: true });
const place = fc.record({ x: share, y: share });
const step = fc.record({
  factor: fc.double({ min: 0.2, max: 5, noNaN: true }),
  about: place,
  by: fc.record({
    x: fc.integer({ min: -3000, max: 3000 }),
    y: fc.integer({ min: -900, max: 900 }),
  }),
});

test('however it is zoomed and moved, the photo never leaves a gap it could fill', () => {
  fc.assert(
    fc.property(size, size, fc.array(step, { maxLength: 8 }), (picture, frame, steps) => {
      let view = fit(picture, frame);
      for (const { factor, about, by } of steps) {
        const point = { x: about.x * frame.width, y: about.y * frame.height };
        view = pan(zoom(view, factor, point, picture, frame), by, picture, frame);
        const wide = picture.width * view.scale;
        const high = picture.height * view.scale;
        const slack = 1e-6 * (wide + high + frame.width + frame.height);
        if (wide > frame.width) {
          expect(view.x).toBeLessThanOrEqual(slack);
          expect(view.x + wide).toBeGreaterThanOrEqual(frame.width - slack);
        } else expect(view.x).toBeCloseTo((frame.width - wide) / 2, 3);
        if (high > frame.height) {
          expect(view.y).toBeLessThanOrEqual(slack);
          expect(view.y + high).toBeGreaterThanOrEqual(frame.height - slack);
        } else expect(view.y).toBeCloseTo((frame.height - high) / 2, 3);
      }
    }),
  );
});

test('a place goes to the stage and comes back', () => {
  fc.assert(
    fc.property(size, size, place, step, (picture, frame, at, { factor, about }) => {
      const point = { x: about.x * frame.width, y: about.y * frame.height };
      const view = zoom(fit(picture, frame), factor, point, picture, frame);
      const back = toPhoto(toStage(at, view, picture), view, picture);
      expect(back.x).toBeCloseTo(at.x, 6);
      expect(back.y).toBeCloseTo(at.y, 6);
    }),
  );
});

test('zooming keeps the point under the pointer where the edges allow it', () => {
  const close = zoom(fit(photo, stage), 4, { x: 400, y: 250 }, photo, stage);
  const point = { x: 410, y: 260 };
  const under = toPhoto(point, close, photo);
  const closer = zoom(close, 1.5, point, photo, stage);
  const after = toStage(under, closer, photo);
  expect(after.x).toBeCloseTo(point.x, 6);
  expect(after.y).toBeCloseTo(point.y, 6);
});

test('zoom ends at the whole photo and at four stage pixels to one of the photo', () => {
  const middle = { x: 400, y: 250 };
  const far = zoom(fit(photo, stage), 0.01, middle, photo, stage);
  expect(isWhole(far, photo, stage)).toBe(true);
  expect(zoom(far, 1e6, middle, photo, stage).scale).toBe(4);
});

test('a stage of another size holds the photo again', () => {
  const view = zoom(fit(photo, stage), 3, { x: 0, y: 0 }, photo, stage);
  const turned = { width: 360, height: 640 };
  const held = hold(view, photo, turned);
  expect(held.y).toBeLessThanOrEqual(0);
  expect(held.y + photo.height * held.scale).toBeGreaterThanOrEqual(turned.height - 1e-6);
});
