import AxeBuilder from '@axe-core/playwright';
import { chromium, type Browser, type Page } from 'playwright';
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import type { PhotoView } from '@/contracts/photos';
import { startApp, type TestApp } from '../fixtures/app';
import { openPhotoShop, taken, type TestPhotoShop } from '../fixtures/photo-shop';
import { cameraJpeg, heic, png } from '../fixtures/pictures';

let app: TestApp;
let shop: TestPhotoShop;
let browser: Browser;
let said: string[] = [];
beforeAll(async () => {
  app = await startApp();
  shop = await openPhotoShop(app);
  browser = await chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-sync'],
  });
});
afterEach(async () => {
  await shop.clearFaults();
  for (const context of browser.contexts()) await context.close();
  const heard = said;
  said = [];
  expect(heard).toEqual([]);
});
afterAll(async () => {
  await browser?.close();
  await shop?.close();
  await app?.stop();
});

type Opening = { number: string; who?: 'technician' | 'counter'; width?: number; script?: boolean };
async function open({ number, who = 'technician', width = 1280, script = true }: Opening) {
  const context = await browser.newContext({
    viewport: { width, height: 900 },
    javaScriptEnabled: script,
  });
  const [name = '', value = ''] = shop.cookies[who].split('=');
  await context.addCookies([{ name, value, url: app.origin }]);
  const page = await context.newPage();
  page.on('console', (line) => {
    // The browser itself remarks on every refused request; the page shows those as sentences.
    if (line.type() === 'error' && !/Failed to load resource/.test(line.text()))
      said.push(line.text());
  });
  page.on('pageerror', (error) => said.push(error.message));
  await page.goto(`${app.origin}/tickets/${number}`, { waitUntil: 'load' });
  if (script && who === 'technician')
    await page
      .getByRole('button', { name: 'Choose photos' })
      .and(page.locator(':enabled'))
      .waitFor();
  return page;
}

const photosOf = async (number: string): Promise<PhotoView[]> => {
  const answer = await shop.call('technician', 'GET', `/api/tickets/${number}/photos`);
  return ((await answer.json()) as { items: PhotoView[] }).items;
};
const eventually = async (holds: () => Promise<boolean>) => {
  for (
    const until = Date.now() + 15_000;
    Date.now() < until;
    await new Promise((go) => setTimeout(go, 100))
  )
    if (await holds()) return;
  expect(await holds()).toBe(true);
};
const stageOf = (page: Page) => page.getByRole('application');
const jpeg = (name: string, buffer: Buffer) => ({ name, mimeType: 'image/jpeg', buffer });
const add = (page: Page, files: ReturnType<typeof jpeg>[]) =>
  page.getByLabel('Photo files').setInputFiles(files);

test('several files at once: good ones become photos, each other one says why it does not', async () => {
  const { number } = shop.bruno.ticket;
  const page = await open({ number });
  await page.getByRole('group', { name: 'Add photos' }).getByLabel('Back').check();
  await add(page, [
    jpeg('one.jpg', await cameraJpeg(1200, 900, 6)),
    jpeg('really-a.png', await png(500, 400)),
    jpeg('IMG_1.HEIC', heic()),
    jpeg('half.jpg', (await cameraJpeg(900, 900)).subarray(0, 2000)),
    jpeg('three.jpg', await cameraJpeg(1000, 700)),
  ]);
  await page.getByText('3 photos, none shared with the customer').waitFor();
  const rows = page.locator('.photo-uploads > li');
  expect(await rows.count()).toBe(2);
  expect(await rows.filter({ hasText: 'IMG_1.HEIC' }).innerText()).toMatch(/Not taken: .*HEIC/);
  expect(await rows.filter({ hasText: 'half.jpg' }).innerText()).toMatch(/breaks off/);
  await rows.getByRole('button', { name: 'Clear' }).first().click();
  expect(await rows.count()).toBe(1);
  const kept = await photosOf(number);
  expect(kept.map(({ fileName }) => fileName).sort()).toEqual([
    'one.jpg',
    'really-a.png',
    'three.jpg',
  ]);
  expect(kept.every(({ side }) => side === 'back')).toBe(true);
});

test('a failed upload can be tried again, one under way can be cancelled', async () => {
  const { number } = shop.bruno.other;
  const page = await open({ number });
  await shop.fault({ match: { method: 'PUT', key: 'uploads/*' }, kind: 'status', status: 500 });
  await add(page, [jpeg('again.jpg', await cameraJpeg(700, 500))]);
  const row = page.locator('.photo-uploads > li');
  await row.getByText('Not sent').waitFor();
  await row.getByRole('button', { name: 'Try again' }).click();
  await page.getByText('1 photo, none').waitFor();
  await shop.fault({ match: { method: 'PUT', key: 'uploads/*' }, kind: 'delay', ms: 20_000 });
  await add(page, [jpeg('never.jpg', await cameraJpeg(701, 500))]);
  await row.getByText('Being sent').waitFor();
  await row.getByRole('button', { name: 'Cancel' }).click();
  expect(await row.count()).toBe(0);
  expect((await photosOf(number)).map(({ fileName }) => fileName)).toEqual(['again.jpg']);
});

