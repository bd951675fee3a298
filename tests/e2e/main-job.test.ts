/** The whole main job in a browser: four people in four contexts, from intake to the customer's page. */
import { setTimeout as pause } from 'node:timers/promises';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { openDatabase } from '@/db/client';
import { writeBoard } from '@/server/demo/boards';
import { demoBoards } from '@/server/demo/content';
import { DEMO_PASSWORD, seedPeople } from '@/server/demo/people';
import { startApp, type TestApp } from '../fixtures/app';
import { awaitLetters } from '../fixtures/inbox';
import { cameraJpeg } from '../fixtures/pictures';

let app: TestApp;
let browser: Browser;
const said: string[] = [];
const left: string[] = [];

beforeAll(async () => {
  app = await startApp();
  const { db, pool } = openDatabase(app.databaseUrl, 4);
  const now = new Date();
  await seedPeople(db, now);
  for (const board of demoBoards()) await writeBoard(db, board, now);
  await pool.end();
  browser = await chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-sync'],
  });
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await app?.stop();
});

async function someone(): Promise<{ context: BrowserContext; page: Page }> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 } });
  const page = await context.newPage();
  page.setDefaultTimeout(20_000);
  page.on('console', (line) => {
    if (['error', 'warning'].includes(line.type())) said.push(line.text());
  });
  page.on('pageerror', (error) => said.push(error.message));
  page.on('request', (request) => {
    const { protocol, hostname } = new URL(request.url());
    if (protocol.startsWith('http') && hostname !== '127.0.0.1') left.push(request.url());
  });
  return { context, page };
}

async function signIn(page: Page, who: string) {
  await page.goto(`${app.origin}/sign-in`);
  await page.getByLabel('E-mail').fill(`${who}@meterwright.example`);
  await page.getByLabel('Password').fill(DEMO_PASSWORD);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

async function takeIn(page: Page, instrument: { maker: string; model: string; serial: string }) {
  await page.goto(`${app.origin}/intake`);
  await page.locator('#name').fill('Wietske Lammers');
  await page.locator('#email').fill('wietske@customer.example');
  await page.locator('#maker').fill(instrument.maker);
  await page.locator('#model').fill(instrument.model);
  await page.locator('#serial').fill(instrument.serial);
  await page.getByLabel('Ohms reads OL or nothing').focus();
  await page.keyboard.press('Space');
  await page.getByLabel('What happened').selectOption('mains-on-ohms');
  await page.getByRole('button', { name: 'Take in and print receipt' }).focus();
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/tickets\/\d{4}-\d{4}\/receipt$/);
  return /\/tickets\/([\d-]+)\//.exec(page.url())?.[1] ?? '';
}

/** Fills the field under the cursor and goes on as the sheet's keys do. */
async function typeReading(page: Page, row: number, cells: [string, string, string, string]) {
  const from = page.getByRole('gridcell', { name: new RegExp(`^Row ${row}, From`) });
  await from.focus();
  for (const [i, text] of cells.entries()) {
    await page.keyboard.type(text);
    await page.keyboard.press(i === 3 ? 'Enter' : 'Tab');
  }
}

