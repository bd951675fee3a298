import { deskRoutes } from '@/contracts/desk';
import { findCustomers } from '@/server/customers/queries';
import { serve } from '@/server/http/endpoint';
import { pageByOffset } from '@/server/http/pages';

export const GET = serve(deskRoutes.customers, ({ app, query }) =>
  pageByOffset(query, (limit, offset) => findCustomers(app.db, query.q, limit, offset)),
);
