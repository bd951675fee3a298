/** How published notes are indexed: one set of options for the server's search and the island's suggestions. */
import { SYMPTOMS, INCIDENT_LABELS, type Symptom } from '../tickets/vocabulary';
import { kindLabels } from '../parts/words';
import type { Incident, PartKind } from '../parts/kinds';
import type { Section } from './body';
import { termsOf } from './search-terms';

/** What the index knows of one published note. */
export type NoteDocument = {
  id: number;
  title: string;
  /** Part references of the chips: `RT1 RV2`. */
  refs: string;
  /** Board, labels it is sold under, family, symptoms, incident, in words. */
  labels: string;
  /** What the board is: "regulator board of a bench supply". */
  about: string;
} & Record<Section, string>;

const same = (term: string) => term;

/** Options of the index; give them to MiniSearch as they are. */
export const INDEX_OPTIONS = {
  fields: ['title', 'refs', 'labels', 'about', 'symptom', 'cause', 'proof', 'repair'],
  idField: 'id',
  storeFields: [] as string[],
  tokenize: termsOf,
  processTerm: same,
  searchOptions: {
    // Terms come cut already, by search-question.ts.
    tokenize: (term: string) => [term],
    processTerm: same,
    boost: {
      title: 4,
      refs: 4,
      labels: 2.5,
      symptom: 2,
      cause: 1.5,
      proof: 1,
      repair: 1,
      about: 0.5,
    },
    weights: { fuzzy: 0.35, prefix: 0.6 },
  },
};

/** The index for suggestions while typing holds what a line of the list shows and no more. */
export const SUGGESTION_FIELDS = ['title', 'refs', 'labels'];

/** The words a note is found by beside its own. */
export function labelWords(note: {
  board: { code: string; revision: string; maker: string } | null;
  models: readonly { maker: string; name: string }[];
  partKind: PartKind | null;
  symptoms: readonly Symptom[];
  incident: Incident | null;
}): string {
  const { board, models, partKind, symptoms, incident } = note;
  return [
    board ? `${board.code} rev ${board.revision} ${board.maker}` : '',
    ...models.map((m) => `${m.maker} ${m.name}`),
    partKind ? `${partKind} ${kindLabels[partKind]}` : '',
    ...symptoms.map((s) => SYMPTOMS[s]),
    incident && incident !== 'unknown' ? INCIDENT_LABELS[incident] : '',
  ]
    .filter(Boolean)
    .join(' · ');
}
