import { afterAll, beforeAll, expect, test } from 'vitest';
import { eq } from 'drizzle-orm';
import { faultNotes, faultRevisions } from '@/db/schema/faults';
import type { FaultBody } from '@/domain/faults/body';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, taken, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg } from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
beforeAll(async () => {
  app = await startApp();
  shop = await openPhotoShop(app);
});
afterAll(async () => {
  await shop?.close();
  await app?.stop();
});

const showing = (id: string | null): FaultBody => ({
  symptom: [],
  cause: [],
  proof: id === null ? [] : [{ type: 'photo', attrs: { id, caption: '' } }],
  repair: [],
});

test('a photo that a fault note shows cannot be removed until the note lets it go', async () => {
  const photo = await taken(shop, shop.anna.ticket.number, await cameraJpeg());
  const at = new Date();
  const facts = { title: 'PTC opens on mains', symptoms: [] };
  const createdBy = shop.staff.senior;
  const [note] = await shop.db
    .insert(faultNotes)
    .values({
      ...facts,
      state: 'draft',
      revision: 1,
      words: '',
      createdBy,
      createdAt: at,
      updatedAt: at,
    })
    .$returningId();
  const noteId = note?.id ?? 0;
  const revise = (revision: number, id: string | null) =>
    shop.db
      .insert(faultRevisions)
      .values({ ...facts, noteId, revision, body: showing(id), authorId: createdBy, at });
  await revise(1, photo.id);
  const remove = () =>
    shop.call('technician', 'DELETE', `/api/photos/${photo.id}`, { version: photo.version });
  const kept = await remove();
  expect(kept.status).toBe(409);
  expect(await kept.json()).toMatchObject({
    detail: 'The fault note “PTC opens on mains” shows this photo: take it out there first.',
  });
  expect((await shop.call('technician', 'GET', `/api/photos/${photo.id}/full`)).status).toBe(200);

  await revise(2, null);
  const set = (change: { revision: number; publishedRevision?: number | null }) =>
    shop.db.update(faultNotes).set(change).where(eq(faultNotes.id, noteId));
  await set({ revision: 2, publishedRevision: 1 });
  expect((await remove()).status).toBe(409);
  await set({ revision: 2, publishedRevision: 2 });
  expect((await remove()).status).toBe(204);
});
