import { computeRoutes } from '@/contracts/compute';
import { partCheckOf } from '@/server/compute/queries';
import { serve } from '@/server/http/endpoint';

export const POST = serve(computeRoutes.partCheck, async ({ body }) => partCheckOf(body));
