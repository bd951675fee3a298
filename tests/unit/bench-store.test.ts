import { describe, expect, it } from 'vitest';
import type { BenchReading } from '@/contracts/bench';
import { isStruck, EMPTY, type Cells } from '@/islands/bench-sheet/rows';
import { pasteWords } from '@/islands/bench-sheet/paste-report';
import { openSheet } from '@/islands/bench-sheet/sheet-store';
import { board, saved } from '../fixtures/bench-board';

type Sent = { method: string; path: string; version: string | null; body: Record<string, unknown> };
type Reply = { status: number; json?: unknown };

const problem = (status: number, more: object = {}): Reply => ({
  status,
  json: { type: '', title: '', status, detail: 'Words of the server.', ...more },
});

/** A sheet against a server that answers what the test says, or keeps readings like the real one. */
function sheetWith(
  readings: BenchReading[] = [],
  replies: (Reply | 'cut')[] = [],
  editable = true,
) {
  const sent: Sent[] = [];
  const held = new Map<string, BenchReading>();
  let keys = 0;
  let ids = 100;
  const keep = ({ method, path, body }: Sent): Reply => {
    if (method === 'DELETE') return { status: 204 };
    const id = Number(path.split('/').at(-1)) || (ids += 1);
    const known = held.get(String(body['clientKey'] ?? id));
    if (method === 'POST' && known) return { status: 201, json: known };
    const version = (readings.find((r) => r.id === id)?.version ?? known?.version ?? 0) + 1;
    const json = saved(id, { ...(body as Partial<BenchReading>), version });
    held.set(String(body['clientKey'] ?? id), json);
    held.set(String(id), json);
    return { status: method === 'POST' ? 201 : 200, json };
  };
  const store = openSheet({
    ticketNumber: '2612-0001',
    board,
    readings,
    editable,
    newClientKey: () => `key-${(keys += 1)}`,
    ask: async (path, { method = 'GET', headers, body }) => {
      const one: Sent = {
        method,
        path,
        version: new Headers(headers).get('if-match'),
        body: body ? (JSON.parse(String(body)) as Record<string, unknown>) : {},
      };
      sent.push(one);
      const scripted = replies.shift();
      const reply = scripted === undefined || scripted === 'cut' ? keep(one) : scripted;
      if (scripted === 'cut') throw new TypeError('connection lost');
      const text = reply.json === undefined ? null : JSON.stringify(reply.json);
      return new Response(text, { status: reply.status });
    },
  });
  const rows = () => store.snapshot().sheets['as-found'];
  const live = () => rows().filter((row) => !isStruck(row));
  const last = () => live().at(-1)!;
  const settle = () => new Promise((resolve) => setTimeout(resolve, 5));
  const write = (key: string, cells: Partial<Cells>) => store.write('as-found', key, cells);
  return { store, sent, rows, live, last, settle, write };
}

const whole: Cells = { ...EMPTY, from: 'V', to: 'P', position: 'volts', typed: 'OL' };

