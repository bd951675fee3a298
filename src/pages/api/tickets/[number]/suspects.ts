import { benchRoutes } from '@/contracts/bench';
import { suspectsOf } from '@/server/bench/queries';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';
import { ticketByNumber } from '@/server/tickets/queries';

export const GET = serve(benchRoutes.suspects, async ({ app, params, query }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  return done({ json: await suspectsOf(app.db, ticket, query.phase) });
});
