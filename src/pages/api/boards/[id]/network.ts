import { deskRoutes } from '@/contracts/desk';
import { boardNetwork } from '@/server/boards/queries';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';

export const GET = serve(deskRoutes.network, async ({ app, params }) => {
  const found = await boardNetwork(app.db, params.id);
  if (!found) return absent('board');
  const { board, ...network } = found;
  return done({ json: network, version: board.version });
});
