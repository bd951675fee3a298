/** The app where no script runs: the customer's whole path, and what every page shows. */
import type { Page } from 'playwright';
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { randomBytes } from 'node:crypto';
import { startDemoShop, type DemoShop } from '../fixtures/demo-shop';
import { awaitLetters } from '../fixtures/inbox';
import { openerOf, type Opener } from '../fixtures/page-view';
import { PAGE_VIEWS } from '../fixtures/page-views';
import { openWatchedBrowser, type WatchedBrowser } from '../fixtures/watched-browser';

const views = Object.values(PAGE_VIEWS).flat();
vi.setConfig({ maxConcurrency: 2 });

let shop: DemoShop;
let browser: WatchedBrowser;
let open: Opener;
beforeAll(async () => {
  shop = await startDemoShop();
  browser = await openWatchedBrowser();
  open = await openerOf(shop, browser, false);
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await shop?.stop();
});

/** Buttons in sight that offer what no script is there to do: neither a form's, nor one that opens something. */
const deadButtons = (page: Page): Promise<string[]> =>
  page.evaluate(() =>
    [...document.querySelectorAll('button')]
      .filter((button) => button.checkVisibility() && !button.disabled)
      .filter((button) => !button.popoverTargetElement)
      // Set as the text it names.
      .filter((button) => getComputedStyle(button).pointerEvents !== 'none')
      .filter((button) => button.form === null || button.type === 'button')
      .map((button) => button.outerHTML.slice(0, 140)),
  );

describe.concurrent('shown', () => {
  test.each(views)('$name', async (view) => {
    const { page, status } = await open(view);
    expect(status).toBe(view.status ?? 200);
    expect(await page.locator('h1').filter({ visible: true }).count()).toBe(1);
    expect(await deadButtons(page)).toEqual([]);
    const { left } = browser.heard(page);
    expect(left).toEqual([]);
    await page.close();
  });
});

/** An instrument taken in, measured and estimated by the staff, all by forms. Answers what its receipt says. */
async function estimated(email: string): Promise<{ number: string; code: string }> {
  const { origin } = shop.app;
  const someone = async (role: 'counter' | 'tech') =>
    browser.someone(origin, { cookie: await shop.cookieOf(role), script: false });
  const counter = await someone('counter');
  await counter.goto(`${origin}/intake`);
  const fields = {
    name: 'Wietske Lammers',
    email,
    maker: 'Lumeford',
    model: 'LM-90',
    serial: randomBytes(4).toString('hex'),
  };
  for (const [id, text] of Object.entries(fields)) await counter.locator(`#${id}`).fill(text);
  await counter.getByLabel('Ohms reads OL or nothing').check();
  await counter.getByRole('button', { name: 'Take in and print receipt' }).click();
  const code = await counter.locator('.receipt-code').innerText();
  const number = await counter.getByRole('heading', { level: 1 }).innerText();
  const [receipt] = await awaitLetters(email, 1);
  expect(receipt?.text).toContain(code);

  const tech = await someone('tech');
  await tech.goto(`${origin}/tickets/${number}`);
  await tech.getByRole('button', { name: 'Take to the bench' }).click();
  await tech.locator('summary', { hasText: 'Send estimate' }).click();
  await tech.getByLabel('Total with tax').fill('86,40');
  await tech.getByLabel(/What it covers/).fill('RT1, RV1, RV2, release check.');
  await tech.getByRole('button', { name: 'Send estimate', exact: true }).click();
  await tech.getByText('Approve estimate').first().waitFor();
  for (const person of [counter, tech]) await person.context().close();
  return { number, code };
}

test('a customer finds the repair, writes, is answered, approves and closes it', async () => {
  const { origin } = shop.app;
  const { number, code } = await estimated(`${randomBytes(6).toString('hex')}@customer.example`);
  const page = await browser.someone(origin, { script: false, width: 360 });
  await page.goto(origin);
  await page.getByLabel('Ticket number').fill(number);
  await page.getByLabel('Claim code').fill('AAAA-AAAA-AA');
  await page.getByRole('button', { name: 'Show my repair' }).click();
  await page.getByRole('alert').getByText('don’t belong together').waitFor();
  expect(await page.getByLabel('Ticket number').inputValue()).toBe(number);
  await page.getByLabel('Claim code').fill(code);
  await page.getByRole('button', { name: 'Show my repair' }).click();
  await page.getByRole('heading', { level: 1, name: /Your answer is needed/ }).waitFor();
  await page.getByText('RT1, RV1, RV2, release check.').waitFor();
  await page.getByLabel('Write to the shop').fill('Please keep the old parts.');
  await page.getByRole('button', { name: 'Send message' }).click();
  await page.getByText('Your message is with the shop.').waitFor();
  await page.getByText('Please keep the old parts.').waitFor();
  await page.getByRole('button', { name: 'Approve estimate' }).click();
  await page.getByText('You approved the estimate.').first().waitFor();
  expect(await page.getByRole('button', { name: 'Approve estimate' }).count()).toBe(0);
  expect((await shop.ticket(number)).stage).toBe('approved');
  await page.getByRole('button', { name: 'Close my repair on this device' }).click();
  await page.goto(`${origin}/status/${number}`);
  expect(new URL(page.url()).pathname).toBe('/check');
  expect(browser.heard(page)).toEqual({ said: [], left: [] });
  await page.context().close();
});
