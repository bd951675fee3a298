import { deskRoutes } from '@/contracts/desk';
import { findInstruments } from '@/server/instruments/queries';
import { serve } from '@/server/http/endpoint';
import { pageByOffset } from '@/server/http/pages';

export const GET = serve(deskRoutes.instruments, ({ app, query }) =>
  pageByOffset(query, (limit, offset) => findInstruments(app.db, query.q, limit, offset)),
);
