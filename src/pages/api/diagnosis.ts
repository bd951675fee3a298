import { computeRoutes } from '@/contracts/compute';
import { diagnosisRefusal } from '@/server/compute/diagnosis-input';
import { diagnosisOf } from '@/server/compute/queries';
import { serve } from '@/server/http/endpoint';

export const POST = serve(
  computeRoutes.diagnosis,
  async ({ body }) => diagnosisOf(body),
  diagnosisRefusal,
);
