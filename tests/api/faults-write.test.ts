import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { FaultDetail, Revision, RevisionRow } from '@/contracts/faults';
import { faultRevisions, faultSteps } from '@/db/schema/faults';
import { eq } from 'drizzle-orm';
import { openFaultShop, wholeBody, words, type FaultShop } from '../fixtures/fault-shop';

let shop: FaultShop;
beforeAll(async () => {
  shop = await openFaultShop();
});
afterAll(() => shop?.close());

type Problem = { status: number; detail: string; errors?: { path: string; message: string }[] };
const problem = async (answer: Response) => (await answer.json()) as Problem;
const revisionsOf = async (who: 'tech' | 'senior' | 'counter', id: number) => {
  const page = await shop.call(who, 'GET', `/api/faults/${id}/revisions`);
  return (await shop.read<{ items: RevisionRow[] }>(page)).items;
};

describe('a draft', () => {
  test('is written, saved again, and every save is a revision', async () => {
    const answer = await shop.call('tech', 'POST', '/api/faults', { json: shop.input('RT1 open') });
    expect(answer.status).toBe(201);
    const made = (await answer.json()) as FaultDetail;
    expect(answer.headers.get('location')).toBe(`/api/faults/${made.id}`);
    expect(answer.headers.get('etag')).toBe('"1"');
    expect(made).toMatchObject({
      state: 'draft',
      revision: 1,
      author: 'Joren Vaal',
      mayEdit: true,
    });
    const saved = await shop.save('tech', made, shop.input('RT1 open, RV1 too'));
    expect(saved.status).toBe(200);
    expect(await shop.get('tech', made.id)).toMatchObject({
      title: 'RT1 open, RV1 too',
      revision: 2,
      version: 2,
    });
    expect((await revisionsOf('tech', made.id)).map((r) => r.title)).toEqual([
      'RT1 open, RV1 too',
      'RT1 open',
    ]);
    const first = await shop.call('tech', 'GET', `/api/faults/${made.id}/revisions/1`);
    expect(await shop.read<Revision>(first)).toMatchObject({
      title: 'RT1 open',
      body: wholeBody('RT1 open'),
    });
  });

  test('may be unfinished, but not be sent to review so', async () => {
    const body = { symptom: [words('x')], cause: [], proof: [], repair: [] };
    const made = await shop.draft('tech', 'half', { boardId: null, body });
    const refused = await shop.step('tech', made, 'submit');
    expect(refused.status).toBe(422);
    expect((await problem(refused)).errors?.map((e) => e.path)).toEqual([
      'boardId',
      'body.cause',
      'body.proof',
      'body.repair',
    ]);
    expect((await shop.get('tech', made.id)).state).toBe('draft');
  });

  test('sent twice with one key is one note; with another text it is refused', async () => {
    const headers = { 'idempotency-key': 'once' };
    const send = (title: string) =>
      shop.call('tech', 'POST', '/api/faults', { json: shop.input(title), headers });
    const [first, second] = [await send('once only'), await send('once only')];
    const ids = [
      (await shop.read<FaultDetail>(first)).id,
      (await shop.read<FaultDetail>(second)).id,
    ];
    expect(ids[0]).toBe(ids[1]);
    expect(second.headers.get('idempotency-replayed')).toBe('true');
    expect((await send('another')).status).toBe(422);
  });
});

