import type { FaultBody } from '@/domain/faults/body';
import type { FaultState } from '@/domain/faults/states';
import type { Incident, PartKind } from '@/domain/parts/kinds';
import type { Symptom } from '@/domain/tickets/vocabulary';

/** What a note is about, beside its text. */
export type FaultFacts = {
  title: string;
  boardId: number | null;
  partKind: PartKind | null;
  incident: Incident | null;
  symptoms: Symptom[];
};
export type FaultInput = FaultFacts & { body: FaultBody };

export type NoteHead = {
  id: number;
  state: FaultState;
  revision: number;
  publishedRevision: number | null;
  createdBy: number;
  version: number;
};

/** A published note that fits a ticket, and why: `['same board', 'RT1 open', 'same incident']`. */
export type Proposal = {
  id: number;
  title: string;
  /** The first words of its cause. */
  excerpt: string;
  /** `LB-40 rev C`, or null for a note on a part family alone. */
  board: string | null;
  partKind: PartKind | null;
  why: string[];
  score: number;
};
