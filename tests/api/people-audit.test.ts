/** The audit log and the outbox, as the owner sees them. */
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { outbox } from '@/db/schema/outbox';
import { audit } from '@/db/schema/people';
import { record, THE_SHOP } from '@/server/audit/commands';
import { cookieOf, openStaffShop, type StaffShop } from '../fixtures/staff';

let shop: StaffShop;
let cookie: string;
beforeAll(async () => {
  shop = await openStaffShop({ env: { WORKER: '0' } });
  const owner = await shop.hire('owner', { name: 'Zita Owner' });
  cookie = cookieOf(await shop.signIn(owner.email));
  const at = (text: string) => new Date(text);
  // 23:30 UTC on 1 July is 01:30 on 2 July by the shop's clock, Amsterdam.
  for (const [action, object, moment] of [
    ['price.changed', 'part:RV1', '2026-07-01T12:00:00Z'],
    ['price.changed', 'part:RV2', '2026-07-01T23:30:00Z'],
    ['price.dropped', 'part:RV2', '2026-07-02T12:00:00Z'],
    ['priceless', 'part:100%', '2026-07-03T12:00:00Z'],
  ] as const)
    await record(shop.db, { actor: THE_SHOP, action, object, detail: { minor: 1 } }, at(moment));
});
afterAll(() => shop?.close());

const get = (path: string) => shop.ask({ method: 'GET', path, headers: { cookie } });
type Line = { action: string; object: string; by: { id: number | null; name: string } };
const list = async (query: string) => {
  const answer = await get(`/api/audit?${query}`);
  return ((await answer.json()) as { items: Line[] }).items;
};
const found = async (query: string) => (await list(query)).map(({ object }) => object);

test.each([
  ['action=price.changed', ['part:RV2', 'part:RV1']],
  ['action=price.', ['part:RV2', 'part:RV2', 'part:RV1']],
  ['q=rv1', ['part:RV1']],
  ['q=100%25', ['part:100%']],
  ['q=the+shop', ['part:100%', 'part:RV2', 'part:RV2', 'part:RV1']],
  ['from=2026-07-02&to=2026-07-02', ['part:RV2', 'part:RV2']],
  ['from=2026-07-01&to=2026-07-01', ['part:RV1']],
  ['to=2026-06-30', []],
  ['action=price.&sort=at', ['part:RV1', 'part:RV2', 'part:RV2']],
])('%s finds %j', async (query, objects) => {
  expect(await found(query)).toEqual(objects);
});

test('a line says who did it; what nobody did has no key', async () => {
  const [line] = await list('action=priceless');
  expect(line?.by).toEqual({ id: null, name: 'the shop' });
});

test('lines cannot be changed or removed, not even by statement', async () => {
  const mine = eq(audit.action, 'priceless');
  const refused = { cause: { sqlMessage: 'audit is append-only' } };
  await expect(
    shop.db.update(audit).set({ actorName: 'somebody else' }).where(mine),
  ).rejects.toMatchObject(refused);
  await expect(shop.db.delete(audit).where(mine)).rejects.toMatchObject(refused);
  expect((await list('action=priceless')).length).toBe(1);
});

test('paged by cursor every line comes once', async () => {
  const objects: string[] = [];
  for (let cursor = ''; ;) {
    const answer = await get(`/api/audit?action=price.&limit=1${cursor && `&cursor=${cursor}`}`);
    const page = (await answer.json()) as { items: Line[]; next: string | null };
    objects.push(...page.items.map(({ object }) => object));
    if (page.next === null) break;
    cursor = page.next;
  }
  expect(objects).toEqual(['part:RV2', 'part:RV2', 'part:RV1']);
});

test('the file holds what the filter shows', async () => {
  const text = await (await get('/audit?action=price.&sort=at&format=csv')).text();
  const lines = text.replace('\ufeff', '').trimEnd().split('\r\n');
  expect(lines[0]).toBe('at,by,action,object,detail,request');
  expect(lines.length).toBe(4);
  expect(lines[1]).toBe(
    '2026-07-01T12:00:00.000Z,the shop,price.changed,part:RV1,"{""minor"":1}",',
  );
});

test.each(['from=tomorrow', 'to=2026-13-01', 'by=zero', 'sort=action', 'limit=9999'])(
  'the log refuses %s by its name',
  async (query) => {
    const answer = await get(`/api/audit?${query}`);
    expect(answer.status).toBe(422);
    expect(await answer.json()).toMatchObject({ errors: [{ path: query.split('=')[0] }] });
  },
);

