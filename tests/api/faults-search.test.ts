import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { models } from '@/db/schema/shop';
import type { SearchAnswer } from '@/contracts/search';
import { startApp, type TestApp } from '../fixtures/app';
import { ask } from '../fixtures/ask';
import { openFaultShop, words, wholeBody, type FaultShop } from '../fixtures/fault-shop';

let shop: FaultShop;
let second: TestApp;
beforeAll(async () => {
  shop = await openFaultShop();
  second = await startApp({
    databaseName: shop.app.databaseName,
    env: { TRUST_PROXY: '1', S3_BUCKET: shop.app.bucket },
  });
});
afterAll(async () => {
  await second?.stop();
  await shop?.close();
});

const search = async (query: string, app: Pick<TestApp, 'origin'> = shop.app) => {
  const headers = { cookie: shop.cookies.counter };
  const answer = await ask(app, { method: 'GET', path: `/api/search?${query}`, headers });
  return shop.read<SearchAnswer>(answer);
};
const titles = (found: SearchAnswer) => found.items.map((n) => n.title.map((p) => p.text).join(''));

/** Milliseconds until a process answers as wanted; the other one has been asked before, so its index is warm. */
async function seenAfter(
  query: string,
  wanted: (found: SearchAnswer) => boolean,
  app: Pick<TestApp, 'origin'> = second,
): Promise<number> {
  const started = performance.now();
  while (performance.now() - started < 5_000) {
    if (wanted(await search(query, app))) return performance.now() - started;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  return Infinity;
}

describe('another process', () => {
  test('finds a note within a second of its publication, its correction too, and loses a retired one', async () => {
    expect((await search('q=tourmaline', second)).total).toBe(0);
    const note = await shop.published('Tourmaline in the jack');
    expect(await seenAfter('q=tourmaline', (f) => f.total === 1)).toBeLessThan(1_000);

    const saved = await shop.read<{ id: number; version: number }>(
      await shop.save('senior', note, shop.input('Obsidian in the jack')),
    );
    expect((await search('q=obsidian', second)).total).toBe(0);
    const out = await shop.read<{ version: number }>(await shop.step('senior', saved, 'publish'));
    expect(await seenAfter('q=obsidian', (f) => f.total === 1)).toBeLessThan(1_000);
    expect((await search('q=tourmaline', second)).total).toBe(0);

    const at = { id: note.id, version: out.version };
    await shop.read(await shop.step('senior', at, 'retire', 'No longer holds.'));
    expect(await seenAfter('q=obsidian', (f) => f.total === 0)).toBeLessThan(1_000);
  });

  test('finds the notes of a board under a label that was added meanwhile', async () => {
    await shop.published('Feldspar on the board');
    expect((await search('q=Zirconia', second)).total).toBe(0);
    await shop.db.insert(models).values({
      maker: 'Zirconia',
      name: 'Z1',
      boardId: shop.boardIds.main,
      createdAt: new Date(),
    });
    expect(
      await seenAfter('q=Zirconia', (f) => titles(f).includes('Feldspar on the board')),
    ).toBeLessThan(1_000);
  });
});

describe('what is found', () => {
  beforeAll(async () => {
    const body = {
      ...wholeBody('x'),
      cause: [words('The varistor RV1 leaks after a surge of 1.1 kΩ.')],
    };
    await shop.published('Beryl ohms low', { partKind: 'mov', symptoms: ['drifts'], body });
    await shop.published('Beryl amps dead', {
      partKind: 'fuse',
      symptoms: ['dead-on-amps', 'burnt'],
    });
    await shop.published('Beryl display', { boardId: shop.boardIds.side, symptoms: ['display'] });
    await shop.published('Beryl for any board', { boardId: null, partKind: 'mov' });
    expect(await seenAfter('q=beryl', (f) => f.total === 4, shop.app)).toBeLessThan(1_000);
  });

  test.each([
    'VDR leaky',
    'varister leeks',
    'metal oxide varistor',
    'mov 1k1',
    'RV1 surge',
    'Tessaly T9 varistor',
  ])('%j leads to the note', async (q) => {
    expect(titles(await search(`q=${encodeURIComponent(q)}`))[0]).toBe('Beryl ohms low');
  });

  test('counts of each facet leave its own choice out and the others in', async () => {
    const counts = (found: SearchAnswer) => ({
      boards: Object.fromEntries(found.facets.board.map((f) => [f.label, f.count])),
      kinds: Object.fromEntries(found.facets.kind.map((f) => [f.value, f.count])),
      symptoms: Object.fromEntries(found.facets.symptom.map((f) => [f.value, f.count])),
    });
    expect(counts(await search('q=beryl'))).toEqual({
      boards: { 'LB-22 rev C': 1, 'LB-40 rev C': 2 },
      kinds: { mov: 2, fuse: 1 },
      symptoms: { 'dead-on-amps': 1, burnt: 1, drifts: 1, display: 1 },
    });
    const narrowed = await search(`q=beryl&board=${shop.boardIds.main}&kind=mov`);
    expect(titles(narrowed)).toEqual(['Beryl ohms low']);
    expect(counts(narrowed)).toEqual({
      boards: { 'LB-40 rev C': 1 },
      kinds: { mov: 1, fuse: 1 },
      symptoms: { drifts: 1 },
    });
    const symptom = await search('q=beryl&symptom=display');
    expect([titles(symptom), symptom.facets.symptom.length]).toEqual([['Beryl display'], 4]);
  });

  test('when no note has all the words, those with some are shown and said to be so', async () => {
    const found = await search('q=beryl+hinge+snowflake');
    expect(found.all).toBe(false);
    expect(found.total).toBeGreaterThan(0);
  });

  test('pages follow each other without loss, in the order asked for', async () => {
    const all: string[] = [];
    let cursor = '';
    do {
      const page = await search(`q=beryl&sort=title&limit=2${cursor}`);
      expect(page.total).toBe(4);
      all.push(...titles(page));
      cursor = page.next ? `&cursor=${page.next}` : '';
    } while (cursor);
    expect(all).toEqual([
      'Beryl amps dead',
      'Beryl display',
      'Beryl for any board',
      'Beryl ohms low',
    ]);
  });

  test('markup in a note is words in the search, on its page and in the list', async () => {
    const hostile = '<img src=x onerror=alert(1)> malachite <script>alert(2)</script>';
    const note = await shop.published(hostile, { body: wholeBody(hostile) });
    const whole = (found: SearchAnswer) => titles(found).join() === hostile;
    expect(await seenAfter('q=malachite', whole, shop.app)).toBeLessThan(1_000);
    for (const path of ['/faults?q=malachite', `/faults/${note.id}`, '/faults?state=published']) {
      const html = await (await shop.call('counter', 'GET', path)).text();
      expect(html, path).not.toMatch(/<img src=x|<script>alert/);
      expect(html, path).toContain('&lt;img src=x');
    }
  });

  test('what cannot be searched for finds nothing, and a bad narrowing is refused', async () => {
    expect((await search('q=%3F%21')).total).toBe(0);
    for (const query of [
      'kind=flux',
      'symptom=x',
      'board=-1',
      `q=${'x'.repeat(201)}`,
      'sort=best%20ever',
    ]) {
      const answer = await shop.call('counter', 'GET', `/api/search?${query}`);
      expect(answer.status, query).toBe(422);
    }
    // The page forgives a mistyped address.
    expect((await shop.call('counter', 'GET', '/faults?kind=flux&page=-3&sort=x')).status).toBe(
      200,
    );
  });
});
