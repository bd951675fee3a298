import { ticketRoutes } from '@/contracts/tickets';
import { wantsCsv } from '@/server/http/csv';
import { serve } from '@/server/http/endpoint';
import { takeIn } from '@/server/intake/commands';
import { done } from '@/server/refusal';
import { shopOf } from '@/server/shop';
import { queueCsv, ticketPage } from '@/server/tickets/views';

export const GET = serve(ticketRoutes.list, async ({ app, actor, query, request }) =>
  wantsCsv(request)
    ? done(queueCsv(app.db, request, query, actor.id))
    : ticketPage(app.db, query, actor.id),
);

export const POST = serve(ticketRoutes.intake, async ({ app, actor, body, now }) => {
  const taken = await takeIn(app.db, actor, body, shopOf(app.settings), now);
  if (!taken.ok) return taken;
  app.worker?.nudge();
  return done({
    json: taken.value,
    headers: { location: `/api/tickets/${taken.value.number}` },
  });
});
