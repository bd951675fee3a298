import * as z from 'zod/v4';
import { defineRoute } from './route';

export const serviceRoutes = {
  live: defineRoute({
    method: 'GET',
    path: '/api/health/live',
    summary: 'The process answers.',
    who: 'public',
    answer: z.object({ live: z.literal(true) }),
    status: 200,
  }),
  ready: defineRoute({
    method: 'GET',
    path: '/api/health/ready',
    summary: 'Database and object store answer too.',
    who: 'public',
    answer: z.object({ ready: z.boolean(), database: z.boolean(), store: z.boolean() }),
    status: 200,
  }),
  openapi: defineRoute({
    method: 'GET',
    path: '/api/openapi.json',
    summary: 'This description, as OpenAPI 3.1.',
    who: 'public',
    answer: z.record(z.string(), z.unknown()),
    status: 200,
  }),
};
