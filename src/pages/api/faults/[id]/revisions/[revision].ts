import { faultRoutes } from '@/contracts/faults';
import { revisionOf } from '@/server/faults/queries';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';

export const GET = serve(faultRoutes.revision, async ({ app, actor, params }) => {
  const revision = await revisionOf(app.db, actor, params.id, params.revision);
  return revision ? done({ json: revision }) : absent('revision');
});
