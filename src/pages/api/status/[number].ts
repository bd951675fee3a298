import { statusRoutes } from '@/contracts/status';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';
import { ownStatus } from '@/server/status/queries';

export const GET = serve(statusRoutes.read, async ({ app, actor, params }) => {
  const status = await ownStatus(app.db, actor, params.number);
  return status.ok ? done({ json: status.value, version: status.value.version }) : status;
});