describe('what cannot be saved names its field', () => {
  test.each<[string, Record<string, unknown>, string]>([
    ['no title', { title: '  ' }, 'title'],
    ['a board that is not there', { boardId: 999_999 }, 'boardId'],
    ['a ticket that is not there', { ticket: '2612-9999' }, 'ticket'],
    ['a symptom of its own', { symptoms: ['haunted'] }, 'symptoms[0]'],
    ['a kind of its own', { partKind: 'flux' }, 'partKind'],
    ['a field of its own', { state: 'published' }, ''],
    ['a body that is text', { body: '<p>x</p>' }, 'body'],
    [
      'a photo that is not there',
      {
        body: {
          ...wholeBody('x'),
          proof: [{ type: 'photo', attrs: { id: 'a'.repeat(22), caption: '' } }],
        },
      },
      'body.proof',
    ],
    [
      'a link by script',
      {
        body: {
          ...wholeBody('x'),
          cause: [
            {
              type: 'paragraph',
              content: [
                {
                  type: 'text',
                  text: 'x',
                  marks: [{ type: 'link', attrs: { href: 'javascript:1' } }],
                },
              ],
            },
          ],
        },
      },
      'body.cause[0].content[0].marks[0].attrs.href',
    ],
  ])('%s', async (_name, more, path) => {
    const answer = await shop.call('tech', 'POST', '/api/faults', { json: shop.input('t', more) });
    expect(answer.status).toBe(422);
    expect((await problem(answer)).errors?.[0]?.path).toBe(path);
  });

  test('lists nested without end, and bodies without end, are refused and not read', async () => {
    const deep = '{"type":"bulletList","content":[{"type":"listItem","content":['.repeat(3_000);
    const raw = `{"title":"t","body":{"symptom":[${deep}`;
    const post = (body: string) =>
      fetch(`${shop.app.origin}/api/faults`, {
        method: 'POST',
        headers: { cookie: shop.cookies.tech, 'content-type': 'application/json' },
        body,
      });
    expect((await post(raw)).status).toBe(400);
    const closed = `${raw}${']}]}'.repeat(3_000)}],"cause":[],"proof":[],"repair":[]}}`;
    expect((await post(closed)).status).toBe(422);
    expect((await post(`{"title":"${'x'.repeat(300_000)}"}`)).status).toBe(413);
  });
});

describe('two who write one note', () => {
  test('the later save is refused with both versions, and nothing is overwritten', async () => {
    const made = await shop.draft('tech', 'shared');
    expect((await shop.save('senior', made, shop.input('by the senior'))).status).toBe(200);
    const mine = shop.input('by the author');
    const refused = await shop.save('tech', made, mine);
    expect(refused.status).toBe(412);
    const both = (await refused.json()) as { current: FaultDetail; given: typeof mine };
    expect(both.current).toMatchObject({ title: 'by the senior', revision: 2, version: 2 });
    expect(both.given).toMatchObject({ title: 'by the author', body: wholeBody('by the author') });
    expect((await shop.get('tech', made.id)).title).toBe('by the senior');
    const again = await shop.save('tech', { id: made.id, version: both.current.version }, mine);
    expect(again.status).toBe(200);
  });

  test('of twenty saves at once one is taken, and one revision written', async () => {
    const made = await shop.draft('tech', 'raced');
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, i) => shop.save('tech', made, shop.input(`try ${i}`))),
    );
    const statuses = answers.map((a) => a.status).sort();
    expect(statuses).toEqual([200, ...Array.from({ length: 19 }, () => 412)]);
    const rows = await shop.db
      .select()
      .from(faultRevisions)
      .where(eq(faultRevisions.noteId, made.id));
    expect(rows.map((r) => r.revision).sort()).toEqual([1, 2]);
  });

  test('of ten steps at once one is taken, and one event left', async () => {
    const made = await shop.draft('tech', 'stepped');
    const answers = await Promise.all(
      Array.from({ length: 10 }, () => shop.step('senior', made, 'publish')),
    );
    expect(answers.filter((a) => a.status === 200)).toHaveLength(1);
    for (const a of answers) expect([200, 409, 412]).toContain(a.status);
    const rows = await shop.db.select().from(faultSteps).where(eq(faultSteps.noteId, made.id));
    expect(rows).toHaveLength(1);
  });

  test('a save and a step from one version do not both pass', async () => {
    const made = await shop.draft('tech', 'crossed');
    const [saved, moved] = await Promise.all([
      shop.save('tech', made, shop.input('crossed again')),
      shop.step('tech', made, 'submit'),
    ]);
    expect([saved.status, moved.status].filter((s) => s === 200)).toHaveLength(1);
  });

  test('without the version nothing is changed', async () => {
    const made = await shop.draft('tech', 'no version');
    const put = await shop.call('tech', 'PUT', `/api/faults/${made.id}`, { json: shop.input('x') });
    expect(put.status).toBe(428);
  });
});

