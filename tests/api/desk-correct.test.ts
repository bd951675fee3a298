/** Putting right what was written down at intake: by whom, from which version, and what stays of it. */
import { and, asc, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { audit, users } from '@/db/schema/people';
import { customers, instruments } from '@/db/schema/shop';
import { readings, ticketEvents } from '@/db/schema/tickets';
import { reading } from '../fixtures/bench-shop';
import {
  mailbox,
  openDeskShop,
  problem,
  said,
  type DeskShop,
  type Problem,
} from '../fixtures/desk-shop';
import { SOON } from '../fixtures/soon';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

type Who = 'counter' | 'technician' | 'senior' | 'owner';
const patch = (number: string, version: number, json: unknown, who: Who = 'counter') =>
  shop.call(who, 'PATCH', `/api/tickets/${number}`, { json, version });
const corrected = async (number: string, json: unknown) =>
  said<{ version: number }>(await patch(number, (await shop.detail(number)).version, json));
const eventsOf = async (number: string) => {
  const { id } = await shop.ticket(number);
  return shop.db
    .select()
    .from(ticketEvents)
    .where(and(eq(ticketEvents.ticketId, id), eq(ticketEvents.kind, 'corrected')))
    .orderBy(asc(ticketEvents.id));
};
const unit = (serial: string, model = 'T9') => ({ maker: 'Tessaly', model, serial });
const path = (number: string) => `/tickets/${number}/edit`;
const page = async (number: string, who: Who = 'counter') =>
  (await shop.get(shop.cookies[who], path(number))).text();

/** The fields of the form as the page shows them. */
async function formOf(number: string): Promise<Record<string, string | string[]>> {
  const html = await page(number);
  const form = /<form[^>]*class="intake"[\s\S]*<\/form>/.exec(html)?.[0] ?? '';
  const fields: Record<string, string | string[]> = {};
  for (const [tag] of form.matchAll(/<input[^>]*>/g)) {
    const of = (name: string) => new RegExp(` ${name}="([^"]*)"`).exec(tag)?.[1];
    const name = of('name') ?? '';
    if (of('type') !== 'checkbox') fields[name] = of('value') ?? '';
    else if (/ checked/.test(tag)) {
      const list = name.slice(0, -2);
      fields[list] = [...((fields[list] as string[] | undefined) ?? []), of('value') ?? ''];
    }
  }
  for (const [, name, text] of form.matchAll(/<textarea[^>]*name="(\w+)"[^>]*>([^<]*)</g))
    fields[name ?? ''] = text ?? '';
  const incident = /<option value="([^"]*)" selected/.exec(form)?.[1];
  return { ...fields, incident: incident ?? '' };
}

