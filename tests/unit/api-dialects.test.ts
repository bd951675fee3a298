/** The patterns of the API’s description, for programs in other languages. */
import { expect, test } from 'vitest';
import { line, prose } from '@/contracts/common';
import { describeApi } from '@/contracts/openapi';

function patternsIn(value: unknown): string[] {
  if (Array.isArray(value)) return value.flatMap(patternsIn);
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([name, inner]) =>
    name === 'pattern' && typeof inner === 'string' ? [inner] : patternsIn(inner),
  );
}

// JSON Schema 2020-12, 6.4: patterns should keep to what every dialect of ECMA-262 reads.
test('every pattern is read without the flag for Unicode, and none names a Unicode class', () => {
  const patterns = [...new Set(patternsIn(describeApi('http://shop.example')))];
  expect(patterns.length).toBeGreaterThan(5);
  for (const pattern of patterns) {
    expect(pattern).not.toMatch(/\\[pPu]\{/);
    expect(() => new RegExp(pattern), pattern).not.toThrow();
  }
});

test('half of a character is refused all the same, a whole one beyond the first plane is taken', () => {
  for (const schema of [line(50), prose(50)]) {
    expect(schema.safeParse('a \ud83d b').success).toBe(false);
    expect(schema.safeParse('a \udd27 b').success).toBe(false);
    expect(schema.safeParse('a \u{1f527} b').success).toBe(true);
    expect(schema.safeParse('a \u0007 b').success).toBe(false);
  }
});
