import { deskRoutes } from '@/contracts/desk';
import { listBoards } from '@/server/boards/queries';
import { serve } from '@/server/http/endpoint';
import { pageByOffset } from '@/server/http/pages';

export const GET = serve(deskRoutes.boards, ({ app, query }) =>
  pageByOffset(query, (limit, offset) => listBoards(app.db, query.q, limit, offset)),
);
