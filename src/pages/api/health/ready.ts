import { serviceRoutes } from '@/contracts/service';
import { serve } from '@/server/http/endpoint';
import { checkServices } from '@/server/health/queries';
import { done, refuse } from '@/server/refusal';

export const GET = serve(serviceRoutes.ready, async ({ app }) => {
  const found = await checkServices(app);
  return found.ready
    ? done({ json: found })
    : refuse('unavailable', 'The database or the object store does not answer.', { more: found });
});
