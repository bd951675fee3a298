/** How well a published note fits a ticket: by board, suspected part, incident and symptoms. */
import type { Incident, Mode, PartKind } from '../parts/kinds';
import { modeLabels } from '../parts/words';
import type { Symptom } from '../tickets/vocabulary';

export type SuspectPart = { ref: string; kind: PartKind; mode: Mode };

/** What is known of the ticket. Boards are internal keys: one label's note serves every label of its board. */
export type TicketFacts = {
  boardId: number | null;
  symptoms: readonly Symptom[];
  incident: Incident | null;
  /** The likeliest first. */
  suspects: readonly SuspectPart[];
};

export type NoteFacts = {
  boardId: number | null;
  partKind: PartKind | null;
  incident: Incident | null;
  symptoms: readonly Symptom[];
  /** Part references in the note's text. */
  refs: ReadonlySet<string>;
  /** Terms of title and cause, for the failure mode. */
  modeTerms: ReadonlySet<string>;
};

export type Fit = { score: number; why: string[] };

// Judgement of the bench, not statistics: a board counts for more than a part family, that for more than a symptom.
const WEIGHTS = {
  board: 4,
  ref: 3,
  kind: 2.5,
  mode: 1,
  incident: 1.5,
  symptom: 1,
  /** Each further suspect counts this much less than the one before. */
  rank: 0.8,
};
const LEAST = 3;

const MODE_TERMS: Record<Mode, readonly string[]> = {
  open: ['open', 'blown'],
  short: ['short', 'shorted'],
  leaky: ['leak', 'leaky', 'leakage'],
  'drifted-high': ['high', 'drifted', 'drift'],
  'drifted-low': ['low', 'drifted', 'drift'],
};

const KIND_WORDS: Partial<Record<PartKind, string>> = {
  ptc: 'PTC',
  ntc: 'NTC',
  mov: 'MOV',
  gdt: 'gas tube',
  clamp: 'clamp',
  'ic-pin': 'IC pin',
  contact: 'switch contact',
};

/** What fits the suspects best: by reference on the same board, else by the family of the part. */
function bySuspects(note: NoteFacts, suspects: readonly SuspectPart[], sameBoard: boolean) {
  let best: { score: number; why: string } | null = null;
  suspects.forEach((suspect, place) => {
    const named = sameBoard && note.refs.has(suspect.ref);
    const family = note.partKind === suspect.kind;
    if (!named && !family) return;
    const mode = MODE_TERMS[suspect.mode].some((term) => note.modeTerms.has(term));
    const score =
      ((named ? WEIGHTS.ref : 0) + (family ? WEIGHTS.kind : 0) + (mode ? WEIGHTS.mode : 0)) *
      WEIGHTS.rank ** place;
    if (best && best.score >= score) return;
    const what = named ? suspect.ref : (KIND_WORDS[suspect.kind] ?? suspect.kind);
    best = { score, why: mode ? `${what} ${modeLabels[suspect.mode]}` : what };
  });
  return best as { score: number; why: string } | null;
}

/** The fit of one note, or null when it has nothing to say about this ticket. */
export function fitOf(note: NoteFacts, ticket: TicketFacts): Fit | null {
  const sameBoard = note.boardId !== null && note.boardId === ticket.boardId;
  // A note that stands on another board alone is about that board's own layout.
  if (note.boardId !== null && !sameBoard && note.partKind === null) return null;
  let score = 0;
  const why: string[] = [];
  if (sameBoard) {
    score += WEIGHTS.board;
    why.push('same board');
  }
  const suspect = bySuspects(note, ticket.suspects, sameBoard);
  if (suspect) {
    score += suspect.score;
    why.push(suspect.why);
  }
  if (note.incident && note.incident !== 'unknown' && note.incident === ticket.incident) {
    score += WEIGHTS.incident;
    why.push('same incident');
  }
  const shared = note.symptoms.filter((s) => ticket.symptoms.includes(s)).length;
  if (shared > 0) {
    score += WEIGHTS.symptom * Math.min(shared, 2);
    why.push(shared === 1 ? 'same symptom' : 'same symptoms');
  }
  // The board alone says little, and so does a symptom alone on a strange board.
  if (score <= WEIGHTS.board && sameBoard && why.length === 1) return null;
  if (score < LEAST || (!sameBoard && !suspect)) return null;
  if (!sameBoard && note.boardId !== null) why.push('from another board');
  return { score, why };
}