describe('what was said', () => {
  test('is corrected in part, and the event and the audit log say what changed', async () => {
    const { number, claimCode } = await shop.taken({ instrument: unit('SAID'), condition: 'New' });
    const answer = await patch(number, 1, {
      symptoms: ['drifts', 'burnt'],
      incident: 'wet',
      accessories: ['leads'],
      accessoryText: 'a strap',
      condition: 'Cracked window',
      promisedOn: SOON,
    });
    expect(answer.status).toBe(200);
    expect(answer.headers.get('etag')).toBe('"2"');
    expect(await shop.detail(number)).toMatchObject({
      version: 2,
      symptoms: ['drifts', 'burnt'],
      incident: 'wet',
      accessories: ['leads'],
      accessoryText: 'a strap',
      condition: 'Cracked window',
      promisedOn: SOON,
      instrument: unit('SAID'),
    });
    const [event, ...more] = await eventsOf(number);
    expect(more).toEqual([]);
    expect(event).toMatchObject({ actorName: 'Marit Ooster', open: false });
    expect(event?.note).toContain('Condition “New” → “Cracked window”');
    expect(event?.note).toContain('Promised for nothing → ');
    expect(event?.note).not.toContain('Serial');
    const [line] = await shop.db
      .select()
      .from(audit)
      .where(eq(audit.object, `ticket:${number}`));
    expect(line).toMatchObject({ action: 'ticket.corrected', actorName: 'Marit Ooster' });
    expect(line?.detail).toMatchObject({ Condition: { from: 'New', to: 'Cracked window' } });
    const own = await shop.get(await shop.enter({ number, claimCode }), `/status/${number}`);
    expect(await own.text()).not.toMatch(/Cracked window|Corrected/);
  });

  test('unchanged leaves neither event nor version', async () => {
    const { number } = await shop.taken({ instrument: unit('SAME') });
    expect(await corrected(number, { instrument: unit('SAME'), condition: ' ' })).toEqual({
      version: 1,
    });
    expect(await eventsOf(number)).toEqual([]);
  });

  test.each<[string, unknown, string]>([
    ['no symptom left', { symptoms: [], symptomText: '' }, 'symptoms'],
    ['a promise gone by', { promisedOn: '2020-01-31' }, 'promisedOn'],
    ['no serial', { instrument: unit(' ') }, 'instrument.serial'],
    ['a bad e-mail', { customer: { version: 1, email: 'ilse@' } }, 'customer.email'],
    ['no name', { customer: { version: 1, name: ' ' } }, 'customer.name'],
    ['no version of the customer', { customer: { name: 'Ilse' } }, 'customer.version'],
  ])('%s is refused by its field', async (_what, json, field) => {
    const { number } = await shop.taken();
    const answer = await patch(number, 1, json);
    expect(answer.status).toBe(422);
    expect((await problem(answer)).errors?.map((e) => e.path)).toEqual([field]);
    expect((await shop.ticket(number)).version).toBe(1);
  });

  test('a promise that has passed stands while the rest is corrected', async () => {
    const { number } = await shop.taken();
    await shop.stand(number, 'on-the-bench', { promisedOn: '2020-01-31' });
    await corrected(number, { condition: 'Scratched', promisedOn: '2020-01-31' });
    expect(await shop.detail(number)).toMatchObject({ promisedOn: '2020-01-31' });
  });
});

describe('the customer', () => {
  test('is put right wherever they stand, with the account they sign in to', async () => {
    const first = await shop.taken({ customer: { name: 'Ilse Verhagen', email: mailbox() } });
    const { customer, contact } = await shop.detail(first.number);
    const second = await shop.taken({ customer: { id: customer.id } });
    const email = mailbox();
    const given = { name: 'Ilse Verhage', email, phone: '0123', address: 'Lane 2, Exampleton' };
    await corrected(first.number, { customer: { version: contact.version, ...given } });
    expect(await shop.detail(second.number)).toMatchObject({
      customer: { id: customer.id, name: 'Ilse Verhage' },
      contact: { email, phone: '0123', address: 'Lane 2, Exampleton', version: 2 },
    });
    const [account] = await shop.db.select().from(users).where(eq(users.customerId, customer.id));
    expect(account?.name).toBe('Ilse Verhage');
    await corrected(first.number, { customer: { version: 2, email: '', phone: '' } });
    const [row] = await shop.db.select().from(customers).where(eq(customers.id, customer.id));
    expect(row).toMatchObject({ email: null, phone: null, name: 'Ilse Verhage', version: 3 });
    const stale = await patch(second.number, 1, { customer: { version: 2, phone: '9' } });
    expect(stale.status).toBe(412);
  });
});

