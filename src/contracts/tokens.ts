import * as z from 'zod/v4';
import { SCOPES } from '@/domain/people';
import { Id, Moment, line } from './common';
import { defineRoute } from './route';

export const ApiToken = z.object({
  id: z.int(),
  name: z.string(),
  /** The first characters, to tell tokens apart. */
  hint: z.string(),
  scopes: z.array(z.enum(SCOPES)),
  createdAt: Moment,
  lastUsedAt: Moment.nullable(),
});
export type ApiToken = z.output<typeof ApiToken>;

export const NewToken = z.object({
  name: line(80, 1),
  scopes: z
    .array(z.enum(SCOPES))
    .min(1, 'No scope was chosen: at least one is needed.')
    .max(SCOPES.length)
    .transform((scopes) => SCOPES.filter((scope) => scopes.includes(scope))),
});
export type NewToken = z.output<typeof NewToken>;

export const tokenRoutes = {
  list: defineRoute({
    method: 'GET',
    path: '/api/tokens',
    summary: 'Your own API tokens in use.',
    who: 'account.own',
    answer: z.object({ items: z.array(ApiToken) }),
    status: 200,
  }),
  create: defineRoute({
    method: 'POST',
    path: '/api/tokens',
    summary:
      'Make an API token; signed in, as a token may not. The token itself is answered once, here.',
    who: 'account.own',
    body: NewToken,
    bodyLimit: 4096,
    answer: ApiToken.extend({ token: z.string() }),
    status: 201,
    repeatable: true,
  }),
  revoke: defineRoute({
    method: 'DELETE',
    path: '/api/tokens/{id}',
    summary: 'Revoke a token of your own, signed in: it stops working at once.',
    who: 'account.own',
    params: z.object({ id: Id }),
    answer: null,
    status: 204,
  }),
};
