import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DiagnosisAnswer } from '@/contracts/compute';
import { startApp, type TestApp } from '../fixtures/app';
import { openBenchShop, type BenchShop } from '../fixtures/bench-shop';

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

type Part = Record<string, unknown>;
type Reading = Record<string, unknown>;
type Answer = {
  status: number;
  body: { errors?: { path: string; message: string }[] } & Record<string, unknown>;
};

/** The example that the API's description prints. */
const parts: Part[] = [
  { ref: 'RT1', kind: 'ptc', nets: ['VIN', 'N1'], ohms: 1100, tolerance: 0.2 },
  { ref: 'RV1', kind: 'mov', nets: ['N1', 'COM'] },
  { ref: 'R1', kind: 'resistor', nets: ['VIN', 'N2'], ohms: 240_000, tolerance: 0.01 },
  { ref: 'S1', kind: 'contact', nets: ['N1', 'OHM'], closed: ['ohms'] },
];
const open: Reading = {
  from: 'VIN',
  to: 'COM',
  position: 'ohms',
  value: 'OL',
  accuracy: { percent: 0.8, counts: 3 },
  resolution: 10,
  overRange: 60_000_000,
  lifted: [],
};
const asked = (more: { parts?: unknown; readings?: unknown; positions?: unknown } = {}) => ({
  network: { positions: more.positions ?? ['volts', 'ohms'], parts: more.parts ?? parts },
  readings: more.readings ?? [open],
  incident: 'mains-on-ohms',
  limit: 20,
});

async function send(ask: { json?: unknown; raw?: string }): Promise<Answer> {
  const answer = await shop.call('technician', 'POST', '/api/diagnosis', ask);
  return { status: answer.status, body: (await answer.json()) as Answer['body'] };
}
const pathsOf = ({ body }: Answer) => (body.errors ?? []).map(({ path }) => path);

describe('POST /api/diagnosis', () => {
  it('answers the printed example in the printed shape', async () => {
    const { status, body } = await send({ json: asked() });
    expect(status).toBe(200);
    expect(DiagnosisAnswer.strict().safeParse(body).error).toBeUndefined();
    expect(Object.keys(body).sort()).toEqual(
      ['doubtful', 'entropy', 'groups', 'healthy', 'hypotheses', 'next', 'parts', 'reasons'].sort(),
    );
  });

  it('ranks the open PTC first in the printed example', async () => {
    const { body } = await send({ json: asked() });
    expect(DiagnosisAnswer.parse(body).hypotheses[0]?.faults).toEqual([
      { ref: 'RT1', mode: 'open' },
    ]);
  });

  it('is sure of it once the reading across it is over range', async () => {
    const across = { ...open, to: 'N1' };
    const { body } = await send({ json: asked({ readings: [open, across] }) });
    const { hypotheses, parts: standings, healthy } = DiagnosisAnswer.parse(body);
    expect(hypotheses[0]?.faults).toEqual([{ ref: 'RT1', mode: 'open' }]);
    const ptc = standings.find(({ ref }) => ref === 'RT1');
    expect(ptc?.standing).toBe('suspect');
    expect(ptc?.modes.open).toBeGreaterThan(0.9);
    expect(healthy).toBeLessThan(0.01);
  });

  it('fills in what may be left out', async () => {
    const network = {
      parts: [
        { ref: 'R1', kind: 'resistor', nets: ['A', 'B'], ohms: 1000 },
        { ref: 'RV1', kind: 'mov', nets: ['A', 'B'] },
      ],
    };
    const { status, body } = await send({
      json: { network, readings: [{ from: 'A', to: 'B', value: 1000 }] },
    });
    expect(status).toBe(200);
    const { healthy, hypotheses } = DiagnosisAnswer.parse(body);
    expect(healthy).toBeGreaterThan(hypotheses[0]?.probability ?? 1);
  });

  it('takes 200 parts and 60 readings, and no more of either', async () => {
    const chain = (count: number) =>
      Array.from({ length: count }, (_, i) => ({
        ref: `R${i}`,
        kind: 'resistor',
        nets: [`N${i}`, `N${i + 1}`],
        ohms: 1000 + i,
      }));
    const many = (count: number) =>
      Array.from({ length: count }, () => ({ from: 'N0', to: 'N2', value: 2000 }));
    const ask = (p: number, r: number) =>
      send({ json: { network: { parts: chain(p) }, readings: many(r) } });

    expect((await ask(200, 60)).status).toBe(200);
    const parts201 = await ask(201, 1);
    expect([parts201.status, pathsOf(parts201)]).toEqual([413, ['network.parts']]);
    const readings61 = await ask(2, 61);
    expect([readings61.status, pathsOf(readings61)]).toEqual([413, ['readings']]);
  });

  it('says too many before it says what else is wrong', async () => {
    const wrong = Array.from({ length: 201 }, () => ({ ref: '', kind: 'valve' }));
    expect((await send({ json: asked({ parts: wrong }) })).status).toBe(413);
  });
});

