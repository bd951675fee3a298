import { expect, test } from 'vitest';
import { afterSignIn } from '@/server/auth/then';

test.each([
  ['/queue?stage=all&q=a%20b#last', '/queue?stage=all&q=a%20b#last'],
  ['/tickets/2612-0047', '/tickets/2612-0047'],
  ['/', '/'],
  ['/faults/../boards', '/boards'],
])('%s leads there', (then, to) => {
  expect(afterSignIn(then)).toBe(to);
});

test.each([
  null,
  undefined,
  '',
  'queue',
  'https://elsewhere.example/',
  '//elsewhere.example/',
  '/\\elsewhere.example',
  '\\\\elsewhere.example',
  '/.//elsewhere.example',
  '/a/..//elsewhere.example',
  '/\t/elsewhere.example',
  '/ /elsewhere.example',
  '\n//elsewhere.example',
  'javascript:alert(1)',
  '/sign-out',
  '/sign-in?then=/sign-in',
  '/api/audit?format=csv',
  `/${'a'.repeat(600)}`,
])('%j leads to the queue', (then) => {
  expect(afterSignIn(then)).toBe('/queue');
});

test('whatever is typed, the answer stays on this site', () => {
  const pieces = ['/', '//', '\\', '.', '..', '@', ':', '?', '#', 'x', '%2f', '%5c', '\u0000', ' '];
  for (const a of pieces)
    for (const b of pieces)
      for (const c of pieces) {
        const to = afterSignIn(`${a}${b}${c}elsewhere.example`);
        expect(new URL(to, 'https://shop.example').origin).toBe('https://shop.example');
        expect(to).toMatch(/^\/(?![/\\])/);
      }
});
