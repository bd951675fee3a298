import * as z from 'zod/v4';
import { DateOnly, Id, ListQuery, Moment, listOf } from './common';
import { filter } from './people';
import { defineRoute } from './route';

export const AuditLine = z.object({
  id: z.int(),
  at: Moment,
  /** Who did it; the key is null for what the shop's tool did by itself. */
  by: z.object({ id: z.int().nullable(), name: z.string() }),
  action: z.string(),
  object: z.string(),
  detail: z.record(z.string(), z.unknown()),
  requestId: z.string().nullable(),
});
export type AuditLine = z.output<typeof AuditLine>;

/** Sign-ins are by far the most lines, and seldom what is looked for. */
export const SIGN_IN = 'session.opened';
export const BUT_SIGN_INS = 'but-sign-ins';

export const AuditQuery = ListQuery.extend({
  /** Text in the object or in the name of who did it. */
  q: z.string().trim().max(100).default(''),
  /** An action, an area with its dot (`person.`), or `but-sign-ins` for all but those. */
  action: z.string().trim().max(60).default(''),
  by: filter(Id),
  /** Days of the shop's calendar, both included. */
  from: filter(DateOnly),
  to: filter(DateOnly),
  sort: z.enum(['at', '-at']).default('-at'),
  format: z.enum(['json', 'csv']).optional(),
});
export type AuditQuery = z.output<typeof AuditQuery>;

export const auditRoutes = {
  list: defineRoute({
    method: 'GET',
    path: '/api/audit',
    summary: 'What was done, by whom, to what; newest first.',
    who: 'audit.read',
    query: AuditQuery,
    answer: listOf(AuditLine),
    status: 200,
    csv: true,
  }),
};