test('by keyboard alone: a pin is set, moved, given a label and taken off', async () => {
  const { number } = shop.anna.ticket;
  await taken(shop, number, await cameraJpeg(1600, 1200));
  const page = await open({ number });
  const pins = async () => (await photosOf(number))[0]?.pins ?? [];
  await stageOf(page).focus();
  await page.keyboard.press('p');
  await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('ArrowUp');
  await page.keyboard.press('Enter');
  await page.keyboard.type('rt1');
  await page.keyboard.press('Enter');
  await eventually(async () => (await pins()).length === 1);
  const [set] = await pins();
  expect(set).toMatchObject({ label: 'RT1', partId: shop.boards.first.parts[0] });
  expect(set?.x).toBeGreaterThan(0.5);
  expect(set?.y).toBeLessThan(0.5);

  const listed = page.locator('.pin-list');
  await listed.getByRole('button', { name: 'RT1' }).focus();
  await page.keyboard.press('Enter');
  await listed.getByRole('button', { name: 'Move' }).focus();
  await page.keyboard.press('Enter');
  for (let n = 0; n < 5; n++) await page.keyboard.press('Shift+ArrowLeft');
  await page.keyboard.press('Enter');
  await eventually(async () => ((await pins())[0]?.x ?? 1) < 0.5);

  await listed.getByRole('button', { name: 'Change' }).focus();
  await page.keyboard.press('Enter');
  await page.keyboard.press('Control+a');
  await page.keyboard.type('TP 7');
  await page.keyboard.press('Enter');
  await eventually(async () => (await pins())[0]?.label === 'TP 7');
  expect((await pins())[0]?.partId).toBeNull();

  await listed.getByRole('button', { name: 'Take off' }).focus();
  await page.keyboard.press('Enter');
  await eventually(async () => (await pins()).length === 0);
});

test('with the mouse: a pin is set by a click and dragged; it keeps its size and its place when zoomed', async () => {
  const { number } = shop.anna.ticket;
  const page = await open({ number });
  const stage = stageOf(page);
  await stage.scrollIntoViewIfNeeded();
  const box = (await stage.boundingBox()) ?? { x: 0, y: 0, width: 0, height: 0 };
  const at = (x: number, y: number) => [box.x + box.width * x, box.y + box.height * y] as const;
  await page.getByRole('button', { name: 'Add pin' }).click();
  await page.mouse.click(...at(0.5, 0.5));
  await page.getByLabel('Part or label').fill('RV1');
  await page.getByRole('button', { name: 'Set pin' }).click();
  const pin = async () => (await photosOf(number))[0]?.pins[0];
  await eventually(async () => (await pin())?.label === 'RV1');
  expect((await pin())?.x).toBeCloseTo(0.5, 2);
  expect((await pin())?.y).toBeCloseTo(0.5, 2);

  const plate = page.locator('.pin-hold .pin-plate').first();
  const ring = page.locator('.pin-hold .pin-ring').first();
  const before = await plate.boundingBox();
  const ringBefore = await ring.boundingBox();
  await page.mouse.move(...at(0.5, 0.5));
  await page.waitForTimeout(500);
  await page.mouse.wheel(0, -400);
  await page
    .getByRole('button', { name: /Show the whole photo/ })
    .and(page.locator(':enabled'))
    .waitFor();
  const after = await plate.boundingBox();
  // A lit plate has a stroke one pixel wider.
  expect(Math.abs((after?.width ?? 0) - (before?.width ?? 0))).toBeLessThanOrEqual(2);
  const ringAfter = await ring.boundingBox();
  expect(Math.abs((ringAfter?.x ?? 0) - (ringBefore?.x ?? 0))).toBeLessThanOrEqual(2);
  await stage.focus();
  await page.keyboard.press('0');

  await page.mouse.move(...at(0.5, 0.5));
  await page.mouse.down();
  await page.mouse.move(...at(0.6, 0.55), { steps: 4 });
  await page.mouse.move(...at(0.7, 0.6), { steps: 4 });
  await page.mouse.up();
  await eventually(async () => ((await pin())?.x ?? 0) > 0.6);
  expect((await pin())?.y).toBeCloseTo(0.6, 1);
});

