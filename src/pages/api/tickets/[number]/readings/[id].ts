import { benchRoutes } from '@/contracts/bench';
import { correctReading, strikeReading } from '@/server/bench/commands';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';
import { ticketByNumber } from '@/server/tickets/queries';

export const PATCH = serve(benchRoutes.edit, async ({ app, actor, params, version, body }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  const corrected = await correctReading(app.db, actor, ticket, params.id, version, body);
  return corrected.ok
    ? done({ json: corrected.value, version: corrected.value.version })
    : corrected;
});

export const DELETE = serve(benchRoutes.remove, async ({ app, actor, params, version }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  const struck = await strikeReading(app.db, actor, ticket, params.id, version);
  return struck.ok ? done({ json: null }) : struck;
});
