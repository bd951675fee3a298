/** What the desk's pages say: of a refused form, of a customer who cannot be written to, of an estimate. */
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { intakeOf, mailbox, openDeskShop, problem, type DeskShop } from '../fixtures/desk-shop';

let shop: DeskShop;
beforeAll(async () => {
  shop = await openDeskShop();
});
afterAll(() => shop?.close());

/** Wording of the schema library, which nobody is to read. */
const RAW =
  /Invalid (input|option|type|string|email|UUID|ISO)|Too (small|big): expected|expected \w+ to/;
const errorsOf = async (answer: Response) =>
  Object.fromEntries(((await problem(answer)).errors ?? []).map((e) => [e.path, e.message]));

describe('over the API', () => {
  test('a bad e-mail is refused by its own path and in words', async () => {
    const answer = await shop.take(intakeOf({ customer: { name: 'Ilse', email: 'ilse@' } }));
    expect(answer.status).toBe(422);
    expect(await errorsOf(answer)).toEqual({
      'customer.email': 'Not an e-mail address: something like name@example.org is needed.',
    });
  });

  test.each<[string, string, string, unknown]>([
    ['GET', '/api/tickets?limit=0', 'limit', undefined],
    ['GET', '/api/tickets?limit=ten', 'limit', undefined],
    ['GET', '/api/tickets?stage=lost', 'stage', undefined],
    ['POST', '/api/tickets', 'customer.name', intakeOf({ customer: {} })],
    ['POST', '/api/tickets', 'customer', intakeOf({ customer: 5 })],
    ['POST', '/api/tickets', 'symptomText', intakeOf({ symptomText: 5 })],
    ['POST', '/api/tickets', 'instrument', intakeOf({ instrument: undefined })],
    ['POST', '/api/tickets', 'incident', intakeOf({ incident: 'gremlins' })],
    ['POST', '/api/tickets', 'symptoms', intakeOf({ symptoms: Array(99).fill('dead') })],
    ['POST', '/api/part-check', 'kind', { kind: 'valve', value: 1 }],
    ['POST', '/api/part-check', 'value', { kind: 'fuse', value: 'much' }],
  ])('%s %s names %s in the house’s words', async (method, path, field, json) => {
    const answer = await shop.call('counter', method, path, { json });
    expect(answer.status).toBe(422);
    const errors = await errorsOf(answer);
    expect(Object.keys(errors)).toContain(field);
    expect(JSON.stringify(errors)).not.toMatch(RAW);
    for (const message of Object.values(errors)) expect(message).toMatch(/\.$/);
  });
});

describe('the intake page', () => {
  test('names every field that is wrong, at the head and beside it', async () => {
    const long = 'x'.repeat(2500);
    const form = {
      name: long,
      email: 'ilse@',
      phone: long,
      address: long,
      maker: '',
      model: long,
      serial: '',
      symptoms: ['haunted'],
      symptomText: long,
      incident: 'gremlins',
      accessories: ['broom'],
      accessoryText: long,
      condition: long,
      promisedOn: '2027-02-30',
    };
    const answer = await shop.form(shop.cookies.counter, '/intake', form);
    expect(answer.status).toBe(422);
    const html = await answer.text();
    const summary = /role="alert"[\s\S]*?<\/div>/.exec(html)?.[0] ?? '';
    const lines = [...summary.matchAll(/href="#(\w+)"[^>]*>\s*([^:<]+): /g)];
    expect(lines.map(([, field, label]) => [field, label?.trim()])).toEqual([
      ['name', 'Name'],
      ['email', 'E-mail'],
      ['phone', 'Phone'],
      ['address', 'Address'],
      ['maker', 'Maker'],
      ['model', 'Model'],
      ['serial', 'Serial number'],
      ['symptoms', 'Symptoms'],
      ['symptomText', 'In the customer’s words'],
      ['incident', 'What happened'],
      ['accessories', 'Accessories'],
      ['accessoryText', 'Anything else'],
      ['condition', 'Condition'],
      ['promisedOn', 'Promised for'],
    ]);
    for (const field of Object.keys(form)) {
      expect(html, field).toContain(`id="${field}-error"`);
      expect(html, field).toContain(`id="${field}"`);
    }
    expect(html).not.toMatch(RAW);
  });
});

describe('the ticket page', () => {
  test('says how the customer is told of a message', async () => {
    const reached = await shop.taken({ customer: { name: 'Ilse', email: mailbox() } });
    const mute = await shop.taken({ customer: { name: 'Joost', phone: '0123' } });
    const page = async (number: string) =>
      (await shop.get(shop.cookies.counter, `/tickets/${number}`)).text();
    expect(await page(reached.number)).toContain(
      'They are told by e-mail and read it on their page.',
    );
    const html = await page(mute.number);
    expect(html).toContain('No e-mail address known: they read it on their page.');
    expect(html).not.toContain('told by e-mail');
  });

  test('says of a total what is needed as money is written', async () => {
    const { number } = await shop.taken();
    await shop.walk(number, ['begin']);
    const send = async (total: string) => {
      const fields = { do: 'step', step: 'send-estimate', version: '2', work: 'RT1', total };
      return (await shop.form(shop.cookies.technician, `/tickets/${number}`, fields)).text();
    };
    expect(await send('0')).toContain(
      'The total given is 0.00 EUR: more than 0.00 and at most 99999.99 EUR is needed.',
    );
    expect(await send('1,234.50')).toContain('Not a sum: write it like 72.48.');
    const other = { total: { amount: 7, currency: 'XTS' }, work: 'RT1' };
    const answer = await shop.step('senior', number, 'send-estimate', 2, { estimate: other });
    expect((await errorsOf(answer))['estimate.total']).toContain('0.07 XTS');
  });
});
