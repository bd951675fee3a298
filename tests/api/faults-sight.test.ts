/** Who sees which note: in the list, by its address, on the pages. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { FaultRow } from '@/contracts/faults';
import { WRITERS, openFaultShop, type FaultShop, type Writer } from '../fixtures/fault-shop';

let shop: FaultShop;
const ids: Record<string, number> = {};
beforeAll(async () => {
  shop = await openFaultShop();
  const submitted = async (who: Writer, title: string) => {
    const note = await shop.draft(who, title);
    await shop.read(await shop.step(who, note, 'submit'));
    return note.id;
  };
  ids['own draft'] = (await shop.draft('tech', 'Quartz draft')).id;
  ids['other draft'] = (await shop.draft('other', 'Basalt draft')).id;
  ids['own review'] = await submitted('tech', 'Quartz review');
  ids['other review'] = await submitted('other', 'Basalt review');
  ids['published'] = (await shop.published('Granite published')).id;
  const retired = await shop.published('Granite retired');
  await shop.read(await shop.step('senior', retired, 'retire', 'No longer holds.'));
  ids['own retired'] = retired.id;
});
afterAll(() => shop?.close());

// From the table of the design: drafts are their author's and the seniors', notes in review the bench's.
const SEES: Record<Writer, string[]> = {
  counter: ['published'],
  tech: ['own draft', 'own review', 'other review', 'published', 'own retired'],
  other: ['other draft', 'own review', 'other review', 'published'],
  senior: Object.keys({ ...ids }),
  owner: [],
};
const sees = (who: Writer) =>
  who === 'senior' || who === 'owner' ? Object.keys(ids) : (SEES[who] ?? []);

test.each(WRITERS)('%s finds in the list what is open to them and nothing else', async (who) => {
  const page = await shop.call(who, 'GET', '/api/faults?limit=200');
  const { items } = await shop.read<{ items: FaultRow[] }>(page);
  const names = items.map((n) => Object.keys(ids).find((name) => ids[name] === n.id)).sort();
  expect(names).toEqual([...sees(who)].sort());
});

test.each(WRITERS)(
  '%s opens by address what is open to them; the rest is not there',
  async (who) => {
    for (const [name, id] of Object.entries(ids)) {
      const open = sees(who).includes(name);
      for (const path of [`/api/faults/${id}`, `/api/faults/${id}/revisions`, `/faults/${id}`]) {
        const answer = await shop.call(who, 'GET', path);
        expect(answer.status, `${name} at ${path}`).toBe(open ? 200 : 404);
        if (!open) expect(await answer.text()).not.toMatch(/Quartz|Basalt|Granite/);
      }
    }
  },
);

test.each(WRITERS)(
  '%s never reads a word of a hidden note, in search or on a page',
  async (who) => {
    const hidden = Object.keys(ids).filter((name) => !sees(who).includes(name));
    const words = ['Quartz draft', 'Basalt draft', 'Granite retired'];
    const shut = words.filter((_, i) =>
      hidden.includes(['own draft', 'other draft', 'own retired'][i] ?? ''),
    );
    const paths = [
      '/api/search?q=Quartz',
      '/api/search?q=Basalt',
      '/api/search?q=Granite',
      '/api/search/suggestions',
      '/api/faults?q=draft&format=csv',
      '/faults?q=draft',
      '/faults?q=Basalt',
      '/faults?state=draft',
      '/faults?state=retired',
      '/faults/review',
    ];
    for (const path of paths) {
      const text = await (await shop.call(who, 'GET', path)).text();
      for (const word of shut) expect(text, path).not.toContain(word);
      // The search holds what is published, for seniors too.
      if (path.startsWith('/api/search')) expect(text).not.toMatch(/draft|review|retired/);
    }
  },
);

test('the list narrows, sorts, pages without loss, and comes as a file', async () => {
  const titles = async (path: string, who: Writer = 'senior') => {
    const page = await shop.read<{ items: FaultRow[]; next: string | null }>(
      await shop.call(who, 'GET', path),
    );
    return { titles: page.items.map((n) => n.title), next: page.next };
  };
  expect((await titles('/api/faults?state=in-review&sort=title')).titles).toEqual([
    'Basalt review',
    'Quartz review',
  ]);
  expect((await titles('/api/faults?q=basalt&sort=-title')).titles).toEqual([
    'Basalt review',
    'Basalt draft',
  ]);
  const all: string[] = [];
  let cursor = '';
  do {
    const page = await titles(`/api/faults?limit=2&sort=-updated${cursor}`);
    all.push(...page.titles);
    cursor = page.next ? `&cursor=${encodeURIComponent(page.next)}` : '';
  } while (cursor);
  expect(new Set(all).size).toBe(Object.keys(ids).length);
  expect(all).toHaveLength(Object.keys(ids).length);
  await shop.draft('senior', 'Marked 100 % _ note', {
    symptoms: ['burnt', 'drifts'],
    partKind: 'mov',
  });
  const narrow = `symptom=drifts&kind=mov&board=${shop.boardIds.main}`;
  expect((await titles(`/api/faults?${narrow}`)).titles).toEqual(['Marked 100 % _ note']);
  expect((await titles('/api/faults?symptom=display')).titles).toEqual([]);
  // What LIKE would take for a pattern means itself.
  expect((await titles('/api/faults?q=100+%25+_')).titles).toEqual(['Marked 100 % _ note']);
  expect((await titles('/api/faults?q=_____')).titles).toEqual([]);
  const bad = await shop.call('senior', 'GET', '/api/faults?cursor=nonsense');
  expect(bad.status).toBe(422);
  const csv = await shop.call('counter', 'GET', '/api/faults', { headers: { accept: 'text/csv' } });
  expect(csv.headers.get('content-type')).toContain('text/csv');
  const lines = (await csv.text()).trim().split('\r\n');
  expect(lines).toHaveLength(2);
  expect(lines[1]).toContain('Granite published');
});

test('the review page shows what waits, each to those who may act on it', async () => {
  const page = async (who: Writer) => (await shop.call(who, 'GET', '/faults/review')).text();
  expect(await page('senior')).toContain('Quartz review');
  expect(await page('senior')).toContain('Basalt draft');
  expect(await page('other')).toContain('Basalt draft');
  expect(await page('other')).not.toContain('Quartz draft');
  expect((await shop.call('counter', 'GET', '/faults/review')).status).toBe(404);
});

test('who may not edit is led from the editor to the note, or nowhere', async () => {
  const editor = (who: Writer, name: string) =>
    shop.call(who, 'GET', `/faults/${ids[name] ?? 0}/edit`);
  expect((await editor('tech', 'own draft')).status).toBe(200);
  expect((await editor('tech', 'other draft')).status).toBe(404);
  const published = await editor('tech', 'published');
  expect([published.status, published.headers.get('location')]).toEqual([
    303,
    `/faults/${ids['published']}`,
  ]);
  expect((await editor('senior', 'published')).status).toBe(200);
  expect((await editor('counter', 'published')).status).toBe(404);
});
