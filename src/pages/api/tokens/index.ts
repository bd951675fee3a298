import { tokenRoutes } from '@/contracts/tokens';
import { createToken } from '@/server/tokens/commands';
import { listTokens } from '@/server/tokens/queries';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(tokenRoutes.list, async ({ app, actor }) =>
  done({ json: { items: await listTokens(app.db, actor.id) } }),
);

export const POST = serve(tokenRoutes.create, async ({ app, actor, body, requestId, now }) => {
  const stop = await app.limits.take('token', String(actor.id));
  if (stop) return stop;
  const made = await createToken(app.db, actor, { ...body, requestId }, now);
  return made.ok ? done({ json: made.value }) : made;
});
