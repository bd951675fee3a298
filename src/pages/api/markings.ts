import { computeRoutes } from '@/contracts/compute';
import { decodeMarking } from '@/domain/markings/decode';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(computeRoutes.markings, async ({ query }) =>
  done({ json: { readings: decodeMarking(query.text, query.kind).map((r) => ({ ...r })) } }),
);
