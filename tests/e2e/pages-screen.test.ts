/**
 * Every page of the app on the demo shop, wide and narrow, light and dark: no barrier, nothing over the edge, not a word
 * on the console, no request that leaves the machine. Pictures of all of them are left under tests/.output/screens.
 */
import { mkdirSync, rmSync } from 'node:fs';
import { writeFile } from 'node:fs/promises';
import type { Page } from 'playwright';
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { startDemoShop, type DemoShop } from '../fixtures/demo-shop';
import { barriers, lacks, sticksOut } from '../fixtures/page-checks';
import { openerOf, type Opener } from '../fixtures/page-view';
import { PAGE_VIEWS } from '../fixtures/page-views';
import { pagesOnDisk } from '../fixtures/pages-on-disk';
import { checkout } from '../fixtures/services';
import { openWatchedBrowser, type WatchedBrowser } from '../fixtures/watched-browser';

const screens = `${checkout}tests/.output/screens`;
const views = Object.entries(PAGE_VIEWS).flatMap(([pattern, of]) =>
  of.map((view) => ({ pattern, ...view })),
);
/** Titles as they were found, and the pages they stand on. */
const titles = new Map<string, Set<string>>();
vi.setConfig({ maxConcurrency: 2 });

let shop: DemoShop;
let browser: WatchedBrowser;
let open: Opener;
beforeAll(async () => {
  // None of an earlier run stays among them.
  rmSync(screens, { recursive: true, force: true });
  mkdirSync(screens, { recursive: true });
  shop = await startDemoShop();
  browser = await openWatchedBrowser();
  open = await openerOf(shop, browser);
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await shop?.stop();
});

/** The whole page, asked for without the browser's long work on a small file. */
async function picture(page: Page, name: string, width: number, theme: 'light' | 'dark') {
  const session = await page.context().newCDPSession(page);
  const size = await page.evaluate(async () => {
    // What was asked of the page last is on the screen two frames later.
    await new Promise((drawn) => requestAnimationFrame(() => requestAnimationFrame(drawn)));
    return { width: innerWidth, height: document.documentElement.scrollHeight };
  });
  expect(size.width).toBe(width);
  const { data } = await session.send('Page.captureScreenshot', {
    format: 'png',
    captureBeyondViewport: true,
    optimizeForSpeed: true,
    clip: { x: 0, y: 0, ...size, scale: 1 },
  });
  await writeFile(`${screens}/${name}-${width}-${theme}.png`, data, 'base64');
  await session.detach();
}

test('every page on disk has its views, and their names are unique', () => {
  expect(Object.keys(PAGE_VIEWS).sort()).toEqual([...new Set(pagesOnDisk)].sort());
  expect(new Set(views.map(({ name }) => name)).size).toBe(views.length);
  const without = Object.entries(PAGE_VIEWS).filter(([, of]) => of.length === 0);
  expect(without.map(([pattern]) => pattern)).toEqual(['/sign-out']);
});

describe.concurrent('looked at', () => {
  test.each(views)('$name', async ({ pattern, ...view }) => {
    const { page, status } = await open(view);
    const { name } = view;
    const found: Record<string, string[]> = {};
    expect(status).toBe(view.status ?? 200);
    found['lacks'] = await lacks(page);
    found['sticks out at 1280'] = await sticksOut(page);
    found['barriers, wide and light'] = await barriers(page);
    await picture(page, name, 1280, 'light');
    await page.emulateMedia({ colorScheme: 'dark' });
    // The theme changes colours alone.
    found['contrast, wide and dark'] = await barriers(page, 'contrast');
    await picture(page, name, 1280, 'dark');
    await page.setViewportSize({ width: 360, height: 900 });
    found['sticks out at 360'] = await sticksOut(page);
    found['barriers, narrow'] = await barriers(page, 'all but contrast');
    await picture(page, name, 360, 'dark');
    await page.emulateMedia({ colorScheme: 'light' });
    await picture(page, name, 360, 'light');
    if (status !== 404)
      titles.set(await page.title(), (titles.get(await page.title()) ?? new Set()).add(pattern));
    const { said, left } = browser.heard(page);
    // The browser itself remarks on the answer of the page for crashes.
    found['said'] = said.filter((line) => !(status === 500 && /status of 500/.test(line)));
    found['left the machine'] = left;
    await page.close();
    expect(Object.entries(found).filter(([, faults]) => faults.length > 0)).toEqual([]);
  });
});

test('each page has a title of its own', () => {
  const shared = [...titles].filter(([, patterns]) => patterns.size > 1);
  expect(shared.map(([title, patterns]) => [title, ...patterns])).toEqual([]);
});
