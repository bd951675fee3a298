import {
  bigint,
  index,
  int,
  mediumtext,
  mysqlEnum,
  mysqlTable,
  uniqueIndex,
  varchar,
} from 'drizzle-orm/mysql-core';
import { INCIDENTS, PART_KINDS } from '@/domain/parts/kinds';
import { FAULT_STATES } from '@/domain/faults/states';
import type { FaultBody } from '@/domain/faults/body';
import type { Symptom } from '@/domain/tickets/vocabulary';
import { id, jsonText, moment, ref } from '../columns';
import { users } from './people';
import { boards } from './shop';
import { tickets } from './tickets';

/**
 * Symptom, cause, proof, repair: on a board or on a part family (both may stand). Title, board, family, incident,
 * symptoms and words are those of the revision its readers see: the published one, or the latest before that.
 */
export const faultNotes = mysqlTable(
  'fault_notes',
  {
    id: id(),
    boardId: ref().references(() => boards.id),
    partKind: mysqlEnum(PART_KINDS),
    incident: mysqlEnum(INCIDENTS),
    symptoms: jsonText<Symptom[]>().notNull(),
    title: varchar({ length: 160 }).notNull(),
    state: mysqlEnum(FAULT_STATES).notNull(),
    revision: int().notNull(),
    /** The revision readers see; null until first published. */
    publishedRevision: int(),
    /** Plain words of the same revision, for lists that are searched in the database. */
    words: mediumtext().notNull(),
    fromTicketId: ref().references(() => tickets.id),
    createdBy: ref()
      .notNull()
      .references(() => users.id),
    createdAt: moment().notNull(),
    updatedAt: moment().notNull(),
    publishedBy: ref().references(() => users.id),
    publishedAt: moment(),
    version: int().notNull().default(1),
  },
  (t) => [
    index('fault_notes_state').on(t.state, t.updatedAt),
    index('fault_notes_board').on(t.boardId),
    index('fault_notes_ticket').on(t.fromTicketId),
  ],
);

/** Everything one saved state of a note says; rows are never changed (a trigger refuses it). */
export const faultRevisions = mysqlTable(
  'fault_revisions',
  {
    id: id(),
    noteId: ref()
      .notNull()
      .references(() => faultNotes.id),
    revision: int().notNull(),
    boardId: ref().references(() => boards.id),
    partKind: mysqlEnum(PART_KINDS),
    incident: mysqlEnum(INCIDENTS),
    symptoms: jsonText<Symptom[]>().notNull(),
    title: varchar({ length: 160 }).notNull(),
    body: jsonText<FaultBody>().notNull(),
    authorId: ref()
      .notNull()
      .references(() => users.id),
    at: moment().notNull(),
  },
  (t) => [uniqueIndex('fault_revisions_number').on(t.noteId, t.revision)],
);

export const faultSteps = mysqlTable(
  'fault_steps',
  {
    id: id(),
    noteId: ref()
      .notNull()
      .references(() => faultNotes.id),
    at: moment().notNull(),
    actorId: ref()
      .notNull()
      .references(() => users.id),
    actorName: varchar({ length: 120 }).notNull(),
    fromState: mysqlEnum(FAULT_STATES).notNull(),
    toState: mysqlEnum(FAULT_STATES).notNull(),
    /** The revision the step was about: with `toState` published, the one readers got. */
    revision: int().notNull(),
    note: varchar({ length: 1000 }).notNull().default(''),
  },
  (t) => [index('fault_steps_note').on(t.noteId, t.id)],
);

/** Counters that every process polls: `faults` moves whenever the published set changes. */
export const revisions = mysqlTable('revisions', {
  name: varchar({ length: 40 }).primaryKey(),
  value: bigint({ mode: 'number' }).notNull(),
});