describe('saving a row', () => {
  it('waits until nothing is missing, sends it once, and puts an empty one after it', async () => {
    const { sent, live, last, settle, write } = sheetWith();
    const { key } = last();
    for (const cells of [{ from: 'V' }, { to: 'P' }, { position: 'volts' }]) write(key, cells);
    expect(sent).toEqual([]);
    write(key, { typed: 'OL' });
    expect(live().map(({ state }) => state.is)).toEqual(['saving', 'draft']);
    await settle();
    expect(sent.map(({ method }) => method)).toEqual(['POST']);
    expect(sent[0]?.body).toMatchObject({ clientKey: 'key-1', from: 'V', to: 'P', typed: 'OL' });
    expect(live()[0]).toMatchObject({ state: { is: 'saved' }, key });
    expect(last().cells).toEqual({ ...EMPTY, from: 'V', position: 'volts' });
  });

  it('sends a change made meanwhile after it, with the version of the first answer', async () => {
    const { sent, live, last, settle, write, store } = sheetWith();
    const { key } = last();
    write(key, whole);
    write(key, { typed: '1k1' });
    expect(sent).toHaveLength(1);
    await settle();
    expect(sent.map(({ method, version }) => [method, version])).toEqual([
      ['POST', null],
      ['PATCH', '"1"'],
    ]);
    expect(live()[0]?.saved).toMatchObject({ typed: '1k1', version: 2 });
    expect(store.snapshot().saves['as-found']).toBe(2);
  });

  it('keeps a row whose answer was lost, and makes no second one of it', async () => {
    const { sent, live, last, settle, write, store } = sheetWith([], ['cut']);
    write(last().key, whole);
    await settle();
    expect(live()[0]?.state).toEqual({ is: 'failed', words: 'The shop’s server does not answer.' });
    expect(store.unsaved()).toBe(true);
    write(live()[0]!.key, { typed: '1k3' });
    await settle();
    expect(sent.map(({ method, body }) => [method, body['clientKey'], body['typed']])).toEqual([
      ['POST', 'key-1', 'OL'],
      ['POST', 'key-1', '1k3'],
      ['PATCH', undefined, '1k3'],
    ]);
    expect(live()[0]).toMatchObject({ state: { is: 'saved' }, saved: { typed: '1k3' } });
    expect(store.unsaved()).toBe(false);
  });

  it('tries all failed rows again at once', async () => {
    const { live, last, settle, write, store } = sheetWith([], [{ status: 503 }, { status: 500 }]);
    write(last().key, whole);
    write(last().key, { ...whole, to: 'Q' });
    await settle();
    expect(live().map(({ state }) => state.is)).toEqual(['failed', 'failed', 'draft']);
    store.retryAll();
    await settle();
    expect(live().map(({ state }) => state.is)).toEqual(['saved', 'saved', 'draft']);
  });

  it.each([
    [problem(409), null],
    [problem(422, { errors: [{ path: 'typed', message: 'Wrong.' }] }), 'typed'],
    [problem(422, { errors: [{ path: 'part', message: 'Wrong.' }] }), 'from'],
    [problem(422, { errors: [{ path: 'lifted[2]', message: 'Wrong.' }] }), 'lifted'],
  ])('says in the server’s words why a row was refused (%#)', async (reply, field) => {
    const { live, last, settle, write } = sheetWith([], [reply]);
    write(last().key, whole);
    await settle();
    expect(live()[0]?.state).toEqual({
      is: 'refused',
      field,
      words: field === null ? 'Words of the server.' : 'Wrong.',
    });
  });

  it('saves nothing in a sheet that cannot be edited', async () => {
    const { sent, rows, settle, write } = sheetWith([saved(1)], [], false);
    expect(rows()).toHaveLength(1);
    write('r1', { typed: '5k' });
    await settle();
    expect(sent).toEqual([]);
  });

  it('offers no empty row once sixty readings stand', () => {
    const sixty = Array.from({ length: 60 }, (_, i) => saved(i + 1));
    expect(sheetWith(sixty).live()).toHaveLength(60);
    expect(sheetWith(sixty.slice(1)).live()).toHaveLength(60);
  });
});

describe('a clash', () => {
  const theirs = saved(1, { typed: '2k2', version: 4, by: 'Aleida' });
  const stale = problem(412, { current: theirs });

  it('shows both, and takes theirs when told so', async () => {
    const { live, settle, write, store } = sheetWith([saved(1)], [stale]);
    write('r1', { typed: '3k3' });
    await settle();
    expect(live()[0]).toMatchObject({
      state: { is: 'stale', theirs, doing: 'edit' },
      cells: { typed: '3k3' },
    });
    await store.settle('as-found', 'r1', 'theirs');
    expect(live()[0]).toMatchObject({ state: { is: 'saved' }, cells: { typed: '2k2' } });
  });

  it('writes over it from their version when told to keep mine', async () => {
    const { sent, live, settle, write, store } = sheetWith([saved(1)], [stale]);
    write('r1', { typed: '3k3' });
    await settle();
    await store.settle('as-found', 'r1', 'mine');
    expect(sent.at(-1)).toMatchObject({ method: 'PATCH', version: '"4"', body: { typed: '3k3' } });
    expect(live()[0]?.state.is).toBe('saved');
  });

  it('asks as well before it strikes what somebody changed', async () => {
    const { sent, rows, settle, store } = sheetWith([saved(1)], [stale]);
    await store.strike('as-found', 'r1');
    expect(rows()[0]?.state).toMatchObject({ is: 'stale', doing: 'strike' });
    await store.settle('as-found', 'r1', 'mine');
    await settle();
    expect(sent.map(({ method, version }) => [method, version])).toEqual([
      ['DELETE', '"1"'],
      ['DELETE', '"4"'],
    ]);
    expect(rows()[0]?.state.is).toBe('struck');
  });
});

