/** The whole main job in a browser: four people in four contexts on the demo shop, from intake to the customer's page. */
import { randomBytes } from 'node:crypto';
import type { Page } from 'playwright';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { DEMO_PASSWORD, startDemoShop, type DemoRole, type DemoShop } from '../fixtures/demo-shop';
import { awaitLetters } from '../fixtures/inbox';
import { CAMERA_MAKE, CAMERA_OWNER, cameraJpeg } from '../fixtures/pictures';
import { openWatchedBrowser, type WatchedBrowser } from '../fixtures/watched-browser';

let shop: DemoShop;
let browser: WatchedBrowser;
let origin: string;
beforeAll(async () => {
  shop = await startDemoShop();
  ({ origin } = shop.app);
  browser = await openWatchedBrowser();
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await shop?.stop();
});

const SOON_MS = 1_000;
/** Nobody else gets letters at this address. */
const email = `${randomBytes(6).toString('hex')}@customer.example`;
const title = `Ohms dead after mains, ${randomBytes(3).toString('hex')}: RT1 open, RV1 shorted`;

async function signIn(page: Page, who: DemoRole) {
  await page.goto(`${origin}/sign-in`);
  await page.getByLabel('E-mail').fill(shop.emailOf(who));
  await page.getByLabel('Password').fill(DEMO_PASSWORD);
  await page.keyboard.press('Enter');
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

/** Goes on by the Tab key until the field is reached. */
async function tabTo(page: Page, id: string) {
  for (let n = 0; n < 80; n++) {
    if ((await page.evaluate(() => document.activeElement?.id)) === id) return;
    await page.keyboard.press('Tab');
  }
  throw new Error(`#${id} cannot be reached with the Tab key.`);
}

/** Fills the intake without touching the mouse. Answers the ticket's number. */
async function takeIn(page: Page, unit: { maker: string; model: string; serial: string }) {
  await page.goto(`${origin}/intake`);
  const fields = { name: 'Wietske Lammers', email, ...unit };
  for (const [id, text] of Object.entries(fields)) {
    await tabTo(page, id);
    await page.keyboard.type(text);
  }
  const symptom = page.getByLabel('Ohms reads OL or nothing');
  while (!(await symptom.evaluate((box) => box === document.activeElement)))
    await page.keyboard.press('Tab');
  await page.keyboard.press('Space');
  await tabTo(page, 'symptomText');
  await page.keyboard.type('Measured a socket on the ohms range.');
  await tabTo(page, 'incident');
  await page.keyboard.type('Mains on');
  expect(await page.locator('#incident').inputValue()).toBe('mains-on-ohms');
  const submit = page.getByRole('button', { name: 'Take in and print receipt' });
  while (!(await submit.evaluate((button) => button === document.activeElement)))
    await page.keyboard.press('Tab');
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/tickets\/\d{4}-\d{4}\/receipt$/);
  return /\/tickets\/([\d-]+)\//.exec(page.url())?.[1] ?? '';
}

/** Types a row of the bench sheet as its keys want it; answers when the last key was pressed. */
async function typeReading(page: Page, row: number, cells: [string, string, string, string]) {
  await page.getByRole('gridcell', { name: new RegExp(`^Row ${row}, From`) }).focus();
  for (const [i, text] of cells.entries()) {
    await page.keyboard.type(text);
    await page.keyboard.press(i === 3 ? 'Enter' : 'Tab');
  }
  return performance.now();
}

async function photograph(page: Page, number: string) {
  const choose = page.getByRole('button', { name: 'Choose photos' });
  await choose.and(page.locator(':enabled')).waitFor();
  const buffer = await cameraJpeg(4000, 3000, 6);
  const file = { name: 'front.jpg', mimeType: 'image/jpeg', buffer };
  await page.getByLabel('Photo files').setInputFiles([file]);
  const stage = page.getByRole('application');
  await stage.waitFor({ timeout: 60_000 });
  // It was held sideways: the shop sees it upright.
  const box = await stage.locator('image').first().boundingBox();
  expect(box?.width).toBeGreaterThan(0);
  expect(box?.width).toBeLessThan(box?.height ?? 0);
  const list = await page.request.get(`${origin}/api/tickets/${number}/photos`);
  const { items } = (await list.json()) as { items: { id: string }[] };
  const size = await page.evaluate(async (id) => {
    const picture = new Image();
    picture.src = `/api/photos/${id}/page`;
    await picture.decode();
    return { width: picture.naturalWidth, height: picture.naturalHeight };
  }, items[0]?.id);
  expect(size.width).toBeLessThan(size.height);
  const served = await page.request.get(`${origin}/api/photos/${items[0]?.id}/full`);
  const bytes = await served.body();
  const { exif, xmp, orientation } = await sharp(bytes).metadata();
  expect([exif, xmp, orientation]).toEqual([undefined, undefined, undefined]);
  for (const word of [CAMERA_MAKE, CAMERA_OWNER, 'GPS'])
    expect(bytes.includes(Buffer.from(word)), word).toBe(false);
  // A pin for RT1, set by keys.
  await stage.focus();
  await page.keyboard.press('p');
  await page.keyboard.press('Enter');
  await page.keyboard.type('RT1');
  await page.keyboard.press('Enter');
  await page.locator('.pin-list').getByText('RT1').first().waitFor();
  await page.getByLabel('The customer sees this photo').check();
}

