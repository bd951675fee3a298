/** Searching what is published: matches, counts by facet, pieces of text with the words marked. */
import type {
  Facets,
  FoundNote,
  SearchAnswer,
  SearchQuery,
  SuggestionSet,
} from '@/contracts/search';
import type { Queryable } from '@/db/client';
import { SECTIONS } from '@/domain/faults/body';
import { questionOf } from '@/domain/faults/search-question';
import { markWords, snippetOf } from '@/domain/faults/snippet';
import { PART_KINDS } from '@/domain/parts/kinds';
import { kindLabels } from '@/domain/parts/words';
import { SYMPTOM_CODES, SYMPTOMS } from '@/domain/tickets/vocabulary';
import { pageByOffset } from '../http/pages';
import type { Outcome } from '../refusal';
import { done } from '../refusal';
import { faultIndex, type FaultIndex, type IndexedNote } from './note-index';

type Choice = Pick<SearchQuery, 'q' | 'board' | 'kind' | 'symptom' | 'sort'>;
type Match = { note: IndexedNote; score: number; terms: Set<string> };

/** Of notes that have only some of the words, those far behind the best are noise. */
const WORTH_SHOWING = 0.35;

function matchesOf(index: FaultIndex, q: string): { matches: Match[]; all: boolean } {
  if (q === '') {
    const every = [...index.notes.values()];
    return { matches: every.map((note) => ({ note, score: 0, terms: new Set() })), all: true };
  }
  const ask = (all: boolean): Match[] => {
    const question = questionOf(q, all, !all);
    if (!question) return [];
    return index.search.search(question).flatMap(({ id, score, terms }) => {
      const note = index.notes.get(id as number);
      return note ? [{ note, score, terms: new Set(terms) }] : [];
    });
  };
  const whole = ask(true);
  if (whole.length > 0) return { matches: whole, all: true };
  const some = ask(false);
  const best = some[0]?.score ?? 0;
  return { matches: some.filter((m) => m.score >= best * WORTH_SHOWING), all: false };
}

const inBoard = (m: Match, c: Choice) => c.board === undefined || m.note.board?.id === c.board;
const inKind = (m: Match, c: Choice) => c.kind === undefined || m.note.partKind === c.kind;
const inSymptom = (m: Match, c: Choice) =>
  c.symptom === undefined || m.note.symptoms.includes(c.symptom);

function facetsOf(matches: Match[], choice: Choice): Facets {
  const boards = new Map<number, { value: number; label: string; count: number }>();
  for (const m of matches) {
    const { board } = m.note;
    if (!board || !inKind(m, choice) || !inSymptom(m, choice)) continue;
    const entry = boards.get(board.id) ?? { value: board.id, label: board.label, count: 0 };
    boards.set(board.id, { ...entry, count: entry.count + 1 });
  }
  const kinds = matches.filter((m) => inBoard(m, choice) && inSymptom(m, choice));
  const symptoms = matches.filter((m) => inBoard(m, choice) && inKind(m, choice));
  return {
    board: [...boards.values()].sort((a, b) => a.label.localeCompare(b.label, 'en')),
    kind: PART_KINDS.map((value) => ({
      value,
      label: kindLabels[value],
      count: kinds.filter((m) => m.note.partKind === value).length,
    })).filter((f) => f.count > 0 || f.value === choice.kind),
    symptom: SYMPTOM_CODES.map((value) => ({
      value,
      label: SYMPTOMS[value],
      count: symptoms.filter((m) => m.note.symptoms.includes(value)).length,
    })).filter((f) => f.count > 0 || f.value === choice.symptom),
  };
}

function inOrder(matches: Match[], sort: SearchQuery['sort'], asked: boolean): Match[] {
  const byTime = (a: Match, b: Match) => b.note.updatedAt.getTime() - a.note.updatedAt.getTime();
  const byTitle = (a: Match, b: Match) => a.note.title.localeCompare(b.note.title, 'en');
  const byKey = (a: Match, b: Match) => a.note.id - b.note.id;
  const orders = {
    best: (a: Match, b: Match) => (asked ? b.score - a.score : byTime(a, b)),
    '-updated': byTime,
    updated: (a: Match, b: Match) => byTime(b, a),
    title: byTitle,
    '-title': (a: Match, b: Match) => byTitle(b, a),
  };
  return [...matches].sort((a, b) => orders[sort](a, b) || byKey(a, b));
}

function foundNote({ note, terms }: Match): FoundNote {
  const piece = snippetOf(
    SECTIONS.map((s) => [s, note.document[s]] as const),
    terms,
  );
  return {
    id: note.id,
    title: markWords(note.title, terms),
    board: note.board,
    partKind: note.partKind,
    incident: note.incident,
    symptoms: note.symptoms,
    from: piece?.from ?? 'symptom',
    snippet: piece?.pieces ?? [],
    updatedAt: note.updatedAt.toISOString(),
  };
}

export type Found = {
  total: number;
  all: boolean;
  facets: Facets;
  /** The notes from `offset` on, at most `limit`. */
  slice: (limit: number, offset: number) => FoundNote[];
};

/** Everything that fits the question and the narrowing, ready to be shown page by page. */
export async function findNotes(db: Queryable, choice: Choice, now: Date): Promise<Found> {
  const index = await faultIndex(db, now);
  const { matches, all } = matchesOf(index, choice.q);
  const fitting = matches.filter(
    (m) => inBoard(m, choice) && inKind(m, choice) && inSymptom(m, choice),
  );
  const ordered = inOrder(fitting, choice.sort, choice.q !== '');
  return {
    total: ordered.length,
    all,
    facets: facetsOf(matches, choice),
    slice: (limit, offset) => ordered.slice(offset, offset + limit).map(foundNote),
  };
}

/** One page of the search, as the API answers it. */
export async function searchFaults(
  db: Queryable,
  query: SearchQuery,
  now: Date,
): Promise<Outcome<SearchAnswer>> {
  const found = await findNotes(db, query, now);
  const page = await pageByOffset(query, (limit, offset) =>
    Promise.resolve(found.slice(limit, offset)),
  );
  if (!page.ok) return page;
  const { total, all, facets } = found;
  return done({ ...page.value.json, total, all, facets });
}

/** What the island needs to suggest notes while somebody types. */
export async function suggestionSet(db: Queryable, now: Date): Promise<SuggestionSet> {
  const index = await faultIndex(db, now);
  const notes = [...index.notes.values()].map(({ document: { id, title, refs, labels } }) => ({
    id,
    title,
    refs,
    labels,
  }));
  return { stamp: index.stamp, notes };
}
