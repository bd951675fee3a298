import { ticketRoutes } from '@/contracts/tickets';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';
import { ticketByNumber } from '@/server/tickets/queries';
import { ticketDetail } from '@/server/tickets/views';

export const GET = serve(ticketRoutes.read, async ({ app, actor, params }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  return done({ json: await ticketDetail(app.db, ticket, actor.role), version: ticket.version });
});
