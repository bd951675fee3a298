import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { BenchReading, Suspects } from '@/contracts/bench';
import { startApp, type TestApp } from '../fixtures/app';
import { openBenchShop, reading, type BenchShop, type Who } from '../fixtures/bench-shop';

let app: TestApp;
let shop: BenchShop;
beforeAll(async () => {
  app = await startApp();
  shop = await openBenchShop(app);
});
afterAll(async () => {
  await shop.close();
  await app.stop();
});

const sheet = (number: string) => `/api/tickets/${number}/readings`;
type Problem = { detail: string; errors?: { path: string }[]; current?: BenchReading };

async function add(number: string, more: Record<string, unknown> = {}, who: Who = 'technician') {
  return shop.call(who, 'POST', sheet(number), { json: reading(more) });
}
async function added(number: string, more: Record<string, unknown> = {}) {
  const answer = await add(number, more);
  expect(answer.status).toBe(201);
  return (await answer.json()) as BenchReading;
}
async function rowsOf(number: string) {
  const answer = await shop.call('technician', 'GET', sheet(number));
  return ((await answer.json()) as { items: BenchReading[] }).items;
}
async function problemOf(answer: Response) {
  return { status: answer.status, ...((await answer.json()) as Problem) };
}
async function suspectsOf(number: string, phase = 'as-found') {
  const answer = await shop.call(
    'technician',
    'GET',
    `/api/tickets/${number}/suspects?phase=${phase}`,
  );
  expect(answer.status).toBe(200);
  return (await answer.json()) as Suspects;
}

