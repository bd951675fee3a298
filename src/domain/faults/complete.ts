/** What a note must have before others are asked to rely on it. */
import type { PartKind } from '../parts/kinds';
import { SECTIONS, sectionWords, type FaultBody, type Section } from './body';

export const SECTION_LABELS: Record<Section, string> = {
  symptom: 'Symptom',
  cause: 'Cause',
  proof: 'Proof',
  repair: 'Repair',
};

/** What belongs into each section, as the editor asks for it. */
export const SECTION_HINTS: Record<Section, string> = {
  symptom: 'What the customer sees, and what the instrument shows on the bench.',
  cause: 'Which part failed, in which way, and what brought it there.',
  proof: 'The readings that prove it, and what a healthy board would show.',
  repair: 'What was replaced or cleaned, by what, and how it was checked afterwards.',
};

/** The fields that are still missing, by path. */
export function missingIn(note: {
  title: string;
  boardId: number | null;
  partKind: PartKind | null;
  body: FaultBody;
}): { path: string; message: string }[] {
  const missing: { path: string; message: string }[] = [];
  if (note.title.trim() === '')
    missing.push({ path: 'title', message: 'No title: a line that names the fault is needed.' });
  if (note.boardId === null && note.partKind === null)
    missing.push({
      path: 'boardId',
      message: 'Neither board nor part family: the note must stand on one of them.',
    });
  for (const section of SECTIONS)
    if (sectionWords(note.body[section]) === '')
      missing.push({
        path: `body.${section}`,
        message: `${SECTION_LABELS[section]} is empty: a sentence at least is needed.`,
      });
  return missing;
}
