/** The bench queue: filters, search, order, paging, the file, and the page. */
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { dayOf } from '@/domain/time/shop-day';
import { STAGES, type Stage } from '@/domain/tickets/stages';
import { openDeskShop, problem, ZONE, type DeskShop } from '../fixtures/desk-shop';

/** What stands in the queue: a letter for each ticket, in the order they were taken in. */
type Row = {
  stage: Stage;
  customer: string;
  maker?: string;
  model?: string;
  serial: string;
  promised: number | null;
  bench?: 'technician' | 'senior';
  text?: string;
};
const ROWS: Record<string, Row> = {
  a: {
    stage: 'on-the-bench',
    customer: 'Åsa Berg',
    serial: 'SN-100',
    promised: 3,
    bench: 'senior',
  },
  b: { stage: 'received', customer: 'Bram, "Oost"', serial: 'SN-200', promised: -2 },
  c: { stage: 'ready', customer: 'Cleo 100%_sure', serial: 'SN-300', promised: null },
  d: {
    stage: 'handed-over',
    customer: '=1+1 Dov',
    serial: '@SUM',
    promised: -9,
    bench: 'technician',
  },
  e: {
    stage: 'received',
    customer: 'Elin Vik',
    maker: 'Ostrel',
    model: 'O-4',
    serial: 'X1',
    promised: 0,
  },
  f: { stage: 'returned-unrepaired', customer: 'Åsa Berg', serial: 'SN-100-B', promised: null },
  g: {
    stage: 'waiting-for-parts',
    customer: 'Bram, "Oost"',
    serial: 'X2',
    promised: 3,
    bench: 'technician',
    text: 'smells of Fish & chips',
  },
};
const LETTERS = Object.keys(ROWS);
const day = (days: number) => dayOf(new Date(Date.now() + days * 86_400_000), ZONE);

let shop: DeskShop;
const letterOf = new Map<string, string>();
const numberOf = (letter: string) => [...letterOf].find(([, one]) => one === letter)?.[0] ?? 'none';
beforeAll(async () => {
  shop = await openDeskShop();
  for (const letter of LETTERS) {
    const row = ROWS[letter];
    if (!row) continue;
    const { maker = 'Tessaly', model = 'T9', serial } = row;
    const { number } = await shop.taken({
      customer: { name: row.customer, email: `${row.customer.length}@queue.example` },
      instrument: { maker, model, serial },
      symptomText: row.text ?? '',
      incident: 'wet',
    });
    letterOf.set(number, letter);
    await shop.stand(number, row.stage, {
      promisedOn: row.promised === null ? null : day(row.promised),
      assignedTo: row.bench ? shop.people[row.bench].id : null,
      receivedAt: new Date(Date.UTC(2026, 0, 1 + letterOf.size)),
    });
  }
});
afterAll(() => shop?.close());

const letters = (items: readonly { number: string }[]) =>
  items.map((t) => letterOf.get(t.number)).join('');
const found = async (query: string, who: 'counter' | 'technician' | 'senior' = 'technician') =>
  letters((await shop.list(query, who)).items);

describe('filters', () => {
  test.each([
    ['', 'abceg'],
    ['stage=open', 'abceg'],
    ['stage=closed', 'df'],
    ['stage=all', 'abcdefg'],
    ['stage=received', 'be'],
    ['stage=approved', ''],
    ['who=mine', 'g'],
    ['who=mine&stage=all', 'dg'],
    ['who=nobody', 'bce'],
    ['board=LB-40&stage=all', 'abcdfg'],
    ['board=LB-99', ''],
    ['board=LB-40&who=nobody&stage=received', 'b'],
  ])('%s shows %s', async (query, expected) => {
    expect([...(await found(query))].sort().join('')).toBe(expected);
  });

  test('whose bench it is depends on who asks; the rest is the same for every role', async () => {
    expect(await found('who=mine', 'senior')).toBe('a');
    expect(await found('who=mine', 'counter')).toBe('');
    for (const who of ['counter', 'senior'] as const)
      expect(await shop.list('stage=all', who)).toEqual(await shop.list('stage=all', 'technician'));
  });
});

