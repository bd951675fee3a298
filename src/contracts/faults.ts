/** The fault base: notes, their revisions and steps. Search is in search.ts. */
import * as z from 'zod/v4';
import { FAULT_STATES, FAULT_STEPS } from '@/domain/faults/states';
import { INCIDENTS, PART_KINDS } from '@/domain/parts/kinds';
import { SYMPTOM_CODES } from '@/domain/tickets/vocabulary';
import { Id, ListQuery, Moment, TicketNumber, line, listOf, prose } from './common';
import { FaultBodySchema } from './fault-body';
import { defineRoute } from './route';

export const BoardName = z.object({ id: z.int(), label: z.string(), maker: z.string() });

const facts = {
  title: line(160, 1),
  boardId: z.int().positive().nullable().default(null),
  partKind: z.enum(PART_KINDS).nullable().default(null),
  incident: z.enum(INCIDENTS).nullable().default(null),
  symptoms: z
    .array(z.enum(SYMPTOM_CODES))
    .max(SYMPTOM_CODES.length)
    .default([])
    .transform((all) => [...new Set(all)]),
  body: FaultBodySchema,
};

/** What is saved; a draft may be unfinished, only its title is needed. */
export const FaultInput = z.strictObject(facts);
export type FaultInput = z.output<typeof FaultInput>;
export const NewFault = z.strictObject({
  ...facts,
  /** The ticket it was learnt on. */
  ticket: TicketNumber.nullable().default(null),
});
export type NewFault = z.output<typeof NewFault>;

export const FaultRow = z.object({
  id: z.int(),
  title: z.string(),
  state: z.enum(FAULT_STATES),
  board: BoardName.nullable(),
  partKind: z.enum(PART_KINDS).nullable(),
  incident: z.enum(INCIDENTS).nullable(),
  symptoms: z.array(z.enum(SYMPTOM_CODES)),
  author: z.string(),
  own: z.boolean(),
  /** A newer revision waits to be published. */
  correction: z.boolean(),
  revision: z.int(),
  publishedRevision: z.int().nullable(),
  createdAt: Moment,
  updatedAt: Moment,
  publishedAt: Moment.nullable(),
});
export type FaultRow = z.input<typeof FaultRow>;

export const FaultDetail = FaultRow.extend({
  /** The revision shown here: the published one, or the newest for those who work on it. */
  shown: z.int(),
  body: FaultBodySchema,
  ticket: z.string().nullable(),
  publishedBy: z.string().nullable(),
  mayEdit: z.boolean(),
  steps: z.array(
    z.object({ step: z.enum(FAULT_STEPS), label: z.string(), note: z.string().nullable() }),
  ),
  version: z.int(),
});
export type FaultDetail = z.input<typeof FaultDetail>;

export const RevisionRow = z.object({
  revision: z.int(),
  title: z.string(),
  author: z.string(),
  at: Moment,
  /** When readers got it, if they did. */
  publishedAt: Moment.nullable(),
});
export const Revision = RevisionRow.extend({
  board: BoardName.nullable(),
  partKind: z.enum(PART_KINDS).nullable(),
  incident: z.enum(INCIDENTS).nullable(),
  symptoms: z.array(z.enum(SYMPTOM_CODES)),
  body: FaultBodySchema,
});
export type RevisionRow = z.input<typeof RevisionRow>;
export type Revision = z.input<typeof Revision>;

export const FAULT_SORTS = ['-updated', 'updated', 'title', '-title'] as const;
export const FaultsQuery = ListQuery.extend({
  q: z.string().trim().max(200).default(''),
  /** Missing: every state that you may see. */
  state: z.enum(FAULT_STATES).optional(),
  board: Id.optional(),
  kind: z.enum(PART_KINDS).optional(),
  symptom: z.enum(SYMPTOM_CODES).optional(),
  sort: z.enum(FAULT_SORTS).default('-updated'),
});
export type FaultsQuery = z.output<typeof FaultsQuery>;

