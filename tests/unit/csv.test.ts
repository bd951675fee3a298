import { expect, test } from 'vitest';
import { csvCell, csvResponse, wantsCsv } from '@/server/http/csv';

// RFC 4180 §2, rules 5 to 7
test.each([
  ['plain', 'plain'],
  ['with, comma', '"with, comma"'],
  ['with "quotes"', '"with ""quotes"""'],
  ['two\r\nlines', '"two\r\nlines"'],
  ['two\nlines', '"two\nlines"'],
  [' led by a space', '" led by a space"'],
  ['', ''],
])('the text %j becomes %j', (text, cell) => {
  expect(csvCell(text)).toBe(cell);
});

// OWASP, "CSV Injection": the characters a spreadsheet takes for a formula
test.each(['=1+1', '+31 6 1234', '-2+3', '@SUM(A1)', '\tx', '\rx', '＝1+1', '＠x'])(
  'the text %j does not run as a formula',
  (text) => {
    expect(csvCell(text).replace(/^"/, '')).toMatch(/^'/);
  },
);

test('numbers stay numbers, below zero too', () => {
  expect([csvCell(-5), csvCell(0.33), csvCell(0)]).toEqual(['-5', '0.33', '0']);
});

test('a number that is not finite is refused', () => {
  expect(() => csvCell(Number.NaN)).toThrow(RangeError);
  expect(() => csvCell(Infinity)).toThrow(/a finite number is needed/);
});

test('nothing, yes, no and moments are written plainly', () => {
  const moment = new Date('2026-12-01T10:00:00Z');
  expect([null, undefined, true, false, moment].map(csvCell)).toEqual([
    '',
    '',
    'yes',
    'no',
    '2026-12-01T10:00:00.000Z',
  ]);
});

const request = (address: string, accept?: string) =>
  new Request(`http://shop.example${address}`, { headers: accept ? { accept } : {} });

test.each([
  ['/people?format=csv', undefined, true],
  ['/people', 'text/csv', true],
  ['/people', 'TEXT/CSV;q=1, application/json', true],
  ['/people?format=json', 'text/csv', false],
  ['/people', 'text/html, text/csv;q=0.1', false],
  ['/people', undefined, false],
])('%s with Accept %s wants CSV: %s', (address, accept, wanted) => {
  expect(wantsCsv(request(address, accept))).toBe(wanted);
});

const columns = [
  { name: 'part', value: (row: { part: string; ohms: number }) => row.part },
  { name: 'ohms, nominal', value: (row: { part: string; ohms: number }) => row.ohms },
];

test('a file names its columns, ends lines by CRLF and begins with a byte order mark', async () => {
  const answer = csvResponse(request('/x?format=csv'), 'parts', columns, [{ part: 'Ω1', ohms: 1 }]);
  const bytes = new Uint8Array(await answer.arrayBuffer());
  expect([...bytes.slice(0, 3)]).toEqual([0xef, 0xbb, 0xbf]);
  expect(new TextDecoder().decode(bytes)).toBe('part,"ohms, nominal"\r\nΩ1,1\r\n');
  expect(answer.headers.get('content-disposition')).toBe('attachment; filename="parts.csv"');
});

test('an answer to Accept has no byte order mark', async () => {
  const answer = csvResponse(request('/x', 'text/csv'), 'parts', columns, []);
  const bytes = new Uint8Array(await answer.arrayBuffer());
  expect(new TextDecoder('utf-8', { ignoreBOM: true }).decode(bytes)).toBe(
    'part,"ohms, nominal"\r\n',
  );
  expect(answer.headers.get('content-type')).toMatch(/^text\/csv/);
});

test('rows are read as they are written, and reading stops when nobody takes them', async () => {
  let read = 0;
  let ended = false;
  async function* endless() {
    try {
      for (;;) yield { part: 'R', ohms: (read += 1) };
    } finally {
      ended = true;
    }
  }
  const answer = csvResponse(request('/x', 'text/csv'), 'parts', columns, endless());
  const reader = answer.body!.getReader();
  await reader.read();
  await reader.read();
  expect(read).toBeLessThan(5);
  await reader.cancel();
  expect(ended).toBe(true);
});
