import * as z from 'zod/v4';
import { INCIDENTS } from '@/domain/parts/kinds';
import { STAGES, STEPS } from '@/domain/tickets/stages';
import { ACCESSORY_CODES, CAUTION_CODES, SYMPTOM_CODES } from '@/domain/tickets/vocabulary';
import {
  DateOnly,
  EmailIfAny,
  Id,
  ListQuery,
  Moment,
  Money,
  TicketNumber,
  line,
  listOf,
  prose,
} from './common';
import { defineRoute } from './route';

export const QUEUE_SORTS = ['promised', 'received', 'number', 'customer', 'stage'] as const;
const withBackwards = (names: readonly string[]) =>
  z.enum([...names, ...names.map((n) => `-${n}`)] as [string, ...string[]]);

/** A customer found (`id`) or new; contact data of a found one are not changed here. */
export const IntakeCustomer = z
  .object({
    id: Id.optional(),
    name: line(120, 1).optional(),
    email: EmailIfAny.optional(),
    phone: line(40).default(''),
    address: line(300).default(''),
  })
  .transform(({ id, name, ...reached }, context) => {
    if (id !== undefined) return { id };
    if (name !== undefined) return { name, ...reached };
    const message = 'No customer was given: the id of one, or the name of a new one is needed.';
    context.addIssue({ code: 'custom', path: ['name'], message });
    return z.NEVER;
  });

export const Intake = z.object({
  customer: IntakeCustomer,
  instrument: z.object({ maker: line(80, 1), model: line(80, 1), serial: line(60, 1) }),
  symptoms: z.array(z.enum(SYMPTOM_CODES)).max(SYMPTOM_CODES.length).default([]),
  symptomText: prose(2000).default(''),
  incident: z.enum(INCIDENTS).default('unknown'),
  accessories: z.array(z.enum(ACCESSORY_CODES)).max(ACCESSORY_CODES.length).default([]),
  accessoryText: line(300).default(''),
  condition: prose(1000).default(''),
  promisedOn: DateOnly.nullable().default(null),
  /** Said of an instrument that another customer brought before: it is this one's now. */
  changedHands: z.boolean().default(false),
});
export type Intake = z.output<typeof Intake>;

export const TicketRow = z.object({
  number: z.string(),
  stage: z.enum(STAGES),
  instrument: z.object({ id: z.int(), maker: z.string(), model: z.string(), serial: z.string() }),
  board: z.string().nullable(),
  customer: z.object({ id: z.int(), name: z.string() }),
  symptoms: z.array(z.enum(SYMPTOM_CODES)),
  incident: z.enum(INCIDENTS),
  assignedTo: z.object({ id: z.int(), name: z.string() }).nullable(),
  promisedOn: z.string().nullable(),
  receivedAt: Moment,
  stageAt: Moment,
  unseen: z.int(),
});
export type TicketRow = z.input<typeof TicketRow>;

export const TicketEvent = z.object({
  at: Moment,
  who: z.string(),
  kind: z.string(),
  from: z.enum(STAGES).nullable(),
  to: z.enum(STAGES).nullable(),
  note: z.string(),
});

export const TicketDetail = TicketRow.extend({
  version: z.int(),
  symptomText: z.string(),
  accessories: z.array(z.enum(ACCESSORY_CODES)),
  accessoryText: z.string(),
  condition: z.string(),
  estimate: z.object({ total: Money, work: z.string() }).nullable(),
  exception: z.string().nullable(),
  /** How the customer is reached; `version` goes with a correction of it. */
  contact: z.object({
    email: z.string().nullable(),
    phone: z.string().nullable(),
    address: z.string().nullable(),
    version: z.int(),
  }),
  cautions: z.array(z.object({ caution: z.enum(CAUTION_CODES), at: Moment, by: z.string() })),
  steps: z.array(
    z.object({
      step: z.enum(STEPS),
      label: z.string(),
      to: z.enum(STAGES),
      note: z.string().nullable(),
      estimate: z.boolean(),
      blocked: z.string().nullable(),
      /** Why the step is an exception, which its note then signs; the customer reads that note. */
      exception: z.string().nullable(),
    }),
  ),
  events: z.array(TicketEvent),
});

export const Message = z.object({
  id: z.int(),
  side: z.enum(['customer', 'shop']),
  author: z.string(),
  body: z.string(),
  at: Moment,
});