describe('the instrument', () => {
  test('misread is relabelled, with the board of its model', async () => {
    const { number } = await shop.taken({ instrument: unit('O0O', 'T-Unknown') });
    const before = await shop.detail(number);
    expect(before.board).toBeNull();
    await corrected(number, { instrument: unit('000') });
    expect(await shop.detail(number)).toMatchObject({
      instrument: { ...unit('000'), id: before.instrument.id },
      board: 'LB-40 rev C',
    });
  });

  test('that is another known one is put on the ticket, and the one that never was is gone', async () => {
    const known = await shop.taken({ instrument: unit('KNOWN') });
    const { instrument, customer } = await shop.detail(known.number);
    await shop.stand(known.number, 'handed-over');
    const { number } = await shop.taken({ instrument: unit('KNWON'), customer });
    await corrected(number, { instrument: unit('known') });
    expect((await shop.detail(number)).instrument).toEqual(instrument);
    const gone = await shop.db.select().from(instruments).where(eq(instruments.serial, 'KNWON'));
    expect(gone).toEqual([]);
  });

  test('with a history of its own keeps it when one ticket meant another', async () => {
    const old = await shop.taken({ instrument: unit('OLD') });
    const { customer, instrument } = await shop.detail(old.number);
    await shop.stand(old.number, 'handed-over');
    const { number } = await shop.taken({ instrument: unit('OLD'), customer });
    await corrected(number, { instrument: unit('NEW-ONE') });
    expect((await shop.detail(number)).instrument.id).not.toBe(instrument.id);
    expect((await shop.detail(old.number)).instrument).toEqual(instrument);
  });

  test('is refused where an intake would be: open elsewhere, or another’s', async () => {
    const open = await shop.taken({ instrument: unit('OPEN') });
    const theirs = await shop.taken({ instrument: unit('THEIRS'), customer: { name: 'Sytske' } });
    await shop.stand(theirs.number, 'handed-over');
    const { number } = await shop.taken();
    const first = await patch(number, 1, { instrument: unit('OPEN'), changedHands: true });
    expect(first.status).toBe(409);
    expect(((await first.json()) as { openTicket: string }).openTicket).toBe(open.number);
    const second = await patch(number, 1, { instrument: unit('THEIRS') });
    expect(second.status).toBe(409);
    expect((await problem(second)).detail).toContain('last brought by Sytske');
    await corrected(number, { instrument: unit('THEIRS'), changedHands: true });
    expect((await eventsOf(number))[0]?.note).toContain('it changed hands, before it was Sytske’s');
  });

  test('does not leave the board that readings were taken on', async () => {
    const { number } = await shop.taken();
    await shop.tick(number);
    const json = reading({ part: 'RT1', from: null, to: null });
    await said(await shop.call('technician', 'POST', `/api/tickets/${number}/readings`, { json }));
    const answer = await patch(number, 1, { instrument: unit('S', 'T-Other') });
    expect(answer.status).toBe(409);
    expect((await problem(answer)).errors?.[0]?.path).toBe('instrument.model');
    await shop.db.delete(readings).where(eq(readings.ticketId, (await shop.ticket(number)).id));
    await corrected(number, { instrument: unit('S', 'T-Other') });
    expect((await shop.detail(number)).board).toBeNull();
  });
});

describe('who, and from which version', () => {
  test('whoever takes in; a closed ticket a senior or the owner', async () => {
    const { number } = await shop.taken();
    for (const [i, who] of (['counter', 'technician', 'senior', 'owner'] as const).entries())
      expect((await patch(number, i + 1, { condition: `c${i}` }, who)).status, who).toBe(200);
    await shop.stand(number, 'handed-over');
    const form = await formOf(number).catch(() => ({}));
    for (const who of ['counter', 'technician'] as const) {
      expect((await patch(number, 5, { condition: 'x' }, who)).status, who).toBe(403);
      expect(await page(number, who)).toContain('a senior or the owner corrects it');
      const ticket = await shop.get(shop.cookies[who], `/tickets/${number}`);
      expect(await ticket.text()).not.toContain(path(number));
      const sent = await shop.form(shop.cookies[who], path(number), { ...form, do: 'correct' });
      expect([403, 422]).toContain(sent.status);
    }
    expect((await patch(number, 5, { condition: 'y' }, 'senior')).status).toBe(200);
    const ticket = await shop.get(shop.cookies.senior, `/tickets/${number}`);
    expect(await ticket.text()).toContain(`href="${path(number)}"`);
  });

  test('needs the version, and of two at once one is told', async () => {
    const { number } = await shop.taken();
    const none = await shop.call('counter', 'PATCH', `/api/tickets/${number}`, { json: {} });
    expect(none.status).toBe(428);
    const answers = await Promise.all(
      ['a', 'b', 'c'].map((condition) => patch(number, 1, { condition })),
    );
    expect(answers.map((a) => a.status).sort()).toEqual([200, 412, 412]);
    expect(await eventsOf(number)).toHaveLength(1);
  });
});