test('a part pointed at elsewhere lights its pin, and a pin tells the page', async () => {
  const { number } = shop.anna.ticket;
  const page = await open({ number });
  const lit = page.locator('.pin-hold .pin-lit');
  const point = (ref: string | null) =>
    page.evaluate((detail) => window.dispatchEvent(new CustomEvent('mw:point', { detail })), {
      ref,
    });
  await point('RV1');
  await lit.waitFor();
  await point('R99');
  await lit.waitFor({ state: 'detached' });
  // The bench says how parts stand; the symbol on the pin then says it too.
  expect(await page.locator('.pin-hold .symbol-failed').count()).toBe(0);
  await page.evaluate(() => {
    Object.assign(window, { meterwrightStandings: { RV1: 'short' } });
    window.dispatchEvent(new CustomEvent('mw:standings'));
  });
  await page.locator('.pin-hold .symbol-failed .symbol-bridge').waitFor();

  await page.evaluate(() => {
    const heard: unknown[] = [];
    Object.assign(window, { heard });
    window.addEventListener('mw:point', (event) => heard.push((event as CustomEvent).detail.ref));
  });
  await page.locator('.pin-hold').first().focus();
  await lit.waitFor();
  const heard = await page.evaluate(() => (window as unknown as { heard: unknown[] }).heard);
  expect(heard.at(-1)).toBe('RV1');
});

test('sharing, side and caption are kept at once; what somebody else changed meanwhile is shown, not lost', async () => {
  const { number } = shop.anna.ticket;
  const page = await open({ number });
  await page.getByLabel('The customer sees this photo').check();
  await page.getByText('1 photo, 1 shared with the customer').waitFor();
  await page.getByLabel(/^Caption/).fill('PTC burnt open');
  await page.keyboard.press('Enter');
  const photo = async () => (await photosOf(number))[0];
  await eventually(async () => (await photo())?.caption === 'PTC burnt open');
  expect((await photo())?.shared).toBe(true);

  const before = await photo();
  const edit = { json: { caption: 'Theirs' }, version: before?.version ?? 0 };
  await shop.call('senior', 'PATCH', `/api/photos/${before?.id}`, edit);
  await page.locator('.photo-facts').getByLabel('Back').check();
  await page.getByText(/Somebody changed it meanwhile/).waitFor();
  expect(await page.getByLabel(/^Caption/).inputValue()).toBe('Theirs');
  expect((await photo())?.side).toBe('front');
  await page.locator('.photo-facts').getByLabel('Back').check();
  await eventually(async () => (await photo())?.side === 'back');
});

test('who may only look has no tools; without script every photo opens by its link', async () => {
  const { number } = shop.anna.ticket;
  const looking = await open({ number, who: 'counter' });
  await stageOf(looking).waitFor();
  for (const name of ['Add pin', 'Choose photos', 'Remove photo'])
    expect(await looking.getByRole('button', { name }).count()).toBe(0);
  const bare = await open({ number, script: false });
  const link = bare.locator('.contact-sheet a').first();
  const href = (await link.getAttribute('href')) ?? '';
  expect((await bare.request.get(app.origin + href)).headers()['content-type']).toBe('image/webp');
});

test.each([1280, 360])(
  'at %i pixels: nothing sticks out, and axe finds nothing in either theme',
  async (width) => {
    const { number } = shop.anna.ticket;
    const page = await open({ number, width });
    await page.getByRole('button', { name: 'Add pin' }).click();
    await stageOf(page).press('Enter');
    await page.getByLabel('Part or label').waitFor();
    const panel = page.getByRole('region', { name: 'Board photos' });
    const wide = await panel.evaluate((element) => [
      element.scrollWidth - element.clientWidth,
      element.getBoundingClientRect().right - document.documentElement.clientWidth,
    ]);
    expect(wide[0]).toBeLessThanOrEqual(0);
    expect(wide[1]).toBeLessThanOrEqual(0);
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      const found = await new AxeBuilder({ page }).include('.photo-panel').analyze();
      expect(found.violations.map(({ id, nodes }) => [id, nodes[0]?.html])).toEqual([]);
    }
  },
);

test('a photo is removed after a second thought, with its pins', async () => {
  const { number } = shop.anna.ticket;
  const page = await open({ number });
  await page.getByRole('button', { name: 'Remove photo' }).click();
  await page.getByRole('button', { name: 'Keep it' }).click();
  expect(await photosOf(number)).toHaveLength(1);
  await page.getByRole('button', { name: 'Remove photo' }).click();
  await page.getByRole('button', { name: 'Remove photo and pins' }).click();
  await page.getByText('No photos yet.').waitFor();
  expect(await photosOf(number)).toEqual([]);
});
