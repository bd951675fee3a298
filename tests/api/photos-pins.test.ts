import { afterAll, beforeAll, expect, test } from 'vitest';
import type { PinView } from '@/contracts/photos';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, taken, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg } from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
let pins: string;
beforeAll(async () => {
  app = await startApp();
  shop = await openPhotoShop(app);
  pins = `/api/photos/${(await taken(shop, shop.anna.ticket.number, await cameraJpeg())).id}/pins`;
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const add = (json: object) => shop.call('technician', 'POST', pins, { json });
const listed = async () =>
  ((await (await shop.call('counter', 'GET', pins)).json()) as { items: PinView[] }).items;

test('a pin for a part carries its reference; a label stands for itself', async () => {
  const [rt1] = shop.boards.first.parts;
  const made = await add({ x: 0.25, y: 1, partId: rt1, label: 'ignored' });
  expect(made.status).toBe(201);
  expect(await made.json()).toMatchObject({ x: 0.25, y: 1, partId: rt1, label: 'RT1', version: 1 });
  expect((await add({ x: 0, y: 0, label: ' TP 3 ' })).status).toBe(201);
  expect((await listed()).map((pin) => pin.label)).toEqual(['RT1', 'TP 3']);
});

test.each<[string, () => object, string]>([
  [
    'a part of another board',
    () => ({ x: 0, y: 0, partId: shop.boards.second.parts[0] }),
    'partId',
  ],
  ['a part that is none', () => ({ x: 0, y: 0, partId: 999_999 }), 'partId'],
  ['neither part nor label', () => ({ x: 0, y: 0 }), 'label'],
  ['an empty label', () => ({ x: 0, y: 0, label: '  ' }), 'label'],
  ['a long label', () => ({ x: 0, y: 0, label: 'x'.repeat(41) }), 'label'],
  ['a place outside', () => ({ x: 1.001, y: 0, label: 'a' }), 'x'],
  ['a negative place', () => ({ x: 0, y: -0.1, label: 'a' }), 'y'],
  ['a place that is no number', () => ({ x: null, y: 0, label: 'a' }), 'x'],
  ['a place as text', () => ({ x: 0, y: '0.5', label: 'a' }), 'y'],
])('%s is refused naming the field', async (_name, json, path) => {
  const before = await listed();
  const answer = await add(json());
  expect(answer.status).toBe(422);
  const problem = (await answer.json()) as { errors: { path: string }[] };
  expect(problem.errors.map((error) => error.path)).toContain(path);
  expect(await listed()).toEqual(before);
});

test('a place too large for a number is refused', async () => {
  const answer = await fetch(`${app.origin}${pins}`, {
    method: 'POST',
    headers: { cookie: shop.cookies.technician, 'content-type': 'application/json' },
    body: '{"x":1e999,"y":0,"label":"a"}',
  });
  expect(answer.status).toBe(422);
});

test('a pin is moved, given another part and taken off; an old version changes nothing', async () => {
  const [rt1, rv1] = shop.boards.first.parts;
  const made = (await (await add({ x: 0.5, y: 0.5, partId: rt1 })).json()) as PinView;
  const path = `${pins}/${made.id}`;
  const edit = (json: object, version: number) =>
    shop.call('senior', 'PATCH', path, { json, version });
  expect(await (await edit({ x: 0.75 }, 1)).json()).toMatchObject({
    x: 0.75,
    y: 0.5,
    label: 'RT1',
    version: 2,
  });
  const stale = await edit({ x: 0.1 }, 1);
  expect(stale.status).toBe(412);
  expect(await stale.json()).toMatchObject({ current: { x: 0.75, version: 2 } });
  expect(await (await edit({ partId: rv1 }, 2)).json()).toMatchObject({ label: 'RV1' });
  expect(await (await edit({ label: 'TP9' }, 3)).json()).toMatchObject({
    label: 'TP9',
    partId: null,
  });
  expect((await shop.call('senior', 'DELETE', path, { version: 3 })).status).toBe(412);
  expect((await shop.call('senior', 'DELETE', path, { version: 4 })).status).toBe(204);
  expect((await edit({ x: 0.1 }, 4)).status).toBe(404);
});

test('two people moving one pin from the same version: one wins, the other is told', async () => {
  const made = (await (await add({ x: 0.5, y: 0.5, label: 'TP2' })).json()) as PinView;
  const path = `${pins}/${made.id}`;
  const answers = await Promise.all(
    [0.1, 0.2, 0.3, 0.4].map((x) =>
      shop.call('technician', 'PATCH', path, { json: { x }, version: 1 }),
    ),
  );
  expect(answers.map((answer) => answer.status).sort()).toEqual([200, 412, 412, 412]);
});

test('a pin of another photo cannot be reached through this one, and pins go with their photo', async () => {
  const other = await taken(shop, shop.bruno.ticket.number, await cameraJpeg(500, 500));
  const theirs = `/api/photos/${other.id}/pins`;
  const made = await shop.call('technician', 'POST', theirs, {
    json: { x: 0.5, y: 0.5, partId: shop.boards.second.parts[0] },
  });
  const { id } = (await made.json()) as PinView;
  const crossed = { json: { x: 0.9 }, version: 1 };
  expect((await shop.call('technician', 'PATCH', `${pins}/${id}`, crossed)).status).toBe(404);
  expect((await shop.call('technician', 'DELETE', `${pins}/${id}`, { version: 1 })).status).toBe(
    404,
  );
  const away = await shop.call('technician', 'DELETE', `/api/photos/${other.id}`, { version: 1 });
  expect(away.status).toBe(204);
  expect((await shop.call('technician', 'GET', theirs)).status).toBe(404);
});
