/** Every page of the app by keyboard alone: the Tab key reaches all of it, shows where it is, and leads out again. */
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { startDemoShop, type DemoShop } from '../fixtures/demo-shop';
import { openerOf, type Opener } from '../fixtures/page-view';
import { PAGE_VIEWS } from '../fixtures/page-views';
import { walkByTab } from '../fixtures/tab-walk';
import { openWatchedBrowser, type WatchedBrowser } from '../fixtures/watched-browser';

const views = Object.values(PAGE_VIEWS).flat();
vi.setConfig({ maxConcurrency: 2 });

let shop: DemoShop;
let browser: WatchedBrowser;
let open: Opener;
beforeAll(async () => {
  shop = await startDemoShop();
  browser = await openWatchedBrowser();
  open = await openerOf(shop, browser);
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await shop?.stop();
});

describe.concurrent('walked', () => {
  test.each(views)('$name', async (view) => {
    const { page } = await open(view);
    const { first, ...faults } = await walkByTab(page);
    expect(first).toContain('class="skip-link"');
    expect(faults).toEqual({ unreached: [], unmarked: [], unseen: [], trap: null });
    await page.locator('.skip-link').focus();
    await page.keyboard.press('Enter');
    expect(await page.evaluate(() => document.activeElement?.id)).toBe('main');
    await page.close();
  });
});

test('on a narrow page the menu opens, is walked and closes again', async () => {
  const view = views.find(({ name }) => name === 'queue');
  if (!view) throw new Error('The queue has no view.');
  const { page } = await open(view);
  await page.setViewportSize({ width: 360, height: 900 });
  const links = page.getByRole('navigation', { name: 'Sections' }).getByRole('link');
  expect(await links.count()).toBe(0);
  await page.getByRole('button', { name: /open the menu/ }).focus();
  await page.keyboard.press('Enter');
  await links.first().waitFor();
  const menu = page.locator('#sections');
  const inside = () => menu.evaluate((box) => box.contains(document.activeElement));
  const stops = await menu.locator('a, input, button').count();
  for (let n = 0; n < stops; n++) {
    await page.keyboard.press('Tab');
    expect(await inside()).toBe(true);
  }
  // It does not lie over what is walked next.
  await page.keyboard.press('Tab');
  expect(await inside()).toBe(false);
  await links.first().waitFor({ state: 'hidden' });
  await page.getByRole('button', { name: /open the menu/ }).focus();
  await page.keyboard.press('Enter');
  await links.first().waitFor();
  await page.keyboard.press('Escape');
  await links.first().waitFor({ state: 'hidden' });
  await page.close();
});
