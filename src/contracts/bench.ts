/** The bench sheet of a ticket and what the readings say. */
import * as z from 'zod/v4';
import { MODES, PART_KINDS } from '@/domain/parts/kinds';
import { Id, TicketNumber, line } from './common';
import { defineRoute } from './route';
import { DiagnosisAnswer } from './compute';
import { ByNumber } from './tickets';

export const PHASES = ['as-found', 'after-repair'] as const;

const where = {
  phase: z.enum(PHASES),
  /** Order on the sheet. */
  place: z.int().min(0).max(10_000),
  from: line(40).nullable().default(null),
  to: line(40).nullable().default(null),
  /** Instead of two points: one part by its reference. */
  part: line(20).nullable().default(null),
  position: line(40).nullable().default(null),
  lifted: z.array(line(20, 1)).max(10).default([]),
  /** As typed, in trade notation. */
  typed: line(40, 1),
};

export const NewReading = z.object({ ...where, clientKey: z.uuid() });
export type NewReading = z.output<typeof NewReading>;
export const EditReading = z.object(where);
export type EditReading = z.output<typeof EditReading>;

export const Ohms = z.union(
  [z.number(), z.literal('OL')],
  'Not a resistance: ohms as a number, or OL, are needed.',
);

export const BenchReading = z.object({
  id: z.int(),
  clientKey: z.string(),
  ...where,
  value: Ohms,
  resolution: z.number().nullable(),
  by: z.string(),
  version: z.int(),
});
export type BenchReading = z.input<typeof BenchReading>;

/** One part judged alone: no network, or a reading taken straight on the part. */
export const PartVerdict = z.object({
  reading: z.int(),
  ref: z.string(),
  kind: z.enum(PART_KINDS),
  verdict: z.enum(['fits', 'suspect', 'inconclusive']),
  mode: z.enum(MODES).nullable(),
  probability: z.number(),
  reasons: z.array(z.string()),
  next: z.string().nullable(),
});

export const Suspects = z.object({
  /**
   * Null when the board has no network or no reading between its points. Its `doubtful` count the readings as
   * `expected` lists them.
   */
  diagnosis: DiagnosisAnswer.nullable(),
  /** What the healthy network would show, by reading id; half-width `band` as a fraction. */
  expected: z.array(z.object({ reading: z.int(), ohms: Ohms, band: z.number() })),
  alone: z.array(PartVerdict),
  /** Readings that could not be used, and why. */
  unused: z.array(z.object({ reading: z.int(), reason: z.string() })),
  /** A sentence for every part that the readings accuse or clear, and the reading it quotes. */
  said: z.array(z.object({ ref: z.string(), words: z.string(), reading: z.int().nullable() })),
});
export type Suspects = z.input<typeof Suspects>;

const OneReading = z.object({ number: TicketNumber, id: Id });

export const benchRoutes = {
  list: defineRoute({
    method: 'GET',
    path: '/api/tickets/{number}/readings',
    summary: 'The bench sheet.',
    who: 'ticket.read',
    params: ByNumber,
    answer: z.object({ items: z.array(BenchReading) }),
    status: 200,
  }),
  add: defineRoute({
    method: 'POST',
    path: '/api/tickets/{number}/readings',
    summary: 'Enter a reading. The same clientKey twice is one row.',
    who: 'ticket.bench',
    params: ByNumber,
    body: NewReading,
    answer: BenchReading,
    status: 201,
    repeatable: true,
  }),
  edit: defineRoute({
    method: 'PATCH',
    path: '/api/tickets/{number}/readings/{id}',
    summary: 'Correct a reading.',
    who: 'ticket.bench',
    params: OneReading,
    body: EditReading,
    answer: BenchReading,
    status: 200,
    versioned: true,
  }),
  remove: defineRoute({
    method: 'DELETE',
    path: '/api/tickets/{number}/readings/{id}',
    summary: 'Strike a reading.',
    who: 'ticket.bench',
    params: OneReading,
    answer: null,
    status: 204,
    versioned: true,
  }),
  suspects: defineRoute({
    method: 'GET',
    path: '/api/tickets/{number}/suspects',
    summary: 'What the readings of a phase say of the parts.',
    who: 'ticket.read',
    params: ByNumber,
    query: z.object({ phase: z.enum(PHASES).default('as-found') }),
    answer: Suspects,
    status: 200,
  }),
};
