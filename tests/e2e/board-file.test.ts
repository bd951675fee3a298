import AxeBuilder from '@axe-core/playwright';
import { eq } from 'drizzle-orm';
import { chromium, type Browser } from 'playwright';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { photos } from '@/db/schema/photos';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, taken, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg } from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
let browser: Browser;

/** A photo in the board file of the first board, with a pin on the first of its two parts. */
async function boardPhoto(side: 'front' | 'back', part: number | undefined): Promise<void> {
  const { id } = await taken(shop, shop.anna.ticket.number, await cameraJpeg(900, 600));
  const json = { x: 0.25, y: 0.4, partId: part };
  const pinned = await shop.call('technician', 'POST', `/api/photos/${id}/pins`, { json });
  expect(pinned.status).toBe(201);
  await shop.db
    .update(photos)
    .set({ ticketId: null, boardId: shop.boards.first.id, side, caption: `CB-1, ${side}` })
    .where(eq(photos.publicId, id));
}

beforeAll(async () => {
  app = await startApp();
  shop = await openPhotoShop(app);
  await boardPhoto('front', shop.boards.first.parts[0]);
  await boardPhoto('back', shop.boards.first.parts[1]);
  browser = await chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-sync'],
  });
});
afterAll(async () => {
  await browser?.close();
  await shop?.close();
  await app?.stop();
});

async function open(board: number, width = 1280) {
  const context = await browser.newContext({ viewport: { width, height: 900 } });
  const [name = '', value = ''] = shop.cookies.counter.split('=');
  await context.addCookies([{ name, value, url: app.origin }]);
  const page = await context.newPage();
  await page.goto(`${app.origin}/boards/${board}`, { waitUntil: 'networkidle' });
  return page;
}

test('a part lights up in the table, among the pins and on the contact sheet, wherever it is pointed at', async () => {
  const page = await open(shop.boards.first.id);
  const panel = page.getByRole('region', { name: 'Board photos' });
  const row = page.getByRole('row', { name: /RT1/ });
  const pin = panel
    .getByRole('listitem')
    .filter({ has: page.getByRole('button', { name: 'RT1' }) });
  await row.hover();
  await expect.poll(() => pin.getAttribute('class')).toBe('pin-list-lit');
  await page.getByRole('heading', { level: 1 }).hover();
  await expect.poll(() => pin.getAttribute('class')).toBe(null);
  await panel.getByRole('button', { name: 'RT1' }).first().focus();
  await expect.poll(() => row.getAttribute('class')).toContain('row-lit');
  await page.getByRole('row', { name: /RV1/ }).hover();
  const lit = panel.locator('.contact-sheet-lit');
  await expect.poll(() => lit.count()).toBe(1);
  expect(await lit.textContent()).toContain('Back');
});

test('the photos are looked at, not changed, and named by the side they show', async () => {
  const page = await open(shop.boards.first.id);
  const panel = page.getByRole('region', { name: 'Board photos' });
  await panel.getByRole('link', { name: /Back/ }).click();
  await panel.getByRole('heading', { name: 'Back', exact: true }).waitFor();
  expect(await panel.getByText('CB-1, back').count()).toBe(1);
  for (const word of ['Add pin', 'Choose photos', 'Remove photo', 'Move'])
    expect(await panel.getByRole('button', { name: word, exact: true }).count()).toBe(0);
});

test('a board without photos shows no panel for them', async () => {
  const page = await open(shop.boards.second.id);
  await page.getByRole('heading', { level: 1 }).waitFor();
  expect(await page.getByRole('region', { name: 'Board photos' }).count()).toBe(0);
});

test.each([1280, 360])(
  'no barrier is found at %i pixels, and nothing hangs over',
  async (width) => {
    const page = await open(shop.boards.first.id, width);
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations.map(({ id, nodes }) => [id, nodes.map((n) => n.html)])).toEqual([]);
    const over = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(over).toBeLessThanOrEqual(0);
  },
);
