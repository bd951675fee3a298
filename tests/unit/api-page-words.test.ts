/** How the page about the API writes schemas, and how the audit log writes details. */
import { expect, test } from 'vitest';
import { operationsByArea } from '@/components/docs/operations';
import { schemaText } from '@/components/docs/schema-text';
import { detailLines, objectAddress } from '@/components/people/audit-words';
import { describeApi } from '@/contracts/openapi';
import { ROUTES } from '@/contracts/routes';

test('members are written one a line with their limits, what may be left out with a mark', () => {
  const schema = {
    type: 'object',
    properties: {
      name: { type: 'string', minLength: 1, maxLength: 120 },
      role: { enum: ['counter', 'owner'] },
      ohms: { type: 'number', exclusiveMinimum: 0 },
      limit: { type: 'integer', minimum: 1, maximum: 200, default: 50 },
      at: { type: 'string', format: 'date-time', pattern: '^long$' },
      nets: { type: 'array', prefixItems: [{ type: 'string' }, { type: 'null' }] },
      more: { type: 'array', maxItems: 3, items: { type: 'boolean' } },
      body: { $ref: '#/components/schemas/Body' },
      words: { type: 'object', additionalProperties: { type: 'string' } },
    },
    required: ['name', 'role', 'ohms', 'at', 'nets', 'words'],
  };
  expect(schemaText(schema)).toBe(`{
  name: text, 1 to 120 characters
  role: "counter" | "owner"
  ohms: number, above 0
  limit?: whole number, 1 to 200  (unless given: 50)
  at: moment, RFC 3339 in UTC
  nets: [text, null]
  more?: list of up to 3: true | false
  body?: Body
  words: { (any name): text }
}`);
});

test('alternatives leave out the empty text of a form and the impossible', () => {
  const schema = { anyOf: [{ type: 'number' }, { const: 'OL' }, { const: '' }, { not: {} }] };
  expect(schemaText(schema)).toBe('number | "OL"');
});

test('what says nothing is anything', () => {
  expect([schemaText({}), schemaText(undefined)]).toEqual(['anything', 'anything']);
});

test('every endpoint stands on the page once, under an id of its own', () => {
  const operations = operationsByArea(describeApi('http://shop.example')).flatMap(
    (area) => area.operations,
  );
  const named = operations.map(({ method, path }) => `${method} ${path}`);
  expect(named.toSorted()).toEqual(
    ROUTES.map(({ method, path }) => `${method} ${path}`).toSorted(),
  );
  expect(new Set(operations.map(({ id }) => id)).size).toBe(operations.length);
});

test('a change is written as what it was and became', () => {
  expect(detailLines({ from: 'counter', to: 'owner' })).toEqual(['counter → owner']);
  expect(detailLines({ from: true, to: false, why: ['a', 'b'] })).toEqual([
    'on → off',
    'why: a, b',
  ]);
  expect(detailLines({ role: { from: 'x', to: null } })).toEqual(['role: from x, to none']);
});

test.each([
  ['person:12', '/people/12'],
  ['ticket:2612-0047', '/tickets/2612-0047'],
  ['token:3', null],
  ['person:../audit', null],
  ['person:', null],
  ['nothing', null],
])('the object %s leads to %s', (object, address) => {
  expect(objectAddress(object)).toBe(address);
});
