import { ticketRoutes } from '@/contracts/tickets';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';
import { assign } from '@/server/tickets/commands';
import { ticketByNumber } from '@/server/tickets/queries';

export const PUT = serve(
  ticketRoutes.assign,
  async ({ app, actor, params, version, body, now }) => {
    const ticket = await ticketByNumber(app.db, params.number);
    if (!ticket) return absent('ticket');
    const given = await assign(app.db, actor, ticket, body.personId, version, now);
    return given.ok ? done({ json: given.value, version: given.value.version }) : given;
  },
);