describe('entering a reading', () => {
  it('keeps it as typed, with the number and the resolution it meant', async () => {
    const number = await shop.ticket();
    const row = await added(number, { typed: ' 4.990M ' });
    expect(row).toMatchObject({
      typed: '4.990M',
      value: 4_990_000,
      resolution: 1000,
      by: 'Noor',
      version: 1,
    });
    expect(await rowsOf(number)).toEqual([row]);
  });

  it('answers the same row to the same client key, also when it was changed meanwhile', async () => {
    const number = await shop.ticket();
    const clientKey = randomUUID();
    const first = await added(number, { clientKey });
    const again = await added(number, { clientKey, typed: '1k2' });
    expect(again).toEqual(first);
    expect(await rowsOf(number)).toHaveLength(1);
  });

  it('makes one row of the same client key sent eight times at once', async () => {
    const number = await shop.ticket();
    const json = reading();
    const answers = await Promise.all(
      Array.from({ length: 8 }, () => shop.call('technician', 'POST', sheet(number), { json })),
    );
    expect(answers.map(({ status }) => status)).toEqual(Array(8).fill(201));
    expect(await rowsOf(number)).toHaveLength(1);
  });

  it('waits for the cautions', async () => {
    const number = await shop.ticket({ cautions: false });
    const refused = await problemOf(await add(number));
    expect(refused.status).toBe(409);
    expect(refused.detail).toContain('cautions');
    expect(await rowsOf(number)).toEqual([]);
  });

  it('ends with the ticket', async () => {
    const number = await shop.ticket({ stage: 'handed-over' });
    const refused = await problemOf(await add(number));
    expect(refused.status).toBe(409);
    expect(refused.detail).toContain('closed');
  });

  it.each([
    ['typed', { typed: '1,600' }],
    ['typed', { typed: 'five' }],
    ['typed', { typed: '' }],
    ['from', { from: null }],
    ['to', { to: null }],
    ['to', { to: 'V' }],
    ['phase', { phase: 'before' }],
    ['clientKey', { clientKey: 'one' }],
    ['lifted', { lifted: Array.from({ length: 11 }, (_, i) => `R${i}`) }],
  ])('names %s when it is wrong', async (path, more) => {
    const number = await shop.ticket();
    const refused = await problemOf(await add(number, more));
    expect(refused.status).toBe(422);
    expect(refused.errors?.map((e) => e.path)).toEqual([path]);
  });

  it('names both readings that an ambiguous text could have', async () => {
    const refused = await problemOf(await add(await shop.ticket(), { typed: '1,600' }));
    expect(refused.detail).toBe('"1,600" given: 1.600 or 1600; type one of them.');
  });

  it('holds sixty readings a phase, and still answers the sixtieth again', async () => {
    const number = await shop.ticket();
    for (let place = 0; place < 59; place++) await added(number, { place });
    const last = reading({ place: 59 });
    const both = await Promise.all([
      shop.call('technician', 'POST', sheet(number), { json: last }),
      add(number, { place: 60 }),
      add(number, { place: 61 }),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual([201, 413, 413]);
    expect(await rowsOf(number)).toHaveLength(60);
    const rows = await rowsOf(number);
    const kept = rows.find(({ place }) => place >= 59);
    const { by: _by, id: _id, value: _value, resolution: _res, version: _v, ...same } = kept!;
    const repeat = await shop.call('technician', 'POST', sheet(number), { json: same });
    expect(repeat.status).toBe(201);
    expect((await add(number, { phase: 'after-repair' })).status).toBe(201);
  });
});

describe('correcting and striking a reading', () => {
  const { clientKey: _, ...body } = reading({ typed: '1k2' });

  it('takes the version it was made from, once', async () => {
    const number = await shop.ticket();
    const { id } = await added(number);
    const path = `${sheet(number)}/${id}`;
    const edited = await shop.call('technician', 'PATCH', path, { json: body, version: 1 });
    expect(edited.status).toBe(200);
    expect(edited.headers.get('etag')).toBe('"2"');
    expect(await edited.json()).toMatchObject({ typed: '1k2', value: 1200, version: 2 });

    const stale = await problemOf(
      await shop.call('senior', 'PATCH', path, { json: { ...body, typed: '9k' }, version: 1 }),
    );
    expect(stale.status).toBe(412);
    expect(stale.current).toMatchObject({ typed: '1k2', version: 2 });
    expect((await rowsOf(number))[0]?.typed).toBe('1k2');
  });

  it('needs a version at all', async () => {
    const number = await shop.ticket();
    const { id } = await added(number);
    const path = `${sheet(number)}/${id}`;
    expect((await shop.call('technician', 'PATCH', path, { json: body })).status).toBe(428);
    expect((await shop.call('technician', 'DELETE', path)).status).toBe(428);
  });

  it('strikes only what was seen', async () => {
    const number = await shop.ticket();
    const { id } = await added(number);
    const path = `${sheet(number)}/${id}`;
    await shop.call('technician', 'PATCH', path, { json: body, version: 1 });
    expect((await shop.call('technician', 'DELETE', path, { version: 1 })).status).toBe(412);
    expect((await shop.call('technician', 'DELETE', path, { version: 2 })).status).toBe(204);
    expect((await shop.call('technician', 'DELETE', path, { version: 2 })).status).toBe(404);
    expect(await rowsOf(number)).toEqual([]);
  });

  it('knows a reading by its own ticket alone', async () => {
    const [one, other] = [await shop.ticket(), await shop.ticket()];
    const { id } = await added(one);
    const path = `${sheet(other)}/${id}`;
    expect((await shop.call('technician', 'PATCH', path, { json: body, version: 1 })).status).toBe(
      404,
    );
    expect((await shop.call('technician', 'DELETE', path, { version: 1 })).status).toBe(404);
    expect(await rowsOf(one)).toHaveLength(1);
  });
});

describe('who may', () => {
  it('lets the counter read the sheet, not write it, and shows customers nothing', async () => {
    const number = await shop.ticket();
    const { id } = await added(number);
    const tries: [Who | null, string, string, number][] = [
      ['counter', 'GET', sheet(number), 200],
      ['counter', 'POST', sheet(number), 403],
      ['counter', 'DELETE', `${sheet(number)}/${id}`, 403],
      ['customer', 'GET', sheet(number), 403],
      ['customer', 'GET', `/api/tickets/${number}/suspects`, 403],
      [null, 'GET', sheet(number), 401],
      [null, 'POST', sheet(number), 401],
      ['technician', 'GET', sheet('2612-9999'), 404],
    ];
    for (const [who, method, path, status] of tries) {
      const json = method === 'POST' ? reading() : undefined;
      const answer = await shop.call(who, method, path, { json, version: 1 });
      expect([who, method, path, answer.status]).toEqual([who, method, path, status]);
    }
  });
});

describe('what the sheet says', () => {
  it('flags the open PTC and a shorted varistor on the demo board, with the reading that says so', async () => {
    const number = await shop.ticket();
    // LB-40: RT1 is 1.1 kΩ from V to P; RV1 and RV2 stand in series from P to COM, M1 between them. At volts
    // nothing else leads from P to the divider.
    await added(number, { from: 'V', to: 'P', position: 'volts', typed: 'OL' });
    await added(number, { from: 'P', to: 'M1', position: 'volts', typed: '0R8', place: 1 });
    const { diagnosis, expected, said, unused, alone } = await suspectsOf(number);
    expect(unused).toEqual([]);
    expect(alone).toEqual([]);
    const standing = (ref: string) => diagnosis?.parts.find((p) => p.ref === ref);
    expect(standing('RT1')).toMatchObject({ standing: 'suspect' });
    expect(standing('RT1')?.modes.open).toBeGreaterThan(0.9);
    expect(standing('RV1')).toMatchObject({ standing: 'suspect' });
    expect(standing('RV1')?.modes.short).toBeGreaterThan(0.8);
    expect(diagnosis?.hypotheses[0]?.faults).toEqual([
      { ref: 'RT1', mode: 'open' },
      { ref: 'RV1', mode: 'short' },
    ]);
    // 1.1 kΩ in parallel with the megohms of the divider.
    expect(expected[0]?.ohms).toBeCloseTo(1100, -1);
    expect(said.find(({ ref }) => ref === 'RT1')?.words).toBe(
      'V to P reads OL; healthy it would be 1.1 kΩ.',
    );
  });

  it('takes a reading on a drawn part as one between its nets', async () => {
    const [points, part] = [await shop.ticket(), await shop.ticket()];
    await added(points, { from: 'V', to: 'P', typed: 'OL' });
    await added(part, { from: null, to: null, part: 'RT1', typed: 'OL' });
    const [one, other] = [await suspectsOf(points), await suspectsOf(part)];
    expect(other.diagnosis?.hypotheses).toEqual(one.diagnosis?.hypotheses);
  });

  it('judges a part outside the network alone', async () => {
    const number = await shop.ticket();
    await added(number, { from: null, to: null, part: 'U2', typed: '120R', position: null });
    const { diagnosis, alone } = await suspectsOf(number);
    expect(diagnosis).toBeNull();
    expect(alone).toMatchObject([{ ref: 'U2', kind: 'ic-pin', verdict: 'inconclusive' }]);
    expect(alone[0]?.next).toBe('Lift one lead and measure again.');
  });

  it('says of a reading why it is not used', async () => {
    const number = await shop.ticket();
    await added(number, { to: 'NOWHERE' });
    await added(number, { from: null, to: null, part: 'R99', place: 1 });
    await added(number, { position: 'ice', place: 2 });
    const { unused } = await suspectsOf(number);
    expect(unused.map(({ reason }) => reason)).toEqual([
      'NOWHERE is no net of the board’s network.',
      'R99 is not in the board file: add it there, or name two points.',
      'ice is no switch position of this board.',
    ]);
  });

  it('keeps the phases apart', async () => {
    const number = await shop.ticket();
    await added(number, { position: 'volts', typed: 'OL' });
    await added(number, { position: 'volts', phase: 'after-repair', typed: '1k1' });
    const open = ({ diagnosis }: Suspects) =>
      diagnosis?.parts.find(({ ref }) => ref === 'RT1')?.modes.open ?? 1;
    expect(open(await suspectsOf(number))).toBeGreaterThan(0.9);
    expect(open(await suspectsOf(number, 'after-repair'))).toBeLessThan(0.01);
  });

  it('has nothing to say without a board', async () => {
    const number = await shop.ticket({ board: null });
    await added(number);
    const { diagnosis, unused } = await suspectsOf(number);
    expect(diagnosis).toBeNull();
    expect(unused).toHaveLength(1);
  });
});
