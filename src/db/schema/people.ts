import { sql } from 'drizzle-orm';
import {
  char,
  index,
  int,
  bigint,
  mysqlEnum,
  mysqlTable,
  uniqueIndex,
  varchar,
} from 'drizzle-orm/mysql-core';
import { ROLES, type Scope } from '@/domain/people';
import { id, jsonText, moment, ref } from '../columns';
import { customers } from './shop';

/** Everyone who can sign in. A customer's row has no password and points at the customer. */
export const users = mysqlTable(
  'users',
  {
    id: id(),
    email: varchar({ length: 190 }).notNull(),
    name: varchar({ length: 120 }).notNull(),
    role: mysqlEnum(ROLES).notNull(),
    passwordHash: varchar({ length: 255 }),
    /** Sealed with the app secret (server/auth/secrets.ts). */
    totpSecret: varchar({ length: 255 }),
    /** The time step of the last TOTP code that was taken: no code works twice. */
    totpLastStep: ref(),
    customerId: ref().references(() => customers.id),
    disabledAt: moment(),
    createdAt: moment().notNull(),
    version: int().notNull().default(1),
    /** Staff sign in by e-mail, whatever their role becomes, so among them it stands once. */
    staffEmail: varchar({ length: 190 }).generatedAlwaysAs(
      sql`(if(\`role\` = 'customer', null, \`email\`))`,
      { mode: 'stored' },
    ),
  },
  (t) => [
    // A customer's e-mail may also be a colleague's, so the role is part of the key.
    uniqueIndex('users_email_role').on(t.email, t.role),
    uniqueIndex('users_staff_email').on(t.staffEmail),
    uniqueIndex('users_customer').on(t.customerId),
  ],
);

/** Sessions; the id is the SHA-256 of the cookie's value. */
export const sessions = mysqlTable(
  'sessions',
  {
    id: char({ length: 64 }).primaryKey(),
    userId: ref()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    expiresAt: moment().notNull(),
    /** Set when the customer came in with a claim code: the session then sees that ticket alone. */
    ticketId: ref(),
  },
  (t) => [index('sessions_user').on(t.userId), index('sessions_expiry').on(t.expiresAt)],
);

export const oneTimeTokens = mysqlTable(
  'one_time_tokens',
  {
    id: id(),
    kind: mysqlEnum(['reset', 'invite', 'link']).notNull(),
    tokenHash: char({ length: 64 }).notNull(),
    userId: ref()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    expiresAt: moment().notNull(),
    usedAt: moment(),
    createdAt: moment().notNull(),
  },
  (t) => [uniqueIndex('one_time_tokens_hash').on(t.tokenHash), index('one_time_user').on(t.userId)],
);

export const apiTokens = mysqlTable(
  'api_tokens',
  {
    id: id(),
    userId: ref()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    name: varchar({ length: 80 }).notNull(),
    /** First characters of the token, shown so that its owner can tell them apart. */
    hint: varchar({ length: 12 }).notNull(),
    tokenHash: char({ length: 64 }).notNull(),
    scopes: jsonText<Scope[]>().notNull(),
    createdAt: moment().notNull(),
    lastUsedAt: moment(),
    revokedAt: moment(),
  },
  (t) => [uniqueIndex('api_tokens_hash').on(t.tokenHash), index('api_tokens_user').on(t.userId)],
);

/** What was done, by whom, to what. Rows are never changed (a trigger refuses it). */
export const audit = mysqlTable(
  'audit',
  {
    id: id(),
    at: moment().notNull(),
    actorId: ref().references(() => users.id),
    actorName: varchar({ length: 120 }).notNull(),
    action: varchar({ length: 60 }).notNull(),
    object: varchar({ length: 120 }).notNull(),
    detail: jsonText<Record<string, unknown>>().notNull(),
    requestId: varchar({ length: 40 }),
  },
  (t) => [index('audit_at').on(t.at), index('audit_object').on(t.object)],
);

/** Counters of the rate limiter (columns as rate-limiter-flexible wants them). */
export const rateLimits = mysqlTable('rate_limits', {
  key: varchar({ length: 255 }).primaryKey(),
  points: int().notNull().default(0),
  expire: bigint({ mode: 'number', unsigned: true }),
});
