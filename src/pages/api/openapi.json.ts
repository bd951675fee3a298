import { describeApi } from '@/contracts/openapi';
import { serviceRoutes } from '@/contracts/service';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(serviceRoutes.openapi, async ({ app }) =>
  done({ json: describeApi(app.settings.origin) }),
);
