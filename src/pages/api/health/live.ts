import { serviceRoutes } from '@/contracts/service';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(serviceRoutes.live, async () => done({ json: { live: true as const } }));
