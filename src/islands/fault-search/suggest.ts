/** Suggestions while somebody types, from the same index options as the server's search. */
import MiniSearch from 'minisearch';
import { searchRoutes, type SuggestionSet } from '@/contracts/search';
import { INDEX_OPTIONS, SUGGESTION_FIELDS } from '@/domain/faults/search-options';
import { questionOf } from '@/domain/faults/search-question';
import { markWords, type Piece } from '@/domain/faults/snippet';

export type Suggestion = { id: number; title: Piece[]; labels: string };
export type Suggest = (text: string, most: number) => Suggestion[];

/** Builds the index of a set of notes. */
export function suggestFrom({ notes }: SuggestionSet): Suggest {
  const index = new MiniSearch({ ...INDEX_OPTIONS, fields: SUGGESTION_FIELDS });
  index.addAll(notes);
  const byId = new Map(notes.map((note) => [note.id, note]));
  return (text, most) => {
    const question = questionOf(text, true, true);
    if (!question) return [];
    return index
      .search(question)
      .slice(0, most)
      .flatMap(({ id, terms }) => {
        const note = byId.get(id as number);
        if (!note) return [];
        const title = markWords(note.title, new Set(terms));
        return [{ id: note.id, title, labels: note.labels.split(' · ')[0] ?? '' }];
      });
  };
}

/** Reads the notes once a page. @throws when the server does not answer with them */
export async function loadSuggest(): Promise<Suggest> {
  const answer = await fetch(searchRoutes.suggestions.path, {
    headers: { accept: 'application/json' },
  });
  if (!answer.ok) throw new Error(`Suggestions answered ${answer.status}`);
  return suggestFrom((await answer.json()) as SuggestionSet);
}
