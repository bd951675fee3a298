import fc from 'fast-check';
import { expect, test } from 'vitest';
import { sectionLines, type Block } from '@/domain/faults/body';
import { compareTexts } from '@/domain/faults/compare';

const joined = (before: string, after: string, kinds: string[]) =>
  compareTexts(before, after)
    .filter((c) => kinds.includes(c.kind))
    .map((c) => c.text)
    .join('');

test('kept and gone pieces are the first text, kept and new ones the second', () => {
  const words = fc
    .array(fc.constantFrom('RT1', 'open', '1.1 kΩ', ' ', '\n', '\n\n', 'short', '–'), {
      maxLength: 60,
    })
    .map((all) => all.join(' '));
  fc.assert(
    fc.property(words, words, (before, after) => {
      expect(joined(before, after, ['same', 'gone'])).toBe(before);
      expect(joined(before, after, ['same', 'new'])).toBe(after);
    }),
  );
});

test('a changed word is all that changes', () => {
  expect(compareTexts('RT1 is open now', 'RT1 is short now')).toEqual([
    { kind: 'same', text: 'RT1 is ' },
    { kind: 'gone', text: 'open' },
    { kind: 'new', text: 'short' },
    { kind: 'same', text: ' now' },
  ]);
});

test('very long texts are compared by their lines, and in bounded time', () => {
  const lines = Array.from({ length: 700 }, (_, i) => `line ${i} ${'word '.repeat(20)}`);
  const before = lines.join('\n');
  const after = lines.with(350, 'another line').join('\n');
  const started = performance.now();
  const changed = compareTexts(before, after).filter((c) => c.kind !== 'same');
  expect(changed.map((c) => c.kind)).toEqual(['gone', 'new']);
  expect(performance.now() - started).toBeLessThan(5_000);
});

test('a section becomes lines that can be compared', () => {
  const entry = (words: string, ...more: Block[]) => ({
    type: 'listItem' as const,
    content: [{ type: 'paragraph', content: [{ type: 'text', text: words }] } as Block, ...more],
  });
  const blocks: Block[] = [
    {
      type: 'orderedList',
      content: [entry('one'), entry('two', { type: 'bulletList', content: [entry('inner')] })],
    },
    {
      type: 'reading',
      attrs: { from: 'V', to: 'P', position: 'volts', typed: 'OL', expected: '1.1 kΩ' },
    },
    { type: 'caution', content: [{ type: 'text', text: 'hot' }] },
  ];
  expect(sectionLines(blocks).split('\n')).toEqual([
    '1. one',
    '2. two',
    '  • inner',
    'V – P · volts · OL (expected 1.1 kΩ)',
    'Caution: hot',
  ]);
});