export const QueueQuery = ListQuery.extend({
  q: z.string().trim().max(100).default(''),
  stage: z.enum(['open', 'closed', 'all', ...STAGES]).default('open'),
  who: z.enum(['all', 'mine', 'nobody']).default('all'),
  board: z.string().trim().max(60).default(''),
  sort: withBackwards(QUEUE_SORTS).default('promised'),
  format: z.enum(['json', 'csv']).optional(),
});
export type QueueQuery = z.output<typeof QueueQuery>;

export const TakeStep = z.object({
  step: z.enum(STEPS),
  note: prose(2000).default(''),
  estimate: z
    .object({ total: Money, work: prose(1000, 1) })
    .nullable()
    .default(null),
});

export const ByNumber = z.object({ number: TicketNumber });

export const ticketRoutes = {
  list: defineRoute({
    method: 'GET',
    path: '/api/tickets',
    summary: 'The bench queue.',
    who: 'ticket.read',
    query: QueueQuery,
    answer: listOf(TicketRow),
    status: 200,
    csv: true,
  }),
  intake: defineRoute({
    method: 'POST',
    path: '/api/tickets',
    summary:
      'Take in an instrument. The claim code is answered once, here, and mailed to the customer.',
    who: 'ticket.intake',
    body: Intake,
    answer: z.object({ number: z.string(), claimCode: z.string() }),
    status: 201,
    repeatable: true,
  }),
  read: defineRoute({
    method: 'GET',
    path: '/api/tickets/{number}',
    summary: 'One ticket with its events and the steps you may take.',
    who: 'ticket.read',
    params: ByNumber,
    answer: TicketDetail,
    status: 200,
  }),
  step: defineRoute({
    method: 'POST',
    path: '/api/tickets/{number}/steps',
    summary: 'Move the ticket one step.',
    who: 'ticket.step',
    params: ByNumber,
    body: TakeStep,
    answer: z.object({ stage: z.enum(STAGES), version: z.int() }),
    status: 200,
    versioned: true,
    repeatable: true,
  }),
  caution: defineRoute({
    method: 'PUT',
    path: '/api/tickets/{number}/cautions',
    summary: 'Tick or untick a caution.',
    who: 'ticket.bench',
    params: ByNumber,
    body: z.object({ caution: z.enum(CAUTION_CODES), ticked: z.boolean() }),
    answer: z.object({
      cautions: z.array(z.object({ caution: z.enum(CAUTION_CODES), at: Moment, by: z.string() })),
    }),
    status: 200,
  }),
  assign: defineRoute({
    method: 'PUT',
    path: '/api/tickets/{number}/bench',
    summary: 'Give the ticket to somebody at the bench, or to nobody.',
    who: 'ticket.bench',
    params: ByNumber,
    body: z.object({ personId: Id.nullable() }),
    answer: z.object({ version: z.int() }),
    status: 200,
    versioned: true,
  }),
  messages: defineRoute({
    method: 'GET',
    path: '/api/tickets/{number}/messages',
    summary: 'What the customer and the shop wrote to each other.',
    who: 'ticket.read',
    params: ByNumber,
    answer: z.object({ items: z.array(Message) }),
    status: 200,
  }),
  writeMessage: defineRoute({
    method: 'POST',
    path: '/api/tickets/{number}/messages',
    summary: 'Write to the customer; they are told by e-mail where an address is known.',
    who: 'ticket.message',
    params: ByNumber,
    body: z.object({ body: prose(4000, 1) }),
    answer: Message,
    status: 201,
    repeatable: true,
  }),
  notes: defineRoute({
    method: 'GET',
    path: '/api/tickets/{number}/notes',
    summary: 'Notes among the staff.',
    who: 'ticket.read',
    params: ByNumber,
    answer: z.object({
      items: z.array(z.object({ id: z.int(), author: z.string(), body: z.string(), at: Moment })),
    }),
    status: 200,
  }),
  writeNote: defineRoute({
    method: 'POST',
    path: '/api/tickets/{number}/notes',
    summary: 'Write a note among the staff.',
    who: 'ticket.message',
    params: ByNumber,
    body: z.object({ body: prose(4000, 1) }),
    answer: z.object({ id: z.int(), author: z.string(), body: z.string(), at: Moment }),
    status: 201,
    repeatable: true,
  }),
};
