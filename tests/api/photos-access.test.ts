import { afterAll, beforeAll, expect, test } from 'vitest';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, taken, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg } from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
let kept: string;
let shared: string;
beforeAll(async () => {
  app = await startApp();
  shop = await openPhotoShop(app);
  const { number } = shop.anna.ticket;
  kept = (await taken(shop, number, await cameraJpeg())).id;
  shared = (await taken(shop, number, await cameraJpeg(700, 500))).id;
  const edit = { json: { shared: true }, version: 1 };
  await shop.call('technician', 'PATCH', `/api/photos/${shared}`, edit);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

type Who = keyof TestPhotoShop['cookies'] | null;
const STAFF: Who[] = ['counter', 'technician', 'senior'];
const CUSTOMERS: Who[] = ['anna', 'annaByClaimCode', 'annaByOtherClaimCode', 'bruno'];

test.each<[Who, number, number]>([
  ['counter', 200, 200],
  ['technician', 200, 200],
  ['senior', 200, 200],
  ['anna', 404, 200],
  ['annaByClaimCode', 404, 200],
  ['annaByOtherClaimCode', 404, 404],
  ['bruno', 404, 404],
  [null, 401, 401],
])('%s sees a kept photo as %i and a shared one as %i', async (who, keptStatus, sharedStatus) => {
  for (const variant of ['thumb', 'page', 'full']) {
    const ofKept = await shop.call(who, 'GET', `/api/photos/${kept}/${variant}`);
    const ofShared = await shop.call(who, 'GET', `/api/photos/${shared}/${variant}`);
    expect([ofKept.status, ofShared.status], variant).toEqual([keptStatus, sharedStatus]);
    const picture = ofShared.headers.get('content-type')?.startsWith('image/') ?? false;
    expect(picture).toBe(sharedStatus === 200);
  }
});

test('a photo that is not there and one that is not yours are told apart by nothing', async () => {
  const body = async (id: string) => {
    const answer = await shop.call('bruno', 'GET', `/api/photos/${id}/page`);
    return [answer.status, await answer.text()];
  };
  expect(await body(shared)).toEqual(await body('AAAAAAAAAAAAAAAAAAAAAA'));
  expect(await body(kept)).toEqual(await body('AAAAAAAAAAAAAAAAAAAAAA'));
});

test('a picture that is no longer shared is closed to its customer at once', async () => {
  const photo = await taken(shop, shop.anna.ticket.number, await cameraJpeg(710, 510));
  const path = `/api/photos/${photo.id}`;
  const see = async () => (await shop.call('anna', 'GET', `${path}/full`)).status;
  await shop.call('technician', 'PATCH', path, { json: { shared: true }, version: 1 });
  expect(await see()).toBe(200);
  await shop.call('technician', 'PATCH', path, { json: { shared: false }, version: 2 });
  expect(await see()).toBe(404);
});

test('a customer’s browser shows nothing it kept without asking whether it still may', async () => {
  const path = `/api/photos/${shared}/page`;
  const first = await shop.call('annaByClaimCode', 'GET', path);
  expect(first.headers.get('cache-control')).toBe('private, no-cache');
  expect(first.headers.get('vary')).toContain('cookie');
  const headers = { 'if-none-match': first.headers.get('etag') ?? '' };
  expect((await shop.call('annaByClaimCode', 'GET', path, { headers })).status).toBe(304);
  expect((await shop.call('bruno', 'GET', path, { headers })).status).toBe(404);
  expect((await shop.call(null, 'GET', path, { headers })).status).toBe(401);
});

const NEW = { fileName: 'a.jpg', type: 'image/jpeg', bytes: 5, side: 'front', phase: 'before' };
const changes = (): [string, string, object | undefined][] => [
  ['POST', `/api/tickets/${shop.anna.ticket.number}/photos`, NEW],
  ['POST', `/api/photos/${shared}/done`, undefined],
  ['PATCH', `/api/photos/${shared}`, { caption: 'x' }],
  ['DELETE', `/api/photos/${shared}`, undefined],
  ['POST', `/api/photos/${shared}/pins`, { x: 0.5, y: 0.5, label: 'TP1' }],
  ['PATCH', `/api/photos/${shared}/pins/1`, { x: 0.5 }],
  ['DELETE', `/api/photos/${shared}/pins/1`, undefined],
];

test.each<[Who, number]>([...CUSTOMERS, 'counter' as const].map((who) => [who, 403]))(
  '%s can change nothing about photos',
  async (who, status) => {
    for (const [method, path, json] of changes()) {
      const answer = await shop.call(who, method, path, { json, version: 2 });
      expect(answer.status, `${method} ${path}`).toBe(status);
    }
  },
);

test('nobody without a sign-in can change or list anything', async () => {
  const lists: [string, string, undefined][] = [
    ['GET', `/api/tickets/${shop.anna.ticket.number}/photos`, undefined],
    ['GET', `/api/photos/${shared}/pins`, undefined],
  ];
  for (const [method, path, json] of [...changes(), ...lists])
    expect((await shop.call(null, method, path, { json, version: 2 })).status).toBe(401);
});

test('lists and pins are for the staff', async () => {
  for (const path of [
    `/api/tickets/${shop.anna.ticket.number}/photos`,
    `/api/photos/${shared}/pins`,
  ]) {
    for (const who of STAFF) expect((await shop.call(who, 'GET', path)).status).toBe(200);
    for (const who of CUSTOMERS) expect((await shop.call(who, 'GET', path)).status).toBe(403);
  }
});

test('addresses that name nothing are not there, whatever they hold', async () => {
  const strange = ['x', '../../etc/passwd', '%00', 'A'.repeat(22), 'A'.repeat(300), "' OR 1=1"];
  for (const id of strange) {
    const path = `/api/photos/${encodeURIComponent(id)}/full`;
    expect((await shop.call('technician', 'GET', path)).status, id).toBe(404);
  }
  expect((await shop.call('technician', 'GET', `/api/photos/${kept}/raw`)).status).toBe(404);
});