test('a dead meter goes from the counter to a published fault note and back to its customer', async () => {
  const counter = await someone();
  const tech = await someone();
  const senior = await someone();
  const customer = await someone();

  // Counter: intake, receipt on screen and by mail, tag.
  await signIn(counter.page, 'counter');
  const number = await takeIn(counter.page, { maker: 'Lumeford', model: 'LM-90', serial: '70012' });
  const [receipt] = await awaitLetters('wietske@customer.example', 1);
  const code = /Claim code\s+([0-9A-Z-]+)/.exec(receipt?.text ?? '')?.[1] ?? '';
  expect(receipt?.text).toContain(number);
  expect(await counter.page.locator('.receipt-code').innerText()).toBe(code);
  await counter.page.goto(`${app.origin}/tickets/${number}/tag`);
  await counter.page.getByRole('img', { name: `Opens ticket ${number}` }).waitFor();

  // Technician: to the bench, cautions, photo, pin, readings.
  await signIn(tech.page, 'tech');
  await tech.page.goto(`${app.origin}/tickets/${number}`);
  await tech.page.getByRole('button', { name: 'Take to the bench' }).click();
  await tech.page.getByText('Readings wait for the cautions').waitFor();
  for (const caution of ['Leads out', 'Battery out', 'Capacitors discharged']) {
    await tech.page.getByRole('checkbox', { name: new RegExp(`^${caution}`) }).click();
    await tech.page.waitForLoadState('load');
  }
  await tech.page.getByRole('grid', { name: 'Bench sheet' }).waitFor();
  await tech.page
    .getByRole('button', { name: 'Choose photos' })
    .and(tech.page.locator(':enabled'))
    .waitFor();
  const photo = {
    name: 'front.jpg',
    mimeType: 'image/jpeg',
    buffer: await cameraJpeg(4000, 3000, 6),
  };
  await tech.page.getByLabel('Photo files').setInputFiles([photo]);
  const stage = tech.page.getByRole('application');
  await stage.waitFor({ timeout: 60_000 });
  const list = await tech.page.request.get(`${app.origin}/api/tickets/${number}/photos`);
  const [shown] = (
    (await list.json()) as { items: { id: string; width: number; height: number }[] }
  ).items;
  expect(shown && shown.width < shown.height).toBe(true);
  const served = await tech.page.request.get(`${app.origin}/api/photos/${shown?.id}/full`);
  const { exif, orientation } = await sharp(await served.body()).metadata();
  expect([exif, orientation]).toEqual([undefined, undefined]);
  await stage.focus();
  await tech.page.keyboard.press('p');
  await tech.page.keyboard.press('Enter');
  await tech.page.keyboard.type('RT1');
  await tech.page.keyboard.press('Enter');
  await tech.page.locator('.pin-list').getByText('RT1').first().waitFor();
  await tech.page.getByLabel('The customer sees this photo').check();

  const suspects = tech.page.locator('#suspects');
  await typeReading(tech.page, 1, ['V', 'P', 'volts', 'OL']);
  await suspects.getByRole('group', { name: 'RT1 open' }).waitFor();
  await typeReading(tech.page, 2, ['P', 'M1', 'volts', '0R8']);
  await suspects.getByRole('group', { name: 'RV1 short' }).waitFor();
  await typeReading(tech.page, 3, ['P', 'IN', 'ohms', '1k2']);
  await typeReading(tech.page, 4, ['V', 'N1', 'volts', '4.99M']);
  await suspects.getByText('from 4 readings').waitFor();
  await suspects.getByRole('group', { name: 'RT1 open' }).waitFor();
  await suspects.getByRole('group', { name: 'RV1 short' }).waitFor();

  // Technician: the note; senior: review and publication.
  await tech.page.getByRole('link', { name: 'Write a fault note from this ticket' }).click();
  const section = (page: Page, name: string) => page.getByRole('textbox', { name, exact: true });
  await section(tech.page, 'Repair').waitFor();
  await tech.page.getByLabel('Title').fill('Ohms dead after mains: RT1 open, RV1 shorted');
  for (const [name, text] of [
    ['Symptom', 'Ohms shows OL with the leads shorted.'],
    ['Cause', 'Mains on ohms opened RT1 and shorted RV1.'],
    ['Repair', 'Replace RT1, RV1 and RV2 by parts of the same ratings.'],
  ] as const) {
    await section(tech.page, name).focus();
    await tech.page.keyboard.type(text);
  }
  await section(tech.page, 'Proof').focus();
  await tech.page
    .getByRole('button', { name: /^Put in the reading/ })
    .first()
    .click();
  await tech.page.keyboard.press('Control+s');
  await expect
    .poll(() => tech.page.locator('.save-bar p').textContent(), { timeout: 15_000 })
    .toContain('saved');
  await tech.page.getByRole('button', { name: 'Send to review' }).click();
  await signIn(senior.page, 'senior');
  await senior.page.goto(`${app.origin}/faults/review`);
  await senior.page.getByRole('link', { name: /^Ohms dead after mains/ }).click();
  await senior.page.getByRole('button', { name: 'Publish' }).click();
  await senior.page.waitForLoadState('load');
  await pause(1000);
  await tech.page.goto(`${app.origin}/faults?q=shorted+varistor`);
  await tech.page
    .getByRole('link', { name: /^Ohms dead after mains/ })
    .first()
    .waitFor();

  // The next ticket of the same board under another label is shown the note.
  const next = await takeIn(counter.page, { maker: 'Tessaly', model: 'T9', serial: '5521' });
  await tech.page.goto(`${app.origin}/tickets/${next}`);
  await tech.page
    .locator('#fitting')
    .getByRole('link', { name: /^Ohms dead after mains/ })
    .waitFor();

  // Estimate; the customer comes in by claim code, approves and writes.
  await tech.page.goto(`${app.origin}/tickets/${number}`);
  await tech.page.locator('summary', { hasText: 'Send estimate' }).click();
  await tech.page.getByLabel('Total with tax').fill('86,40');
  await tech.page.getByLabel(/What it covers/).fill('RT1, RV1, RV2, release check.');
  await tech.page.getByRole('button', { name: 'Send estimate', exact: true }).click();
  await tech.page.waitForLoadState('load');
  await customer.page.goto(`${app.origin}/`);
  await customer.page.getByLabel('Ticket number').fill(number);
  await customer.page.getByLabel('Claim code').fill(code.toLowerCase());
  await customer.page.getByRole('button', { name: 'Show my repair' }).click();
  await customer.page
    .getByRole('heading', { name: 'We found the fault. Your answer is needed.' })
    .waitFor();
  expect(await customer.page.locator('.photo-strip img').count()).toBe(1);
  expect(await customer.page.content()).not.toMatch(/RT1 open|Joren|tech@|4\.99M/);
  await customer.page.getByLabel('Write to the shop').fill('Please keep the old parts.');
  await customer.page.getByRole('button', { name: 'Send message' }).click();
  await customer.page.getByText('Your message is with the shop.').waitFor();
  await customer.page.getByRole('button', { name: 'Approve estimate' }).click();
  await customer.page.getByText('You approved the estimate.').first().waitFor();
  await counter.page.goto(`${app.origin}/tickets/${number}`);
  await counter.page.getByText('Please keep the old parts.').waitFor();
  await counter.page.getByLabel('To the customer').fill('We will.');
  await counter.page.getByRole('button', { name: 'Send message' }).click();
  await customer.page.reload();
  await customer.page.getByText('We will.').waitFor();

  expect(said).toEqual([]);
  expect(left).toEqual([]);
});