describe('search', () => {
  test.each([
    ['sn-100', 'af'],
    ['åsa', 'af'],
    ['oost', 'bg'],
    ['Ostrel O-4', 'e'],
    ['tessaly t9', 'abcdfg'],
    ['fish & chips', 'g'],
    ['100%_', 'c'],
    ['%', 'c'],
    ['_', 'c'],
    ['\\', ''],
    ['"', 'bg'],
    ["' OR 1=1 -- ", ''],
  ])('%s finds %s', async (q, expected) => {
    const query = `stage=all&q=${encodeURIComponent(q)}`;
    expect([...(await found(query))].sort().join('')).toBe(expected);
  });

  test('a number finds its ticket, and half of it too', async () => {
    const number = numberOf('c');
    expect(await found(`q=${number}`)).toBe('c');
    expect(await found(`q=${number.slice(3)}&stage=all`)).toBe('c');
  });
});

/** Each order with its ties, as the rows above give it. */
const ORDERS: [sort: string, expected: string][] = [
  ['promised', 'dbeagcf'],
  ['-promised', 'agebdcf'],
  ['received', 'abcdefg'],
  ['-received', 'gfedcba'],
  ['number', 'abcdefg'],
  ['-number', 'gfedcba'],
  ['customer', 'dafbgce'],
  ['-customer', 'ecbgafd'],
  ['stage', 'beacdgf'],
  ['-stage', 'fgdcabe'],
];

describe('order and pages', () => {
  test.each(ORDERS)('by %s: %s', async (sort, expected) => {
    const rows = await shop.list(`stage=all&sort=${sort}`);
    const got = letters(rows.items);
    const rank = (letter: string) => ROWS[letter];
    // Equal rows may stand either way; what they are in order of may not.
    const keys: Record<string, (row?: Row) => unknown> = {
      promised: (row) => row?.promised,
      customer: (row) => row?.customer,
      stage: (row) => STAGES.indexOf(row?.stage ?? 'received'),
    };
    const key = keys[sort.replace('-', '')];
    const of = (text: string) => [...text].map((l) => (key ? key(rank(l)) : l));
    expect(of(got)).toEqual(of(expected));
  });

  test.each(ORDERS)(
    'paged by %s every ticket comes once, in the order of the whole',
    async (sort) => {
      const whole = await found(`stage=all&sort=${sort}`);
      for (const limit of [1, 2, 3, 7]) {
        let paged = '';
        let cursor = '';
        do {
          const page = await shop.list(
            `stage=all&sort=${sort}&limit=${limit}${cursor}`,
            'technician',
          );
          expect(page.items.length).toBeLessThanOrEqual(limit);
          paged += letters(page.items);
          cursor = page.next === null ? '' : `&cursor=${encodeURIComponent(page.next)}`;
        } while (cursor);
        expect(paged).toBe(whole);
      }
    },
  );

  test.each(ORDERS)(
    'paged by %s, a ticket that leaves meanwhile takes no other along',
    async (sort) => {
      const whole = await found(`sort=${sort}`);
      const first = await shop.list(`sort=${sort}&limit=2`);
      const [gone] = first.items;
      if (!gone) throw new Error('The queue is empty.');
      const { stage } = gone;
      await shop.stand(gone.number, 'handed-over');
      const rest = await shop.list(`sort=${sort}&cursor=${encodeURIComponent(first.next ?? '')}`);
      await shop.stand(gone.number, stage);
      expect(letters(first.items) + letters(rest.items)).toBe(whole);
    },
  );

  test.each(['cursor=x', 'cursor=', 'cursor=bzE', 'cursor=WyJwcm9taXNlZCIsbnVsbCxudWxsXQ'])(
    'what is no cursor of the list is refused: %s',
    async (cursor) => {
      const answer = await shop.call('counter', 'GET', `/api/tickets?${cursor}`);
      expect(answer.status).toBe(422);
      expect((await problem(answer)).errors?.[0]?.path).toBe('cursor');
    },
  );

  test('a cursor of another order is refused', async () => {
    const { next } = await shop.list('sort=number&limit=1');
    const path = `/api/tickets?sort=customer&cursor=${encodeURIComponent(next ?? '')}`;
    expect((await shop.call('counter', 'GET', path)).status).toBe(422);
  });

  test.each(['limit=0', 'limit=201', 'limit=x', 'sort=claim', 'stage=lost', 'who=all-of-us'])(
    'the list refuses %s by its name',
    async (query) => {
      const answer = await shop.call('counter', 'GET', `/api/tickets?${query}`);
      expect(answer.status).toBe(422);
      expect((await problem(answer)).errors?.[0]?.path).toBe(query.split('=')[0]);
    },
  );
});
