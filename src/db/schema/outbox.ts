import {
  char,
  index,
  int,
  mediumtext,
  mysqlTable,
  primaryKey,
  uniqueIndex,
  varchar,
} from 'drizzle-orm/mysql-core';
import { id, moment, ref } from '../columns';

/** Work promised by a change and done after it: written in the change's transaction, taken by a worker. */
export const outbox = mysqlTable(
  'outbox',
  {
    id: id(),
    kind: varchar({ length: 40 }).notNull(),
    /** Sealed JSON: a mail may carry a claim code or a link. Emptied once done. */
    payload: mediumtext().notNull(),
    /** One row per event, however often the command is repeated. */
    onceKey: varchar({ length: 120 }).notNull(),
    attempts: int().notNull().default(0),
    dueAt: moment().notNull(),
    doneAt: moment(),
    deadAt: moment(),
    lastError: varchar({ length: 500 }),
    createdAt: moment().notNull(),
  },
  (t) => [
    uniqueIndex('outbox_once').on(t.onceKey),
    index('outbox_due').on(t.doneAt, t.deadAt, t.dueAt),
  ],
);

/** Answers kept for a day, so that a repeated POST with the same key gets the same answer. */
export const idempotency = mysqlTable(
  'idempotency',
  {
    userId: ref().notNull(),
    key: varchar({ length: 80 }).notNull(),
    bodyHash: char({ length: 64 }).notNull(),
    /** Null only inside the transaction that does the work. */
    status: int(),
    answer: mediumtext(),
    etag: varchar({ length: 40 }),
    createdAt: moment().notNull(),
  },
  (t) => [primaryKey({ columns: [t.userId, t.key] }), index('idempotency_age').on(t.createdAt)],
);
