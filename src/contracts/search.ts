/** Searching the published fault notes. */
import * as z from 'zod/v4';
import { INCIDENTS, PART_KINDS } from '@/domain/parts/kinds';
import { SYMPTOM_CODES } from '@/domain/tickets/vocabulary';
import { Id, ListQuery, Moment } from './common';
import { BoardName } from './faults';
import { defineRoute } from './route';

export const SEARCH_SORTS = ['best', '-updated', 'updated', 'title', '-title'] as const;
export const SearchQuery = ListQuery.extend({
  q: z.string().trim().max(200, 'Longer than 200 characters: shorten it.').default(''),
  board: Id.optional(),
  kind: z.enum(PART_KINDS).optional(),
  symptom: z.enum(SYMPTOM_CODES).optional(),
  sort: z.enum(SEARCH_SORTS).default('best'),
});
export type SearchQuery = z.output<typeof SearchQuery>;

/** Text in pieces; what was found is marked, nothing in it is markup. */
export const Snippet = z.array(z.object({ text: z.string(), hit: z.boolean() }));
export type Snippet = z.input<typeof Snippet>;

export const FoundNote = z.object({
  id: z.int(),
  title: Snippet,
  board: BoardName.omit({ maker: true }).nullable(),
  partKind: z.enum(PART_KINDS).nullable(),
  incident: z.enum(INCIDENTS).nullable(),
  symptoms: z.array(z.enum(SYMPTOM_CODES)),
  /** The section the words come from. */
  from: z.enum(['symptom', 'cause', 'proof', 'repair']),
  snippet: Snippet,
  updatedAt: Moment,
});
export type FoundNote = z.input<typeof FoundNote>;

const count = { label: z.string(), count: z.int() };
/** How many notes each further narrowing would leave, counted without the facet's own choice. */
export const Facets = z.object({
  board: z.array(z.object({ value: z.int(), ...count })),
  kind: z.array(z.object({ value: z.enum(PART_KINDS), ...count })),
  symptom: z.array(z.object({ value: z.enum(SYMPTOM_CODES), ...count })),
});
export type Facets = z.input<typeof Facets>;

export const SearchAnswer = z.object({
  items: z.array(FoundNote),
  next: z.string().nullable(),
  total: z.int(),
  /** False when no note has all the words and these have some of them. */
  all: z.boolean(),
  facets: Facets,
});
export type SearchAnswer = z.input<typeof SearchAnswer>;

/** What suggestions while typing are made from. */
export const SuggestionSet = z.object({
  stamp: z.string(),
  notes: z.array(
    z.object({ id: z.int(), title: z.string(), refs: z.string(), labels: z.string() }),
  ),
});
export type SuggestionSet = z.input<typeof SuggestionSet>;

export const searchRoutes = {
  search: defineRoute({
    method: 'GET',
    path: '/api/search',
    summary:
      'Search the published fault notes; typos, prefixes and the trade’s synonyms are understood.',
    who: 'fault.read',
    query: SearchQuery,
    answer: SearchAnswer,
    status: 200,
  }),
  suggestions: defineRoute({
    method: 'GET',
    path: '/api/search/suggestions',
    summary: 'Titles, references and labels of the published notes, for suggestions while typing.',
    who: 'fault.read',
    answer: SuggestionSet,
    status: 200,
  }),
};