describe('striking a row', () => {
  it('leaves a line to bring it back by, as a new reading in its old place', async () => {
    const { sent, rows, live, settle, store } = sheetWith([saved(1), saved(2, { to: 'Q' })]);
    await store.strike('as-found', 'r1');
    expect(rows().map(({ state }) => state.is)).toEqual(['struck', 'saved', 'draft']);
    expect(store.undo('as-found')).toBe('r1');
    await settle();
    expect(sent.map(({ method }) => method)).toEqual(['DELETE', 'POST']);
    expect(sent[1]?.body).toMatchObject({ place: 1, typed: 'OL', clientKey: 'key-1' });
    expect(live()[0]?.state.is).toBe('saved');
  });

  it('keeps one such line, and drops a row that says nothing without a trace', async () => {
    const { rows, last, store } = sheetWith([saved(1), saved(2, { to: 'Q' })]);
    await store.strike('as-found', 'r1');
    await store.strike('as-found', 'r2');
    expect(
      rows()
        .filter(isStruck)
        .map(({ key }) => key),
    ).toEqual(['r2']);
    await store.strike('as-found', last().key);
    expect(rows().filter(isStruck)).toEqual([]);
  });

  it('waits for a save that is under way', async () => {
    const { sent, rows, settle, write, store } = sheetWith([saved(1)]);
    write('r1', { typed: '5k' });
    void store.strike('as-found', 'r1');
    await settle();
    expect(sent.map(({ method, version }) => [method, version])).toEqual([
      ['PATCH', '"1"'],
      ['DELETE', '"2"'],
    ]);
    expect(rows()[0]?.state.is).toBe('struck');
  });

  it('counts a reading that is gone already as struck', async () => {
    const gone = problem(404, { detail: 'There is no such reading, or it is not open to you.' });
    const { rows, store } = sheetWith([saved(1)], [gone]);
    await store.strike('as-found', 'r1');
    expect(rows()[0]?.state.is).toBe('struck');
  });
});

