/** Who may see and change which note; the steps themselves are decided by domain/faults/states.ts. */
import type { FaultStanding } from '@/domain/faults/states';
import { roleMay } from '@/domain/people';
import type { StaffActor } from '../auth/actor';
import type { NoteHead } from './types';

const senior = (actor: StaffActor) => roleMay(actor.role, 'fault.publish');
const own = (actor: StaffActor, note: NoteHead) => note.createdBy === actor.id;

/** Published notes are everybody's; one in review is the bench's; drafts and retired ones their author's and seniors'. */
export function mayRead(actor: StaffActor, note: NoteHead): boolean {
  if (note.state === 'published' || senior(actor)) return true;
  if (!roleMay(actor.role, 'fault.draft')) return false;
  return own(actor, note) || note.state === 'in-review';
}

/** Seniors edit every note, an author the own draft. */
export function mayEdit(actor: StaffActor, note: NoteHead): boolean {
  if (!roleMay(actor.role, 'fault.draft')) return false;
  return senior(actor) || (own(actor, note) && note.state === 'draft');
}

/** Whether revisions that were never published are open to this person as well. */
export function seesAllRevisions(actor: StaffActor, note: NoteHead): boolean {
  return senior(actor) || (mayRead(actor, note) && note.state !== 'published');
}

export const correctionWaits = (note: NoteHead): boolean =>
  note.state === 'published' && note.revision !== note.publishedRevision;

export const standingOf = (actor: StaffActor, note: NoteHead): FaultStanding => ({
  state: note.state,
  own: own(actor, note),
  correction: correctionWaits(note),
});
