/** What a customer sees of their own ticket, and nothing else. */
import * as z from 'zod/v4';
import { STAGES } from '@/domain/tickets/stages';
import { Email, Moment, Money, TicketNumber, prose } from './common';
import { defineRoute } from './route';

export const ClaimForm = z.object({
  number: TicketNumber,
  code: z
    .string()
    .trim()
    .max(40, 'Too long for a claim code.')
    .regex(
      /^[0-9A-Za-z][0-9A-Za-z -]{7,}$/,
      'Not a claim code: it stands on your receipt, like K7Q4-9WMT-2X.',
    ),
});
export const LinkForm = z.object({ email: Email });
export const MessageForm = z.object({ body: prose(4000, 1) });

export const Status = z.object({
  number: z.string(),
  stage: z.enum(STAGES),
  /** Where the line was left for a side exit. */
  leftAt: z.enum(STAGES).nullable(),
  headline: z.string(),
  instrument: z.object({ maker: z.string(), model: z.string(), serial: z.string() }),
  accessories: z.array(z.string()),
  promisedOn: z.string().nullable(),
  history: z.array(z.object({ at: Moment, stage: z.enum(STAGES), words: z.string() })),
  photos: z.array(
    z.object({ id: z.string(), caption: z.string(), width: z.int(), height: z.int() }),
  ),
  estimate: z.object({ total: Money, work: z.string(), open: z.boolean() }).nullable(),
  exception: z.string().nullable(),
  cautions: z.array(z.string()),
  messages: z.array(z.object({ side: z.enum(['customer', 'shop']), body: z.string(), at: Moment })),
  version: z.int(),
});
export type Status = z.input<typeof Status>;

export const statusRoutes = {
  read: defineRoute({
    method: 'GET',
    path: '/api/status/{number}',
    summary: 'A customer’s own ticket.',
    who: 'customer',
    params: z.object({ number: TicketNumber }),
    answer: Status,
    status: 200,
  }),
};
