import { peopleRoutes } from '@/contracts/people';
import { serve } from '@/server/http/endpoint';
import { inviteAgain } from '@/server/people/commands';
import { done } from '@/server/refusal';
import { shopOf } from '@/server/shop';

export const POST = serve(peopleRoutes.inviteAgain, async (call) => {
  const { app, actor, params, requestId, now } = call;
  const input = { id: params.id, requestId };
  const sent = await inviteAgain(app.db, actor, input, shopOf(app.settings), now);
  if (!sent.ok) return sent;
  app.worker?.nudge();
  return done({ json: null });
});
