import type { FaultBody } from '@/domain/faults/body';
import type { FaultDetail } from '@/contracts/faults';
import type { Incident, PartKind } from '@/domain/parts/kinds';
import type { Symptom } from '@/domain/tickets/vocabulary';
import type { ReadingWords } from '../shared/NoteReading';

/** What a ticket hands to its note. */
export type TicketMaterial = {
  number: string;
  boardId: number | null;
  readings: ReadingWords[];
  photos: { id: string; caption: string }[];
  parts: BoardPart[];
  symptoms: Symptom[];
  incident: Incident;
};

export type BoardPart = { ref: string; kind: PartKind; value: string };

export type EditorProps = {
  /** Null for a new note. */
  note: FaultDetail | null;
  ticket: TicketMaterial | null;
  boards: { id: number; label: string }[];
  canPublish: boolean;
  /** Who writes: what was not saved is kept in the browser under this key. */
  person: number;
};

/** Everything that is typed. */
export type Draft = {
  title: string;
  boardId: number | null;
  partKind: PartKind | null;
  incident: Incident | null;
  symptoms: Symptom[];
  body: FaultBody;
};

/** Field or section → what is wrong with it. */
export type Wrong = Record<string, string>;