describe('a diagnosis request that is not right', () => {
  const cases: [string, unknown, string[]][] = [
    ['an unknown kind', { parts: [{ ...parts[0], kind: 'valve' }] }, ['network.parts[0].kind']],
    ['a duplicate reference', { parts: [...parts, parts[2]] }, ['network.parts[4].ref']],
    ['negative ohms', { parts: [{ ...parts[0], ohms: -5 }] }, ['network.parts[0].ohms']],
    [
      'a resistor without ohms',
      { parts: [{ ...parts[2], ohms: undefined }] },
      ['network.parts[0].ohms'],
    ],
    [
      'a tolerance of one',
      { parts: [{ ...parts[0], tolerance: 1 }] },
      ['network.parts[0].tolerance'],
    ],
    [
      'both ends on one net',
      { parts: [{ ...parts[0], nets: ['A', 'A'] }] },
      ['network.parts[0].nets'],
    ],
    [
      'an unknown position of a contact',
      { parts: [{ ...parts[3], closed: ['amps'] }] },
      ['network.parts[0].closed[0]'],
    ],
    ['a position named twice', { positions: ['ohms', 'ohms'] }, ['network.positions[1]']],
    ['no part', { parts: [] }, ['network.parts']],
    ['an unknown net in From', { readings: [{ ...open, from: 'X' }] }, ['readings[0].from']],
    ['an unknown net in To', { readings: [{ ...open, to: 'X' }] }, ['readings[0].to']],
    ['the same net twice', { readings: [{ ...open, to: 'VIN' }] }, ['readings[0].to']],
    [
      'an unknown position',
      { readings: [{ ...open, position: 'amps' }] },
      ['readings[0].position'],
    ],
    [
      'an unknown lifted part',
      { readings: [{ ...open, lifted: ['R1', 'R9'] }] },
      ['readings[0].lifted[1]'],
    ],
    ['a negative value', { readings: [{ ...open, value: -1 }] }, ['readings[0].value']],
    [
      'a resolution of zero',
      { readings: [{ ...open, resolution: 0 }] },
      ['readings[0].resolution'],
    ],
    [
      'a negative accuracy',
      { readings: [{ ...open, accuracy: { percent: -1, counts: 3 } }] },
      ['readings[0].accuracy.percent'],
    ],
  ];
  it.each(cases)('names %s by its path', async (_, more, paths) => {
    const readings = 'parts' in (more as object) ? { readings: [] } : {};
    const answer = await send({ json: asked({ ...readings, ...(more as object) }) });
    expect(answer.status).toBe(422);
    expect(pathsOf(answer).filter((path) => paths.includes(path))).toEqual(paths);
  });

  it('names everything at once, whatever the fault is of', async () => {
    const answer = await send({
      json: asked({
        parts: [
          parts[0],
          { ...parts[0], nets: ['VIN', 'COM'] },
          { ref: 'Q9', kind: 'valve', nets: ['N1', 'COM'] },
          { ...parts[2], ref: 'R7', ohms: -1 },
          { ...parts[3], closed: ['amps'] },
        ],
        readings: [
          { ...open, from: 'NOWHERE', lifted: ['R99'] },
          { ...open, position: 'amps', value: -3 },
        ],
      }),
    });
    expect(answer.status).toBe(422);
    expect(pathsOf(answer).sort()).toEqual(
      [
        'network.parts[1].ref',
        'network.parts[2].kind',
        'network.parts[3].ohms',
        'network.parts[4].closed[0]',
        'readings[0].from',
        'readings[0].lifted[0]',
        'readings[1].position',
        'readings[1].value',
      ].sort(),
    );
  });

  it('refuses numbers that are not finite: 1e999 in JSON is infinity', async () => {
    const text = JSON.stringify(asked({ parts: [{ ...parts[0], ohms: 12345 }], readings: [] }));
    const answer = await send({ raw: text.replace('12345', '1e999') });
    expect([answer.status, pathsOf(answer)]).toEqual([422, ['network.parts[0].ohms']]);
    const value = await send({
      raw: JSON.stringify(asked({ readings: [{ ...open, value: 54321 }] })).replace(
        '54321',
        '1e999',
      ),
    });
    expect([value.status, pathsOf(value)]).toEqual([422, ['readings[0].value']]);
  });

  it.each(['null', '[]', '"x"', '{}', '{"network":1,"readings":"x"}', '{"network":{"parts":[1]}}'])(
    'answers 422 to %s',
    async (raw) => {
      const answer = await send({ raw });
      expect(answer.status).toBe(422);
      expect(answer.body.errors?.length).toBeGreaterThan(0);
    },
  );

  it('answers 400 to text that is no JSON', async () => {
    expect((await send({ raw: '{"network":' })).status).toBe(400);
  });

  it('is for staff alone', async () => {
    const ask = { json: asked() };
    expect((await shop.call(null, 'POST', '/api/diagnosis', ask)).status).toBe(401);
    expect((await shop.call('customer', 'POST', '/api/diagnosis', ask)).status).toBe(403);
  });
});
