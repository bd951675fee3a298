/** Looking up customers, instruments, models and boards at the counter and the bench. */
import * as z from 'zod/v4';
import { PART_KINDS } from '@/domain/parts/kinds';
import { STAGES } from '@/domain/tickets/stages';
import { Id, ListQuery, Moment, listOf } from './common';
import { defineRoute } from './route';

const Find = ListQuery.extend({ q: z.string().trim().max(100).default('') });

export const Customer = z.object({
  id: z.int(),
  name: z.string(),
  email: z.string().nullable(),
  phone: z.string().nullable(),
  address: z.string().nullable(),
});
export const Model = z.object({
  id: z.int(),
  maker: z.string(),
  name: z.string(),
  category: z.string(),
  board: z.object({ id: z.int(), code: z.string() }).nullable(),
});
export const Instrument = z.object({
  id: z.int(),
  maker: z.string(),
  model: z.string(),
  serial: z.string(),
  customer: z.object({ id: z.int(), name: z.string() }),
  tickets: z.array(
    z.object({
      number: z.string(),
      stage: z.enum(STAGES),
      receivedAt: Moment,
      symptoms: z.string(),
    }),
  ),
});
export const BoardRow = z.object({
  id: z.int(),
  code: z.string(),
  revision: z.string(),
  maker: z.string(),
  parts: z.int(),
  labels: z.array(z.string()),
  tickets: z.int(),
});
/** The network as `POST /api/diagnosis` takes it, with what the shop calls things. */
export const BoardNetwork = z.object({
  positions: z.array(z.string()),
  nets: z.array(z.object({ name: z.string(), label: z.string(), probe: z.boolean() })),
  parts: z.array(
    z.object({
      id: z.int(),
      ref: z.string(),
      kind: z.enum(PART_KINDS),
      nets: z.tuple([z.string(), z.string()]).nullable(),
      ohms: z.number().nullable(),
      tolerance: z.number().nullable(),
      closed: z.array(z.string()).nullable(),
      value: z.string(),
      protection: z.boolean(),
      note: z.string(),
    }),
  ),
});

export const deskRoutes = {
  customers: defineRoute({
    method: 'GET',
    path: '/api/customers',
    summary: 'Find customers by name, e-mail or phone.',
    who: 'ticket.intake',
    query: Find,
    answer: listOf(Customer),
    status: 200,
  }),
  models: defineRoute({
    method: 'GET',
    path: '/api/models',
    summary: 'The labels the shop knows, with their boards.',
    who: 'ticket.read',
    query: Find,
    answer: listOf(Model),
    status: 200,
  }),
  instruments: defineRoute({
    method: 'GET',
    path: '/api/instruments',
    summary: 'Find instruments by serial number, with their history.',
    who: 'ticket.read',
    query: Find,
    answer: listOf(Instrument),
    status: 200,
  }),
  boards: defineRoute({
    method: 'GET',
    path: '/api/boards',
    summary: 'The boards the shop knows.',
    who: 'board.read',
    query: Find,
    answer: listOf(BoardRow),
    status: 200,
  }),
  network: defineRoute({
    method: 'GET',
    path: '/api/boards/{id}/network',
    summary: 'The input network of a board.',
    who: 'board.read',
    params: z.object({ id: Id }),
    answer: BoardNetwork,
    status: 200,
  }),
};