async function measure(page: Page) {
  const suspects = page.locator('#suspects');
  const seen = async (name: string, since: number) => {
    await suspects.getByRole('group', { name }).waitFor();
    expect(performance.now() - since, name).toBeLessThan(SOON_MS);
  };
  await seen('RT1 open', await typeReading(page, 1, ['V', 'P', 'volts', 'OL']));
  await seen('RV1 short', await typeReading(page, 2, ['P', 'M1', 'volts', '0R8']));
  await typeReading(page, 3, ['P', 'IN', 'ohms', '1k2']);
  const since = await typeReading(page, 4, ['V', 'N1', 'volts', '4.99M']);
  await suspects.getByText('from 4 readings').waitFor();
  await seen('RT1 open', since);
  await seen('RV1 short', since);
  // Kept as typed, also for the next who opens the page.
  await page.reload();
  for (const [i, typed] of ['OL', '0R8', '1k2', '4.99M'].entries())
    await page
      .getByRole('gridcell', { name: new RegExp(`^Row ${i + 1}, .*: ${typed}$`) })
      .waitFor();
}

async function writeNote(page: Page) {
  await page.getByRole('link', { name: 'Write a fault note from this ticket' }).click();
  const section = (name: string) => page.getByRole('textbox', { name, exact: true });
  await section('Repair').waitFor();
  await page.getByLabel('Title').fill(title);
  for (const [name, text] of [
    ['Symptom', 'Ohms shows OL with the leads shorted.'],
    ['Cause', 'Mains on ohms opened RT1 and shorted RV1.'],
    ['Repair', 'Replace RT1, RV1 and RV2 by parts of the same ratings.'],
  ] as const) {
    await section(name).focus();
    await page.keyboard.type(text);
  }
  await section('Proof').focus();
  await page
    .getByRole('button', { name: /^Put in the reading/ })
    .first()
    .click();
  await section('Proof').focus();
  await page
    .getByRole('button', { name: /^Put in the photo/ })
    .first()
    .click();
  await page.keyboard.press('Control+s');
  const bar = () => page.locator('.save-bar p').textContent();
  await expect.poll(bar, { timeout: 15_000 }).toContain('saved');
  await page.getByRole('button', { name: 'Send to review' }).click();
  await page.waitForURL(/\/faults\/\d+$/);
}

/** Published by the senior; whoever searches finds it within a second. */
async function publish(senior: Page, searcher: Page) {
  await senior.goto(`${origin}/faults/review`);
  await senior.getByRole('link', { name: title }).click();
  await senior.getByRole('heading', { name: title }).waitFor();
  expect(await senior.locator('main').innerText()).toMatch(/\bOL\b/);
  expect(await senior.locator('main img').count()).toBeGreaterThan(0);
  await Promise.all([
    senior.waitForResponse((r) => r.request().method() === 'POST' && r.status() === 303),
    senior.getByRole('button', { name: 'Publish' }).click(),
  ]);
  const since = performance.now();
  const word = /, ([0-9a-f]{6}):/.exec(title)?.[1] ?? '';
  const find = async () => {
    const answer = await searcher.request.get(`${origin}/api/search?q=${word}`);
    return ((await answer.json()) as { total: number }).total;
  };
  await expect.poll(find, { interval: 50, timeout: 5_000 }).toBe(1);
  expect(performance.now() - since).toBeLessThan(SOON_MS + 100);
  await searcher.goto(`${origin}/faults?q=shorted+varistor+${word}`);
  await searcher.getByRole('link', { name: title }).first().waitFor();
}

