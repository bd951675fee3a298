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

/** Symptom, cause, proof, repair: on a board or on a part family (both may stand). */
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
    /** Plain words of the published revision, for the index. */
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

export const faultRevisions = mysqlTable(
  'fault_revisions',
  {
    id: id(),
    noteId: ref()
      .notNull()
      .references(() => faultNotes.id),
    revision: int().notNull(),
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
    note: varchar({ length: 1000 }).notNull().default(''),
  },
  (t) => [index('fault_steps_note').on(t.noteId, t.id)],
);

/** Counters that every process polls: `faults` moves whenever the published set changes. */
export const revisions = mysqlTable('revisions', {
  name: varchar({ length: 40 }).primaryKey(),
  value: bigint({ mode: 'number' }).notNull(),
});
