import { ticketRoutes } from '@/contracts/tickets';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';
import { shopOf } from '@/server/shop';
import { takeStep } from '@/server/tickets/commands';

export const POST = serve(ticketRoutes.step, async ({ app, actor, params, version, body, now }) => {
  const { number } = params;
  const taken = await takeStep(app.db, actor, number, version, body, shopOf(app.settings), now);
  if (!taken.ok) return taken;
  app.worker?.nudge();
  return done({ json: taken.value, version: taken.value.version });
});
