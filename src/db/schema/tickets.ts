import {
  boolean,
  char,
  date,
  double,
  index,
  int,
  mysqlEnum,
  mysqlTable,
  primaryKey,
  text,
  uniqueIndex,
  varchar,
} from 'drizzle-orm/mysql-core';
import { INCIDENTS } from '@/domain/parts/kinds';
import { STAGES } from '@/domain/tickets/stages';
import { CAUTION_CODES, type Accessory, type Symptom } from '@/domain/tickets/vocabulary';
import { id, jsonText, moment, ref } from '../columns';
import { users } from './people';
import { boards, customers, instruments } from './shop';

/** Last ticket number given out in a month ("2612"). */
export const ticketNumbers = mysqlTable('ticket_numbers', {
  month: char({ length: 4 }).primaryKey(),
  last: int().notNull(),
});

export const tickets = mysqlTable(
  'tickets',
  {
    id: id(),
    number: varchar({ length: 12 }).notNull(),
    instrumentId: ref()
      .notNull()
      .references(() => instruments.id),
    customerId: ref()
      .notNull()
      .references(() => customers.id),
    /** The board at intake; readings belong to it. */
    boardId: ref().references(() => boards.id),
    stage: mysqlEnum(STAGES).notNull(),
    /** Where `waiting for parts` goes back to. */
    stageBefore: mysqlEnum(STAGES),
    claimHash: char({ length: 64 }).notNull(),
    symptoms: jsonText<Symptom[]>().notNull(),
    symptomText: varchar({ length: 2000 }).notNull().default(''),
    incident: mysqlEnum(INCIDENTS).notNull(),
    accessories: jsonText<Accessory[]>().notNull(),
    accessoryText: varchar({ length: 300 }).notNull().default(''),
    condition: varchar({ length: 1000 }).notNull().default(''),
    promisedOn: date({ mode: 'string' }),
    assignedTo: ref().references(() => users.id),
    /** The price offered, in minor units, and what it is for. */
    estimateMinor: int(),
    estimateCurrency: char({ length: 3 }),
    estimateFor: varchar({ length: 1000 }),
    /** A senior's reason when the instrument left without a passed release check. */
    exceptionReason: varchar({ length: 1000 }),
    exceptionBy: ref().references(() => users.id),
    receivedAt: moment().notNull(),
    stageAt: moment().notNull(),
    closedAt: moment(),
    createdBy: ref()
      .notNull()
      .references(() => users.id),
    version: int().notNull().default(1),
  },
  (t) => [
    uniqueIndex('tickets_number').on(t.number),
    index('tickets_stage').on(t.stage, t.promisedOn),
    index('tickets_customer').on(t.customerId),
    index('tickets_instrument').on(t.instrumentId),
    index('tickets_board').on(t.boardId),
  ],
);

/** Everything that happened, in order. Rows are never changed (a trigger refuses it). */
export const ticketEvents = mysqlTable(
  'ticket_events',
  {
    id: id(),
    ticketId: ref()
      .notNull()
      .references(() => tickets.id),
    at: moment().notNull(),
    actorId: ref().references(() => users.id),
    actorName: varchar({ length: 120 }).notNull(),
    kind: mysqlEnum([
      'step',
      'caution',
      'photo',
      'message',
      'assigned',
      'claim',
      'fault',
      'corrected',
    ]).notNull(),
    step: varchar({ length: 40 }),
    fromStage: mysqlEnum(STAGES),
    toStage: mysqlEnum(STAGES),
    note: varchar({ length: 2000 }).notNull().default(''),
    /** Whether the customer sees it (the note is never shown to the customer). */
    open: boolean().notNull(),
  },
  (t) => [index('ticket_events_ticket').on(t.ticketId, t.id)],
);

export const ticketCautions = mysqlTable(
  'ticket_cautions',
  {
    ticketId: ref()
      .notNull()
      .references(() => tickets.id),
    caution: mysqlEnum(CAUTION_CODES).notNull(),
    at: moment().notNull(),
    byId: ref()
      .notNull()
      .references(() => users.id),
    byName: varchar({ length: 120 }).notNull(),
  },
  (t) => [primaryKey({ columns: [t.ticketId, t.caution] })],
);

/** One measurement: two nets at a switch position, or one part by its reference. */
export const readings = mysqlTable(
  'readings',
  {
    id: id(),
    ticketId: ref()
      .notNull()
      .references(() => tickets.id),
    /** Made by the client, so that a repeated save is the same row. */
    clientKey: char({ length: 36 }).notNull(),
    phase: mysqlEnum(['as-found', 'after-repair']).notNull(),
    place: int().notNull(),
    fromNet: varchar({ length: 40 }),
    toNet: varchar({ length: 40 }),
    partRef: varchar({ length: 20 }),
    position: varchar({ length: 40 }),
    lifted: jsonText<string[]>().notNull(),
    /** As typed; the numbers beside it are what the parser made of it. */
    typed: varchar({ length: 40 }).notNull(),
    ohms: double(),
    resolution: double(),
    overRange: boolean().notNull().default(false),
    createdBy: ref()
      .notNull()
      .references(() => users.id),
    createdAt: moment().notNull(),
    version: int().notNull().default(1),
  },
  (t) => [
    uniqueIndex('readings_client').on(t.ticketId, t.clientKey),
    index('readings_sheet').on(t.ticketId, t.phase, t.place),
  ],
);

export const messages = mysqlTable(
  'messages',
  {
    id: id(),
    ticketId: ref()
      .notNull()
      .references(() => tickets.id),
    side: mysqlEnum(['customer', 'shop']).notNull(),
    authorId: ref().references(() => users.id),
    authorName: varchar({ length: 120 }).notNull(),
    body: text().notNull(),
    at: moment().notNull(),
    /** When the shop first answered or marked it seen. */
    seenAt: moment(),
  },
  (t) => [index('messages_ticket').on(t.ticketId, t.id)],
);

/** Notes among the staff; a customer never sees them. */
export const ticketNotes = mysqlTable(
  'ticket_notes',
  {
    id: id(),
    ticketId: ref()
      .notNull()
      .references(() => tickets.id),
    authorId: ref()
      .notNull()
      .references(() => users.id),
    authorName: varchar({ length: 120 }).notNull(),
    body: text().notNull(),
    at: moment().notNull(),
  },
  (t) => [index('ticket_notes_ticket').on(t.ticketId, t.id)],
);
