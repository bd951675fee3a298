import { ticketRoutes } from '@/contracts/tickets';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';
import { tickCaution } from '@/server/tickets/commands';
import { cautionsOf, ticketByNumber } from '@/server/tickets/queries';
import { cautionList } from '@/server/tickets/views';

export const PUT = serve(ticketRoutes.caution, async ({ app, actor, params, body, now }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  const ticked = await tickCaution(app.db, actor, ticket, body.caution, body.ticked, now);
  if (!ticked.ok) return ticked;
  return done({ json: { cautions: cautionList(await cautionsOf(app.db, ticket.id)) } });
});