describe('filling rows', () => {
  it('puts a proposed reading into the empty row', () => {
    const { store, live, last } = sheetWith([saved(1)]);
    const key = store.fillEntry('as-found', { ...EMPTY, from: 'P', to: 'COM', position: 'ohms' });
    expect(key).toBe(last().key);
    expect(live().at(-1)?.cells).toMatchObject({
      from: 'P',
      to: 'COM',
      position: 'ohms',
      typed: '',
    });
  });

  it('saves pasted rows that are whole and keeps the others to be corrected', async () => {
    const { store, sent, live, last, settle } = sheetWith();
    store.paste('as-found', last().key, 'from', {
      kind: 'rows',
      rows: [whole, { ...whole, from: 'v', to: 'q' }, { ...whole, typed: 'foo' }],
      lines: [1, 2, 3],
    });
    await settle();
    expect(sent.map(({ body }) => [body['from'], body['to']])).toEqual([
      ['V', 'P'],
      ['V', 'Q'],
    ]);
    expect(live().map(({ state }) => state.is)).toEqual(['saved', 'saved', 'draft', 'draft']);
    expect(live()[2]?.cells.typed).toBe('foo');
  });

  it('pastes a column downwards over the offered points of the repair', async () => {
    const { store, sent, settle } = sheetWith([saved(1), saved(2, { to: 'Q' })]);
    store.offer();
    const after = () => store.snapshot().sheets['after-repair'];
    expect(after().map(({ offered }) => offered)).toEqual([true, true, false]);
    store.paste('after-repair', after()[0]!.key, 'typed', {
      kind: 'column',
      values: ['1k1', '9M'],
    });
    await settle();
    expect(sent.map(({ body }) => [body['phase'], body['to'], body['typed']])).toEqual([
      ['after-repair', 'P', '1k1'],
      ['after-repair', 'Q', '9M'],
    ]);
    store.offer();
    expect(after().map(({ state, offered }) => [state.is, offered])).toEqual([
      ['saved', false],
      ['saved', false],
      ['draft', false],
    ]);
  });

  const lines = (n: number, without: number[] = []) => ({
    kind: 'rows' as const,
    rows: Array.from({ length: n }, (_, i) => ({
      ...whole,
      typed: without.includes(i + 1) ? '' : `${i + 1}`,
    })),
    lines: Array.from({ length: n }, (_, i) => i + 1),
  });
  const four = () => [1, 2, 3, 4].map((id) => saved(id));

  it('says how many pasted lines found no room, and which have no reading', async () => {
    const { store, live, last, settle } = sheetWith(four());
    store.paste('as-found', last().key, 'from', lines(81, [4, 9]));
    await settle();
    const report = store.snapshot().pasted['as-found'];
    expect(report).toEqual({ taken: 56, empty: [4, 9], beyond: 23 });
    expect(live()).toHaveLength(60);
    expect(report && pasteWords(report)).toBe(
      '56 rows taken; 25 lines not: 23 because the sheet holds 60 readings, no reading in lines 4, 9. Ctrl+Z takes the paste back.',
    );
  });

  it('says the same of a column that goes beyond the last row', () => {
    const { store, last } = sheetWith(Array.from({ length: 59 }, (_, i) => saved(i + 1)));
    const key = last().key;
    store.paste('as-found', key, 'typed', { kind: 'column', values: ['1k', '2k', '3k'] });
    expect(store.snapshot().pasted['as-found']).toEqual({ taken: 1, empty: [], beyond: 2 });
  });

  it('takes a paste back as one step, struck or saved or waiting', async () => {
    const { store, sent, rows, last, settle } = sheetWith(four(), [{ status: 503 }]);
    store.paste('as-found', last().key, 'from', lines(5));
    await settle();
    expect(rows().map(({ state }) => state.is)).toContain('failed');
    store.undo('as-found');
    await settle();
    expect(
      rows()
        .map(({ key }) => key)
        .slice(0, 4),
    ).toEqual(['r1', 'r2', 'r3', 'r4']);
    expect(rows()).toHaveLength(5);
    expect(rows().filter(isStruck)).toEqual([]);
    expect(sent.filter(({ method }) => method === 'DELETE')).toHaveLength(4);
    expect(store.snapshot().pasted['as-found']).toBeNull();
    expect(store.unsaved()).toBe(false);
  });

  it('takes it back also while its rows are being saved', async () => {
    const { store, rows, last, settle } = sheetWith(four());
    store.paste('as-found', last().key, 'from', lines(3));
    store.undo('as-found');
    await settle();
    await settle();
    expect(rows()).toHaveLength(5);
    expect(rows().filter(isStruck)).toEqual([]);
  });

  it('gives cells that a column was pasted over what they had', async () => {
    const { store, live, settle } = sheetWith(four());
    const before = live().map(({ cells }) => cells.typed);
    store.paste('as-found', 'r2', 'typed', { kind: 'column', values: ['5k', '6k'] });
    await settle();
    expect(live()[1]?.saved?.typed).toBe('5k');
    store.undo('as-found');
    await settle();
    expect(live().map(({ cells }) => cells.typed)).toEqual(before);
    expect(live()[1]?.saved?.typed).toBe(before[1]);
  });

  it('undoes by itself what was done by hand after a paste, and the paste no more', async () => {
    const { store, live, last, settle, write } = sheetWith(four());
    store.paste('as-found', last().key, 'from', lines(2));
    await settle();
    write(last().key, { ...whole, typed: '9k' });
    expect(store.snapshot().pasted['as-found']).toBeNull();
    expect(store.undo('as-found')).toBeNull();
    expect(live()).toHaveLength(8);
  });

  it('does not offer again what was struck', async () => {
    const { store } = sheetWith([saved(1)]);
    store.offer();
    const after = () => store.snapshot().sheets['after-repair'];
    await store.strike('after-repair', after()[0]!.key);
    store.offer();
    expect(after().filter(({ offered }) => offered)).toEqual([]);
  });
});
