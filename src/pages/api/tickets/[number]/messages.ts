import { ticketRoutes } from '@/contracts/tickets';
import { serve } from '@/server/http/endpoint';
import { writeToCustomer } from '@/server/messages/commands';
import { absent, done } from '@/server/refusal';
import { shopOf } from '@/server/shop';
import { messagesOf, ticketByNumber } from '@/server/tickets/queries';
import { writtenView } from '@/server/tickets/views';

export const GET = serve(ticketRoutes.messages, async ({ app, params }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  return done({ json: { items: (await messagesOf(app.db, ticket.id)).map(writtenView) } });
});

export const POST = serve(ticketRoutes.writeMessage, async ({ app, actor, params, body, now }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  const shop = shopOf(app.settings);
  const written = await writeToCustomer(app.db, actor, ticket, body.body, shop, now);
  app.worker?.nudge();
  return done({ json: writtenView(written) });
});
