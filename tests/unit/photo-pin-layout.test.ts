import { expect, test } from 'vitest';
import fc from 'fast-check';
import { layPlates, type PlateInput } from '@/islands/board-photo/pin-layout';

const stage = { width: 320, height: 220 };
const pin = (id: number, x: number, y: number, more: Partial<PlateInput> = {}): PlateInput => ({
  id,
  at: { x, y },
  label: 'RV1',
  drawn: true,
  lit: false,
  ...more,
});

const boxes = (pins: readonly PlateInput[]) =>
  [...layPlates(pins, stage)].map(([id, plate]) => {
    const at = pins.find((other) => other.id === id)?.at ?? { x: 0, y: 0 };
    const left = at.x + plate.x;
    const top = at.y + plate.y;
    return { id, left, top, right: left + plate.width, bottom: top + plate.height };
  });

const crowd = fc.uniqueArray(
  fc.record({
    id: fc.integer({ min: 1, max: 99 }),
    at: fc.record({ x: fc.integer({ min: 0, max: 320 }), y: fc.integer({ min: 0, max: 220 }) }),
    label: fc.constantFrom('R1', 'RV1', 'U1.14', 'behind the jack'),
    drawn: fc.boolean(),
    lit: fc.constant(false),
  }),
  { selector: ({ id }) => id, maxLength: 40 },
);

test('no plate covers another plate or another pin, and none leaves the stage', () => {
  fc.assert(
    fc.property(crowd, (pins) => {
      const laid = boxes(pins);
      for (const a of laid) {
        expect(a.left >= 0 && a.top >= 0 && a.right <= 320 && a.bottom <= 220).toBe(true);
        for (const b of laid)
          if (a.id !== b.id)
            expect(
              a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom,
            ).toBe(false);
        for (const { id, at } of pins)
          if (id !== a.id)
            expect(at.x > a.left && at.x < a.right && at.y > a.top && at.y < a.bottom).toBe(false);
      }
    }),
  );
});

test('with room around it a plate stands right above its pin, with its symbol', () => {
  expect(layPlates([pin(1, 100, 100)], stage).get(1)).toMatchObject({ x: 16, y: -42, drawn: true });
});

test('near the right and the upper edge a plate turns inwards', () => {
  const plate = layPlates([pin(1, 318, 2)], stage).get(1);
  expect(plate?.x).toBeLessThan(0);
  expect(plate?.y).toBeGreaterThan(0);
});

test('a lit pin gets its plate before the others, and even where there is no room', () => {
  const tight = [pin(1, 100, 100), pin(2, 104, 100), pin(3, 108, 100, { lit: true })];
  expect(layPlates(tight, stage).get(3)).toMatchObject({ x: 16, y: -42 });
  const tiny = { width: 10, height: 10 };
  expect(layPlates([pin(1, 5, 5)], tiny).has(1)).toBe(false);
  expect(layPlates([pin(1, 5, 5, { lit: true })], tiny).has(1)).toBe(true);
});
