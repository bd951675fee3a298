import { deskRoutes } from '@/contracts/desk';
import { findModels } from '@/server/boards/queries';
import { serve } from '@/server/http/endpoint';
import { pageByOffset } from '@/server/http/pages';

export const GET = serve(deskRoutes.models, ({ app, query }) =>
  pageByOffset(query, (limit, offset) => findModels(app.db, query.q, limit, offset)),
);
