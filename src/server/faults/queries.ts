/** Reading the fault base. */
import type { Queryable } from '@/db/client';
import { sectionWords } from '@/domain/faults/body';
import { fitOf, type TicketFacts } from '@/domain/faults/fit';
import { termsOf } from '@/domain/faults/search-terms';
import { faultIndex } from './search-index';
import type { Proposal } from './types';

const excerptOf = (text: string, length = 160) =>
  text.length <= length ? text : `${text.slice(0, text.lastIndexOf(' ', length))} …`;

/** Published notes that fit a ticket, the best first. */
export async function proposeNotes(
  app: { db: Queryable },
  ticket: TicketFacts,
  now: Date,
  limit = 5,
): Promise<Proposal[]> {
  const { notes } = await faultIndex(app.db, now);
  const proposals: Proposal[] = [];
  for (const note of notes.values()) {
    const fit = fitOf(
      {
        ...note,
        boardId: note.board?.id ?? null,
        modeTerms: new Set(termsOf(`${note.title} ${note.document.cause}`)),
      },
      ticket,
    );
    if (!fit) continue;
    proposals.push({
      id: note.id,
      title: note.title,
      excerpt: excerptOf(sectionWords(note.body.proof) || note.document.cause),
      board: note.board?.label ?? null,
      partKind: note.partKind,
      ...fit,
    });
  }
  return proposals.sort((a, b) => b.score - a.score || a.id - b.id).slice(0, limit);
}
