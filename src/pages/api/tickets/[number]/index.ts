import { correctionRoutes } from '@/contracts/corrections';
import { ticketRoutes } from '@/contracts/tickets';
import { correctIntake } from '@/server/corrections/commands';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';
import { shopOf } from '@/server/shop';
import { ticketByNumber } from '@/server/tickets/queries';
import { ticketDetail } from '@/server/tickets/views';

export const GET = serve(ticketRoutes.read, async ({ app, actor, params }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  return done({ json: await ticketDetail(app.db, ticket, actor.role), version: ticket.version });
});

export const PATCH = serve(
  correctionRoutes.correct,
  async ({ app, actor, params, version, body, now, requestId }) => {
    const asked = { number: params.number, version, correction: body, requestId };
    const made = await correctIntake(app.db, actor, asked, shopOf(app.settings), now);
    return made.ok ? done({ json: made.value, version: made.value.version }) : made;
  },
);