describe('the life of a note', () => {
  test('a step repeated is refused, and leaves nothing', async () => {
    const made = await shop.draft('tech', 'twice');
    const { version } = await shop.read<{ version: number }>(
      await shop.step('tech', made, 'submit'),
    );
    expect((await shop.step('tech', made, 'submit')).status).toBe(409);
    expect((await shop.step('tech', { id: made.id, version }, 'submit')).status).toBe(409);
  });

  test('a reviewer sends it back with the reason; the author takes it up again', async () => {
    const made = await shop.draft('tech', 'back and forth');
    const sent = await shop.read<{ version: number }>(await shop.step('tech', made, 'submit'));
    const at = { id: made.id, version: sent.version };
    expect((await shop.save('tech', at, shop.input('x'))).status).toBe(403);
    expect((await shop.step('senior', at, 'send-back')).status).toBe(422);
    const back = await shop.step('senior', at, 'send-back', 'Which reading proves it?');
    expect(await shop.read(back)).toMatchObject({ state: 'draft' });
    expect((await shop.get('tech', made.id)).mayEdit).toBe(true);
  });

  test('a correction is seen by its writers until it is published', async () => {
    const note = await shop.published('first words');
    const saved = await shop.save('senior', note, shop.input('better words'));
    const corrected = await shop.read<FaultDetail>(saved);
    expect(corrected).toMatchObject({ correction: true, revision: 2, publishedRevision: 1 });
    for (const who of ['counter', 'tech', 'other'] as const) {
      const seen = await shop.get(who, note.id);
      expect(seen).toMatchObject({
        title: 'first words',
        shown: 1,
        correction: false,
        revision: 1,
      });
      expect(JSON.stringify(seen)).not.toContain('better words');
    }
    expect((await revisionsOf('counter', note.id)).map((r) => r.revision)).toEqual([1]);
    const hidden = await shop.call('counter', 'GET', `/api/faults/${note.id}/revisions/2`);
    expect(hidden.status).toBe(404);
    await shop.read(await shop.step('senior', corrected, 'publish'));
    expect(await shop.get('counter', note.id)).toMatchObject({ title: 'better words', shown: 2 });
    expect((await revisionsOf('counter', note.id)).map((r) => r.revision)).toEqual([2, 1]);
  });

  test('a correction that is dropped leaves what was published', async () => {
    const note = await shop.published('stays');
    const wrong = await shop.read<FaultDetail>(
      await shop.save('senior', note, shop.input('does not stay', { boardId: shop.boardIds.side })),
    );
    await shop.read(await shop.step('senior', wrong, 'drop'));
    const after = await shop.get('senior', note.id);
    expect(after).toMatchObject({ title: 'stays', correction: false, revision: 3 });
    expect(after.board?.id).toBe(shop.boardIds.main);
    expect(after.publishedAt).toBe((await shop.get('counter', note.id)).publishedAt);
  });

  test('what was written stays written: revisions and steps cannot be changed in the database', async () => {
    const note = await shop.published('kept');
    const of = (table: typeof faultRevisions | typeof faultSteps) => eq(table.noteId, note.id);
    const text = shop.db.update(faultRevisions).set({ title: 'forged' }).where(of(faultRevisions));
    await expect(text).rejects.toThrow();
    const event = shop.db.update(faultSteps).set({ actorName: 'forged' }).where(of(faultSteps));
    await expect(event).rejects.toThrow();
  });
});
