import { expect, test } from 'vitest';
import { fitOf, type NoteFacts, type TicketFacts } from '@/domain/faults/fit';
import { termsOf } from '@/domain/faults/search-terms';

const note = (more: Partial<NoteFacts> & { words?: string } = {}): NoteFacts => ({
  boardId: 40,
  partKind: 'ptc',
  incident: 'mains-on-ohms',
  symptoms: ['dead-on-ohms'],
  refs: new Set(['RT1']),
  modeTerms: new Set(termsOf(more.words ?? 'RT1 open')),
  ...more,
});
const ticket = (more: Partial<TicketFacts> = {}): TicketFacts => ({
  boardId: 40,
  symptoms: ['dead-on-ohms'],
  incident: 'mains-on-ohms',
  suspects: [{ ref: 'RT1', kind: 'ptc', mode: 'open' }],
  ...more,
});

test('a note of the same board says why it fits', () => {
  expect(fitOf(note(), ticket())?.why).toEqual([
    'same board',
    'RT1 open',
    'same incident',
    'same symptom',
  ]);
});

test('the board counts more than the family, the likeliest suspect more than the second', () => {
  const score = (n: NoteFacts, t = ticket()) => fitOf(n, t)?.score ?? 0;
  expect(score(note())).toBeGreaterThan(score(note({ boardId: null })));
  const second = ticket({
    suspects: [
      { ref: 'RV1', kind: 'mov', mode: 'short' },
      { ref: 'RT1', kind: 'ptc', mode: 'open' },
    ],
  });
  expect(score(note())).toBeGreaterThan(score(note(), second));
});

test('a family note fits another board by its part, and says that it is from elsewhere', () => {
  expect(fitOf(note({ boardId: 22 }), ticket())?.why).toEqual([
    'PTC open',
    'same incident',
    'same symptom',
    'from another board',
  ]);
  expect(fitOf(note({ boardId: null }), ticket())?.why).not.toContain('from another board');
});

test('a reference of another board means another part', () => {
  const other = note({ boardId: 22, partKind: 'resistor' });
  expect(
    fitOf(other, ticket({ suspects: [{ ref: 'RT1', kind: 'ptc', mode: 'open' }] })),
  ).toBeNull();
});

test('the board alone, or a symptom alone, is not enough', () => {
  const nothing = ticket({ suspects: [], symptoms: [], incident: 'unknown' });
  expect(fitOf(note(), nothing)).toBeNull();
  const symptomOnly = ticket({ boardId: 22, suspects: [], incident: 'unknown' });
  expect(fitOf(note({ boardId: null }), symptomOnly)).toBeNull();
});

test('an unknown incident is not the same as another unknown one', () => {
  const fit = fitOf(note({ incident: 'unknown' }), ticket({ incident: 'unknown' }));
  expect(fit?.why).not.toContain('same incident');
});
