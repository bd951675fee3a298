import { benchRoutes } from '@/contracts/bench';
import { enterReading } from '@/server/bench/commands';
import { sheetOf } from '@/server/bench/queries';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';
import { ticketByNumber } from '@/server/tickets/queries';

export const GET = serve(benchRoutes.list, async ({ app, params }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  return done({ json: { items: await sheetOf(app.db, ticket.id) } });
});

export const POST = serve(benchRoutes.add, async ({ app, actor, params, body, now }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  const entered = await enterReading(app.db, actor, ticket, body, now);
  return entered.ok ? done({ json: entered.value, version: entered.value.version }) : entered;
});
