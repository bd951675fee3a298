import { expect, test } from 'vitest';
import {
  everyRow,
  pageOf,
  readCursor,
  writeCursor,
  type Held,
  type Place,
} from '@/server/http/cursor';

test.each<[string, Held, Place]>([
  ['name', 'string', { value: 'Ørsted, "Ω"', id: 7 }],
  ['-ohms', 'number', { value: 0.33, id: 1 }],
  ['since', 'date', { value: new Date('2026-12-01T10:00:00.123Z'), id: 42 }],
])('a place in the order %s survives as a cursor', (sort, held, place) => {
  expect(readCursor(sort, writeCursor(sort, place), held)).toEqual({ ok: true, value: place });
});

test('no cursor is no place', () => {
  expect(readCursor('name', undefined, 'string')).toEqual({ ok: true, value: undefined });
});

const text = (value: unknown) => Buffer.from(JSON.stringify(value)).toString('base64url');
test.each([
  ['of another order', writeCursor('-name', { value: 'a', id: 1 })],
  ['no JSON', 'abc'],
  ['nothing', ''],
  ['an object', text({ sort: 'name' })],
  ['too short', text(['name', 'a'])],
  ['with a key that is no number', text(['name', 'a', '1'])],
  ['with a key too large', text(['name', 'a', 1e300])],
  ['with a list as value', text(['name', ['a'], 1])],
  ['with no value', text(['name', null, 1])],
  ['with a number as text', text(['name', 7, 1])],
  ['with a moment as text', text(['name', { at: 0 }, 1])],
])('a cursor %s is refused by its name', (_, cursor) => {
  const read = readCursor('name', cursor, 'string');
  expect(read).toMatchObject({ ok: false, kind: 'invalid', errors: [{ path: 'cursor' }] });
});

test.each([
  ['with text as a moment', text(['since', 'x', 1])],
  ['with a number as a moment', text(['since', 0, 1])],
  ['with a moment out of range', text(['since', { at: 1e99 }, 1])],
])('a cursor of dates %s is refused', (_, cursor) => {
  expect(readCursor('since', cursor, 'date')).toMatchObject({ ok: false, kind: 'invalid' });
});

const rows = [1, 2, 3].map((id) => ({ id }));
const placeOf = ({ id }: { id: number }) => ({ value: id, id });

test('a page holds no more than was asked for, and names the next by its last row', () => {
  const page = pageOf(rows, 2, 'id', placeOf);
  expect(page.items.map(({ id }) => id)).toEqual([1, 2]);
  expect(readCursor('id', page.next ?? undefined, 'number')).toMatchObject({ value: { id: 2 } });
});

test('the last page names none', () => {
  expect(pageOf(rows, 3, 'id', placeOf).next).toBeNull();
  expect(pageOf([], 3, 'id', placeOf).next).toBeNull();
});

test('an export walks every batch once', async () => {
  const all = Array.from({ length: 1100 }, (_, id) => ({ id }));
  const asked: (number | undefined)[] = [];
  const read = async (limit: number, after?: Place) => {
    asked.push(after?.id);
    return all.filter(({ id }) => id > (after?.id ?? -1)).slice(0, limit);
  };
  const walked: number[] = [];
  for await (const { id } of everyRow(read, placeOf)) walked.push(id);
  expect(walked).toEqual(all.map(({ id }) => id));
  expect(asked).toEqual([undefined, 499, 999]);
});
