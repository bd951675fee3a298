/** A closed ticket: photos and readings stay as they are, messages still go both ways. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Stage } from '@/domain/tickets/stages';
import { openDeskShop, problem, type DeskShop, type Taken } from '../fixtures/desk-shop';
import { insertPhoto } from '../fixtures/rows';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

const picture = { variants: [], sha256: 'a'.repeat(64), width: 64, height: 48 };
const bench = (method: string, path: string, more: { json?: unknown; version?: number } = {}) =>
  shop.call('technician', method, path, more);
const UPLOAD = { fileName: 'board.jpg', type: 'image/jpeg', bytes: 1000, side: 'front' };

async function photographed(stage: Stage): Promise<Taken & { photo: string; pin: number }> {
  const taken = await shop.taken();
  const { id } = await shop.ticket(taken.number);
  const staff = shop.people.technician.id;
  const { publicId, pinId } = await insertPhoto(shop.db, {
    ticketId: id,
    staff,
    shared: false,
    picture,
  });
  await shop.stand(taken.number, stage, { closedAt: new Date() });
  return { ...taken, photo: publicId, pin: pinId };
}

const changes = ({ number, photo, pin }: { number: string; photo: string; pin: number }) =>
  [
    ['POST', `/api/tickets/${number}/photos`, { json: { ...UPLOAD, phase: 'after' } }, 201],
    ['PATCH', `/api/photos/${photo}`, { json: { shared: true }, version: 1 }, 200],
    ['POST', `/api/photos/${photo}/pins`, { json: { x: 0.1, y: 0.2, label: 'burnt' } }, 201],
    [
      'PATCH',
      `/api/photos/${photo}/pins/${pin}`,
      { json: { x: 0.3, y: 0.2, label: 'x' }, version: 1 },
      200,
    ],
    ['DELETE', `/api/photos/${photo}/pins/${pin}`, { version: 2 }, 204],
    ['DELETE', `/api/photos/${photo}`, { version: 2 }, 204],
  ] as const;

test.each(['handed-over', 'returned-unrepaired'] as const)(
  'photos of a ticket %s are neither added, shared, marked nor removed',
  async (stage) => {
    for (const [method, path, more] of changes(await photographed(stage))) {
      const answer = await bench(method, path, more);
      expect(answer.status, `${method} ${path}`).toBe(409);
      expect((await problem(answer)).detail).toContain('its photos stay as they are');
    }
  },
);

test('the same of an open ticket are', async () => {
  for (const [method, path, more, status] of changes(await photographed('in-repair')))
    expect((await bench(method, path, more)).status, `${method} ${path}`).toBe(status);
});

test('messages still go both ways, and the page says what stays', async () => {
  const { number, claimCode } = await photographed('handed-over');
  const path = `/api/tickets/${number}/messages`;
  const fromShop = await shop.call('counter', 'POST', path, { json: { body: 'All well?' } });
  expect(fromShop.status).toBe(201);
  const cookie = await shop.enter({ number, claimCode });
  const form = { do: 'message', body: 'It reads well.' };
  expect((await shop.form(cookie, `/status/${number}`, form)).status).toBe(303);
  const html = await (await shop.get(shop.cookies.technician, `/tickets/${number}`)).text();
  expect(html).toContain('It reads well.');
  expect(html).toMatch(
    /The ticket is closed: readings and photos stay as they are, messages may still be\s+exchanged\./,
  );
});