/** What the page's address may say; a mistyped part of it is left out rather than refused. */
const PageQuery = z.object({
  q: z.string().trim().max(200).catch('').default(''),
  state: z.enum(FAULT_STATES).optional().catch(undefined),
  board: Id.optional().catch(undefined),
  kind: z.enum(PART_KINDS).optional().catch(undefined),
  symptom: z.enum(SYMPTOM_CODES).optional().catch(undefined),
  sort: z
    .enum(['best', ...FAULT_SORTS])
    .catch('best')
    .default('best'),
  page: z.coerce.number().int().min(1).max(10_000).catch(1).default(1),
});
export type FaultPageQuery = z.output<typeof PageQuery>;
export const faultPageQuery = (address: URLSearchParams): FaultPageQuery =>
  PageQuery.parse(Object.fromEntries(address));

export const TakeFaultStep = z.strictObject({
  step: z.enum(FAULT_STEPS),
  note: prose(1000).default(''),
});
export type TakeFaultStep = z.output<typeof TakeFaultStep>;

/** The step as a page's form sends it: the version it was offered for comes along. */
export const FaultStepForm = z.object({
  step: z.enum(FAULT_STEPS),
  note: prose(1000).default(''),
  version: z.coerce.number().int().positive(),
});

const ById = z.object({ id: Id });
export const FaultAddress = ById;

const Pair = z
  .string()
  .regex(/^\d{1,6}-\d{1,6}$/)
  .transform((text) => text.split('-').map(Number) as [number, number]);
const NoteAddress = z.object({
  /** One revision, or two compared: `?compare=2-3`. */
  revision: Id.optional().catch(undefined),
  compare: Pair.optional().catch(undefined),
});
export type NoteAddress = z.output<typeof NoteAddress>;
export const noteAddress = (address: URLSearchParams): NoteAddress =>
  NoteAddress.parse(Object.fromEntries(address));

export const faultRoutes = {
  list: defineRoute({
    method: 'GET',
    path: '/api/faults',
    summary: 'Fault notes: published ones for everybody, work in progress for those who do it.',
    who: 'fault.read',
    query: FaultsQuery,
    answer: listOf(FaultRow),
    status: 200,
  }),
  create: defineRoute({
    method: 'POST',
    path: '/api/faults',
    summary: 'Start a note as a draft.',
    who: 'fault.draft',
    body: NewFault,
    answer: FaultDetail,
    status: 201,
    repeatable: true,
  }),
  read: defineRoute({
    method: 'GET',
    path: '/api/faults/{id}',
    summary: 'One note as its readers see it; those who may edit it get the newest revision.',
    who: 'fault.read',
    params: ById,
    answer: FaultDetail,
    status: 200,
  }),
  save: defineRoute({
    method: 'PUT',
    path: '/api/faults/{id}',
    summary: 'Save a note as a new revision. Readers of a published one see it after `publish`.',
    who: 'fault.draft',
    params: ById,
    body: FaultInput,
    answer: FaultDetail,
    status: 200,
    versioned: true,
  }),
  step: defineRoute({
    method: 'POST',
    path: '/api/faults/{id}/steps',
    summary: 'Move a note one step: to review, back, published, retired.',
    who: 'fault.draft',
    params: ById,
    body: TakeFaultStep,
    answer: z.object({ state: z.enum(FAULT_STATES), version: z.int() }),
    status: 200,
    versioned: true,
    repeatable: true,
  }),
  revisions: defineRoute({
    method: 'GET',
    path: '/api/faults/{id}/revisions',
    summary:
      'The revisions of a note, newest first: all for those who work on it, else the published.',
    who: 'fault.read',
    params: ById,
    answer: listOf(RevisionRow),
    status: 200,
  }),
  revision: defineRoute({
    method: 'GET',
    path: '/api/faults/{id}/revisions/{revision}',
    summary: 'One revision, whole.',
    who: 'fault.read',
    params: ById.extend({ revision: Id }),
    answer: Revision,
    status: 200,
  }),
};
