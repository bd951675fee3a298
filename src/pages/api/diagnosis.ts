import { computeRoutes } from '@/contracts/compute';
import { diagnosisOf } from '@/server/compute/queries';
import { serve } from '@/server/http/endpoint';

export const POST = serve(computeRoutes.diagnosis, async ({ body }) => diagnosisOf(body));
