import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PartCheckAnswer } from '@/contracts/compute';
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

const check = async (json: unknown) => {
  const answer = await shop.call('technician', 'POST', '/api/part-check', { json });
  return { status: answer.status, body: (await answer.json()) as Record<string, unknown> };
};
const judged = async (json: unknown) => {
  const { status, body } = await check(json);
  expect(status).toBe(200);
  return PartCheckAnswer.strict().parse(body);
};

describe('POST /api/part-check', () => {
  // Rayleigh's monotonicity law: a parallel path can only lower a reading (Doyle and Snell 1984).
  it('takes an over-range reading across a PTC in circuit as proof', async () => {
    const answer = await judged({ kind: 'ptc', ohms: 1100, value: 'OL', inCircuit: true });
    expect(answer).toMatchObject({ verdict: 'suspect', mode: 'open' });
    expect(answer.probability).toBeGreaterThan(0.95);
    expect(answer.reasons.join(' ')).toContain('proves the part open or drifted high');
    expect(answer.next).toBeUndefined();
  });

  it('settles nothing by a low reading across a varistor in circuit, and asks for a lifted lead', async () => {
    const answer = await judged({ kind: 'mov', marking: '561K', value: 4700, inCircuit: true });
    expect(answer.verdict).toBe('inconclusive');
    expect(answer.mode).toBeUndefined();
    expect(answer.reasons.join(' ')).toContain('proves nothing until a lead is lifted');
    expect(answer.next).toBe('Lift one lead and measure again.');
  });

  it('settles it once the lead is lifted', async () => {
    const answer = await judged({ kind: 'mov', marking: '561K', value: 4700, inCircuit: false });
    expect(answer).toMatchObject({ verdict: 'suspect', mode: 'leaky' });
  });

  it('passes a resistor within its tolerance', async () => {
    const answer = await judged({
      kind: 'resistor',
      ohms: 1e6,
      tolerance: 0.01,
      value: 1.003e6,
      inCircuit: false,
    });
    expect(answer).toMatchObject({ verdict: 'fits' });
    expect(answer.probability).toBeLessThan(0.1);
  });

  it.each([
    ['kind', { kind: 'valve', value: 1, inCircuit: true }],
    ['value', { kind: 'ptc', value: -1, inCircuit: true }],
    ['value', { kind: 'ptc', value: 'ol', inCircuit: true }],
    ['ohms', { kind: 'resistor', ohms: 0, value: 1, inCircuit: true }],
    ['tolerance', { kind: 'resistor', ohms: 5, tolerance: 2, value: 1, inCircuit: true }],
    ['inCircuit', { kind: 'resistor', ohms: 5, value: 1 }],
    ['marking', { kind: 'resistor', marking: '!!', value: 1, inCircuit: true }],
  ])('names %s when it is wrong', async (path, json) => {
    const { status, body } = await check(json);
    expect(status).toBe(422);
    expect((body['errors'] as { path: string }[]).map((e) => e.path)).toEqual([path]);
  });

  it('is for staff alone', async () => {
    const json = { kind: 'ptc', ohms: 1100, value: 'OL', inCircuit: true };
    expect((await shop.call(null, 'POST', '/api/part-check', { json })).status).toBe(401);
    expect((await shop.call('customer', 'POST', '/api/part-check', { json })).status).toBe(403);
  });
});

describe('GET /api/markings', () => {
  const decode = async (query: string) => {
    const answer = await shop.call('technician', 'GET', `/api/markings?${query}`);
    return { status: answer.status, body: await answer.json() } as {
      status: number;
      body: { readings: { kind: string; value: number; unit: string; source: string }[] };
    };
  };

  it('reads 561K on a varistor as 560 V with its ratings', async () => {
    const { status, body } = await decode('text=561K&kind=mov');
    expect(status).toBe(200);
    expect(body.readings[0]).toMatchObject({ kind: 'mov', value: 560, unit: 'V', tolerance: 0.1 });
    expect(body.readings[0]?.source).not.toBe('');
  });

  it('gives every reading with the kind it belongs to when none is named', async () => {
    const { body } = await decode('text=561K');
    const units = new Set(body.readings.map(({ unit }) => unit));
    expect(units).toContain('V');
    expect(units).toContain('Ω');
  });

  it('answers no reading for what cannot be read, and 422 for nothing or too much', async () => {
    expect((await decode('text=%3F%3F%3F')).body.readings).toEqual([]);
    expect((await decode('text=')).status).toBe(422);
    expect((await decode(`text=${'9'.repeat(41)}`)).status).toBe(422);
    expect((await decode('text=561K&kind=valve')).status).toBe(422);
    expect((await decode('')).status).toBe(422);
  });
});