test('a dead meter goes from the counter to a published fault note and back to its customer', async () => {
  const [counter, tech, senior, customer] = [
    await browser.someone(origin),
    await browser.someone(origin),
    await browser.someone(origin),
    await browser.someone(origin),
  ];

  // Counter: intake, receipt on screen and by mail, tag.
  await signIn(counter, 'counter');
  const serial = randomBytes(4).toString('hex');
  const number = await takeIn(counter, { maker: 'Lumeford', model: 'LM-90', serial });
  const [receipt] = await awaitLetters(email, 1);
  const code = /Claim code\s+([0-9A-Z-]+)/.exec(receipt?.text ?? '')?.[1] ?? '';
  expect(receipt?.text).toContain(number);
  expect(await counter.locator('.receipt-code').innerText()).toBe(code);
  await counter.goto(`${origin}/tickets/${number}/tag`);
  await counter.getByRole('img', { name: `Opens ticket ${number}` }).waitFor();

  // Technician: to the bench, cautions before readings, photo with pin, readings.
  await signIn(tech, 'tech');
  await tech.goto(`${origin}/tickets/${number}`);
  await tech.getByRole('button', { name: 'Take to the bench' }).click();
  await tech.getByText('Readings wait for the cautions').waitFor();
  for (const caution of ['Leads out', 'Battery out', 'Capacitors discharged']) {
    await tech.getByRole('checkbox', { name: new RegExp(`^${caution}`) }).click();
    await tech.getByRole('checkbox', { name: new RegExp(`^${caution}`), checked: true }).waitFor();
  }
  await tech.getByRole('grid', { name: 'Bench sheet' }).waitFor();
  await photograph(tech, number);
  await measure(tech);

  // Technician writes the note, senior publishes it, everybody finds it.
  await writeNote(tech);
  await signIn(senior, 'senior');
  await publish(senior, tech);

  // The next ticket of the same board under another label is shown the note.
  const label = { maker: 'Tessaly', model: 'T9', serial: `${serial}9` };
  const next = await takeIn(counter, label);
  await tech.goto(`${origin}/tickets/${next}`);
  await tech.locator('#fitting').getByRole('link', { name: title }).waitFor();

  // Estimate; the customer comes in by claim code, approves and writes; the shop answers.
  await tech.goto(`${origin}/tickets/${number}`);
  await tech.locator('summary', { hasText: 'Send estimate' }).click();
  await tech.getByLabel('Total with tax').fill('86,40');
  await tech.getByLabel(/What it covers/).fill('RT1, RV1, RV2, release check.');
  await tech.getByRole('button', { name: 'Send estimate', exact: true }).click();
  await tech.waitForLoadState('load');
  await customer.goto(`${origin}/`);
  await customer.getByLabel('Ticket number').fill(number);
  await customer.getByLabel('Claim code').fill(code.toLowerCase());
  await customer.getByRole('button', { name: 'Show my repair' }).click();
  const headline = 'We found the fault. Your answer is needed.';
  await customer.getByRole('heading', { name: headline }).waitFor();
  const picture = customer.locator('.photo-strip img');
  expect(await picture.count()).toBe(1);
  await picture.scrollIntoViewIfNeeded();
  await expect
    .poll(() => picture.evaluate((img: HTMLImageElement) => img.naturalHeight))
    .toBeGreaterThan(0);
  const internal = /RT1 open|Joren|Marit|tech@|counter@|4\.99M|0R8|Battery out|Fault note/;
  expect(await customer.content()).not.toMatch(internal);
  await customer.getByLabel('Write to the shop').fill('Please keep the old parts.');
  await customer.getByRole('button', { name: 'Send message' }).click();
  await customer.getByText('Your message is with the shop.').waitFor();
  await customer.getByRole('button', { name: 'Approve estimate' }).click();
  await customer.getByText('You approved the estimate.').first().waitFor();
  await counter.goto(`${origin}/queue?q=${number}`);
  await counter
    .getByRole('row', { name: new RegExp(number) })
    .getByText('message')
    .waitFor();
  await counter.getByRole('link', { name: number }).click();
  await counter.getByText('Please keep the old parts.').waitFor();
  await counter.getByLabel('To the customer').fill('We will.');
  await counter.getByRole('button', { name: 'Send message' }).click();
  await counter.waitForLoadState('load');
  await customer.reload();
  await customer.getByText('We will.').waitFor();
  expect(await customer.content()).not.toMatch(internal);

  expect(browser.heard()).toEqual({ said: [], left: [] });
});