describe('the page', () => {
  test('shows what stands there, and saves it', async () => {
    const words = { symptomText: 'Smoke', condition: 'Cracked', accessories: ['leads', 'case'] };
    const { number } = await shop.taken({ ...words, instrument: unit('PAGE'), promisedOn: SOON });
    expect(await (await shop.get(shop.cookies.counter, `/tickets/${number}`)).text()).toContain(
      `href="${path(number)}"`,
    );
    const form = await formOf(number);
    expect(form).toMatchObject({ ...words, ...unit('PAGE'), promisedOn: SOON, version: '1' });
    const saved = await shop.form(shop.cookies.counter, path(number), {
      ...form,
      serial: 'PAGE-1',
      phone: '0800 77',
    });
    expect(saved.status).toBe(303);
    expect(saved.headers.get('location')).toBe(`/tickets/${number}#intake`);
    expect(await shop.detail(number)).toMatchObject({
      instrument: unit('PAGE-1'),
      contact: { phone: '0800 77' },
      ...words,
    });
  });

  test('keeps what was typed when somebody was quicker, and shows what they wrote', async () => {
    const { number } = await shop.taken({ instrument: unit('QUICK') });
    const form = await formOf(number);
    await corrected(number, { condition: 'Burnt jack' });
    const mine = { ...form, condition: 'Cracked', serial: 'QUICK-1' };
    const refused = await shop.form(shop.cookies.counter, path(number), mine);
    expect(refused.status).toBe(412);
    const html = await refused.text();
    expect(html).toContain('Somebody changed the ticket');
    expect(html).toContain('Stands there now: Burnt jack');
    expect(html).toMatch(/>Cracked<\/textarea>/);
    expect(html).toContain('value="QUICK-1"');
    expect(html).toMatch(/name="version" value="2"/);
    const again = await shop.form(shop.cookies.counter, path(number), { ...mine, version: '2' });
    expect(again.status).toBe(303);
    expect(await shop.detail(number)).toMatchObject({
      condition: 'Cracked',
      instrument: unit('QUICK-1'),
    });
  });

  test('names the field that is wrong, and the ticket that is open', async () => {
    const open = await shop.taken({ instrument: unit('ELSE') });
    const { number } = await shop.taken();
    const form = await formOf(number);
    const bad = await shop.form(shop.cookies.counter, path(number), { ...form, email: 'a@' });
    expect(bad.status).toBe(422);
    expect(await bad.text()).toContain('id="email-error"');
    const taken = await shop.form(shop.cookies.counter, path(number), { ...form, ...unit('ELSE') });
    expect(taken.status).toBe(409);
    expect(await taken.text()).toContain(`href="/tickets/${open.number}"`);
    const gone = await shop.get(shop.cookies.counter, path('9912-9999'));
    expect(gone.status).toBe(404);
  });
});

describe('the board of a model', () => {
  test('is named by a senior, once, and its open tickets stand on it', async () => {
    const label = { maker: 'Ostrel', model: 'P2' };
    const first = await shop.taken({ instrument: { ...label, serial: '1' } });
    const closed = await shop.taken({ instrument: { ...label, serial: '2' } });
    await shop.stand(closed.number, 'handed-over');
    expect(await page(first.number)).not.toContain('Name the board');
    const html = await page(first.number, 'senior');
    const board = /<option value="(\d+)"[^>]*>\s*LB-40 rev C/.exec(html)?.[1] ?? '';
    const form = { do: 'board', board };
    const name = (who: Who, fields: Record<string, string>) =>
      shop.form(shop.cookies[who], path(first.number), fields);
    expect((await name('technician', form)).status).toBe(403);
    for (const wrong of ['', '999999']) {
      const refused = await name('senior', { ...form, board: wrong });
      expect(refused.status).toBe(422);
      expect(await refused.text()).toContain('id="board-error"');
    }
    expect((await name('senior', form)).status).toBe(303);
    expect(await shop.detail(first.number)).toMatchObject({ board: 'LB-40 rev C', version: 2 });
    expect((await shop.detail(closed.number)).board).toBeNull();
    expect((await eventsOf(first.number)).map((e) => e.note)).toEqual(['Board: LB-40 rev C']);
    const lines = await shop.db.select().from(audit).where(eq(audit.action, 'model.board-named'));
    expect(lines).toHaveLength(1);
    expect((await name('senior', form)).status).toBe(409);
    const next = await shop.taken({ instrument: { ...label, serial: '3' } });
    expect((await shop.detail(next.number)).board).toBe('LB-40 rev C');
    const told = (await (await patch(next.number, 9, {})).json()) as Problem;
    expect(told.status).toBe(412);
  });
});
