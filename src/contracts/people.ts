import * as z from 'zod/v4';
import { STAFF_ROLES } from '@/domain/people';
import { Email, Id, ListQuery, Moment, line, listOf } from './common';
import { defineRoute } from './route';

export const PEOPLE_SORTS = ['name', '-name', 'email', '-email', 'since', '-since'] as const;
export const PERSON_STATES = ['invited', 'active', 'disabled'] as const;

/** A filter of a list: a form sends the empty text for "all". */
export const filter = <T extends z.ZodType>(one: T) =>
  one.or(z.literal('').transform(() => undefined)).optional();

export const Person = z.object({
  id: z.int(),
  name: z.string(),
  email: z.string(),
  role: z.enum(STAFF_ROLES),
  state: z.enum(PERSON_STATES),
  /** True when a code is asked for at sign-in. */
  secondFactor: z.boolean(),
  since: Moment,
  version: z.int(),
});
export type Person = z.output<typeof Person>;

export const PeopleQuery = ListQuery.extend({
  q: z.string().trim().max(100).default(''),
  role: filter(z.enum(STAFF_ROLES)),
  state: filter(z.enum(PERSON_STATES)),
  sort: z.enum(PEOPLE_SORTS).default('name'),
  format: z.enum(['json', 'csv']).optional(),
});
export type PeopleQuery = z.output<typeof PeopleQuery>;

export const Invite = z.object({
  name: line(120, 1),
  email: Email,
  role: z.enum(STAFF_ROLES, 'Not a role of the shop: choose one of the list.'),
});
export type Invite = z.output<typeof Invite>;

export const PersonChange = z
  .object({
    name: line(120, 1),
    role: z.enum(STAFF_ROLES, 'Not a role of the shop: choose one of the list.'),
    disabled: z.boolean(),
    /** Only `false`: takes a lost second factor off, so that its owner can set up a new one. */
    secondFactor: z.literal(false),
  })
  .partial()
  .refine((change) => Object.values(change).some((value) => value !== undefined), {
    message: 'Nothing was given: one of name, role, disabled, secondFactor is needed.',
    // A member that was given and refused is told of by itself.
    when: ({ issues }) => issues.length === 0,
  });
export type PersonChange = z.output<typeof PersonChange>;

const ById = z.object({ id: Id });

export const peopleRoutes = {
  list: defineRoute({
    method: 'GET',
    path: '/api/people',
    summary: 'The staff.',
    who: 'people.manage',
    query: PeopleQuery,
    answer: listOf(Person),
    status: 200,
    csv: true,
  }),
  invite: defineRoute({
    method: 'POST',
    path: '/api/people',
    summary: 'Invite a colleague: they get a link by e-mail that works once, for seven days.',
    who: 'people.manage',
    body: Invite,
    bodyLimit: 4096,
    answer: Person,
    status: 201,
    repeatable: true,
  }),
  change: defineRoute({
    method: 'PATCH',
    path: '/api/people/{id}',
    summary:
      'Change name or role, disable or enable, take off a lost second factor. Disabling ends sessions and tokens; the last owner stays.',
    who: 'people.manage',
    params: ById,
    body: PersonChange,
    bodyLimit: 4096,
    answer: Person,
    status: 200,
    versioned: true,
  }),
  inviteAgain: defineRoute({
    method: 'POST',
    path: '/api/people/{id}/invitation',
    summary: 'Send the invitation again; the earlier link stops working.',
    who: 'people.manage',
    params: ById,
    answer: null,
    status: 202,
  }),
};
