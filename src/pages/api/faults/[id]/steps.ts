import { faultRoutes } from '@/contracts/faults';
import { takeFaultStep } from '@/server/faults/commands';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const POST = serve(faultRoutes.step, async ({ app, actor, params, version, body, now }) => {
  const moved = await takeFaultStep(app.db, actor, params.id, version, body, now);
  return moved.ok ? done({ json: moved.value, version: moved.value.version }) : moved;
});
