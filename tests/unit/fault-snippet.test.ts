import fc from 'fast-check';
import { expect, test } from 'vitest';
import { markWords, snippetOf } from '@/domain/faults/snippet';
import { termsOf } from '@/domain/faults/search-terms';

const whole = (pieces: { text: string }[]) => pieces.map((p) => p.text).join('');

test('the pieces are the text, whatever stands in it', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'grapheme', maxLength: 300 }), fc.string(), (text, asked) => {
      expect(whole(markWords(text, new Set(termsOf(asked))))).toBe(text);
    }),
  );
});

test('the words that were found are marked, and no others', () => {
  const hits = markWords(
    'Leaky varistor at 1.1 kΩ, <b>varistors</b> leak',
    new Set(['varistor', '=1100r']),
  )
    .filter((p) => p.hit)
    .map((p) => p.text);
  expect(hits).toEqual(['varistor', '1.1 kΩ', 'varistors']);
});

test('the section that says most is chosen, the first one when none does', () => {
  const texts = [
    ['symptom', 'Ohms shows OL.'],
    ['cause', 'The varistor leaks after a surge.'],
    ['repair', ''],
  ] as const;
  expect(snippetOf(texts, new Set(termsOf('varistor surge')))?.from).toBe('cause');
  expect(snippetOf(texts, new Set(termsOf('hinge')))?.from).toBe('symptom');
  expect(snippetOf([['cause', '']], new Set())).toBeNull();
});

test('a long text is cut between words, around what was found', () => {
  const text = `${'filler words here '.repeat(40)}the varistor leaks ${'and more of it '.repeat(40)}`;
  const found = snippetOf([['cause', text]], new Set(['varistor', 'leak']));
  const shown = whole(found?.pieces ?? []);
  expect(shown.length).toBeLessThan(220);
  expect(shown).toMatch(/^… \S.*varistor leaks.* …$/);
  expect(text).toContain(shown.slice(2, -2));
});