test('the page shows the lines with their filter', async () => {
  const html = await (await get('/audit?action=price.dropped')).text();
  expect(html).toMatch(/<option value="price\.dropped" selected/);
  expect(html).toContain('part:RV2');
  expect(html).not.toContain('part:RV1');
});

test('the page leaves sign-ins out unless asked, says how many, and so does its file', async () => {
  const signIns = await list('action=session.opened');
  expect(signIns.length).toBeGreaterThan(0);
  const page = async (query = '') => (await get(`/audit${query}`)).text();
  const html = await page();
  expect(html).toMatch(/<option value="but-sign-ins" selected/);
  const rows = (text: string) => text.replace(/<select[\s\S]*?<\/select>/g, '');
  expect(rows(html)).not.toMatch(/>\s*session\.opened/);
  expect(html).toContain('price.dropped');
  const said = signIns.length === 1 ? '1 sign-in is' : `${signIns.length} sign-ins are`;
  expect(html.replace(/\s+/g, ' ')).toContain(`${said} left out.`);
  expect(rows(await page('?action='))).toMatch(/>\s*session\.opened/);
  expect(await page('?action=')).not.toContain('left out.');
  expect(await page('?format=csv')).not.toContain('session.opened');
  expect(await page('?format=csv&action=')).toContain('session.opened');
  expect(await found('action=but-sign-ins&q=zita')).toEqual([]);
});

const HOUR = 3_600_000;
async function job(onceKey: string, more: Partial<typeof outbox.$inferInsert>) {
  const now = new Date();
  const row = { kind: 'mail', payload: 'zqsealed', onceKey, dueAt: now, createdAt: now, ...more };
  const [made] = await shop.db.insert(outbox).values(row).$returningId();
  return made?.id ?? 0;
}
const row = async (id: number) => (await shop.db.select().from(outbox).where(eq(outbox.id, id)))[0];
const retry = (id: number) =>
  shop.ask({ method: 'POST', path: '/outbox', form: { id: String(id) }, headers: { cookie } });

test('the outbox shows what waits and what was laid aside, with the error and never the payload', async () => {
  const dead = new Date();
  await job('a1', { lastError: 'zqaside 550 no such <mailbox>', deadAt: dead, attempts: 10 });
  await job('a2', { lastError: 'zqwaiting connection refused', attempts: 3 });
  await job('a3', { lastError: 'zqdone', doneAt: new Date() });
  const html = await (await get('/outbox')).text();
  expect(html).toContain('zqaside 550 no such &lt;mailbox&gt;');
  expect(html).toContain('zqwaiting connection refused');
  expect(html).not.toContain('zqdone');
  expect(html).not.toContain('zqsealed');
});

test('a job laid aside gets its tries anew, and a line in the log', async () => {
  const id = await job('b1', { lastError: 'down', deadAt: new Date(), attempts: 10 });
  const answer = await retry(id);
  expect([answer.status, answer.headers.get('location')]).toEqual([303, '/outbox?done=retry']);
  const after = await row(id);
  expect(after).toMatchObject({ attempts: 0, deadAt: null, payload: 'zqsealed' });
  expect(Math.abs((after?.dueAt.getTime() ?? 0) - Date.now())).toBeLessThan(60_000);
  expect(await found('action=outbox.retried')).toEqual([`job:${id}`]);
});

test('a job that pauses long after a failed try is tried at once', async () => {
  const dueAt = new Date(Date.now() + HOUR);
  const id = await job('c1', { lastError: 'down', attempts: 9, dueAt });
  expect((await retry(id)).status).toBe(303);
  expect((await row(id))?.dueAt.getTime()).toBeLessThan(Date.now() + 1000);
});

test.each([
  [
    'one that may be in a worker’s hands',
    { lastError: 'down', dueAt: new Date(Date.now() + 50_000) },
  ],
  ['one that never failed', { dueAt: new Date(Date.now() + HOUR) }],
  ['one that is done', { lastError: 'down', doneAt: new Date(), deadAt: new Date() }],
])('%s is not tried again', async (what, more) => {
  const id = await job(`d ${what}`, { attempts: 2, ...more });
  const before = await row(id);
  expect((await retry(id)).status).toBe(404);
  expect(await row(id)).toEqual(before);
});
