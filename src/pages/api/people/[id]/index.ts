import { peopleRoutes } from '@/contracts/people';
import { serve } from '@/server/http/endpoint';
import { changePerson } from '@/server/people/commands';
import { done } from '@/server/refusal';

export const PATCH = serve(peopleRoutes.change, async (call) => {
  const { app, actor, params, body, version, requestId, now } = call;
  const input = { id: params.id, version, change: body, requestId };
  const changed = await changePerson(app.db, actor, input, now);
  return changed.ok ? done({ json: changed.value, version: changed.value.version }) : changed;
});
