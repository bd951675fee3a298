import { faultRoutes } from '@/contracts/faults';
import { revisionsOf } from '@/server/faults/queries';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';

export const GET = serve(faultRoutes.revisions, async ({ app, actor, params }) => {
  const items = await revisionsOf(app.db, actor, params.id);
  return items ? done({ json: { items, next: null } }) : absent('fault note');
});
