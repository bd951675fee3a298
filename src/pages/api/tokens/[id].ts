import { revokeToken } from '@/server/tokens/commands';
import { tokenRoutes } from '@/contracts/tokens';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const DELETE = serve(tokenRoutes.revoke, async (call) => {
  const { app, actor, params, requestId, now } = call;
  const revoked = await revokeToken(app.db, actor, { id: params.id, requestId }, now);
  return revoked.ok ? done({ json: null }) : revoked;
});
