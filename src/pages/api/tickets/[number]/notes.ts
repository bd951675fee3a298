import { ticketRoutes } from '@/contracts/tickets';
import { serve } from '@/server/http/endpoint';
import { writeNote } from '@/server/messages/commands';
import { absent, done } from '@/server/refusal';
import { notesOf, ticketByNumber } from '@/server/tickets/queries';

export const GET = serve(ticketRoutes.notes, async ({ app, params }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  const items = await notesOf(app.db, ticket.id);
  return done({ json: { items: items.map((n) => ({ ...n, at: n.at.toISOString() })) } });
});

export const POST = serve(ticketRoutes.writeNote, async ({ app, actor, params, body, now }) => {
  const ticket = await ticketByNumber(app.db, params.number);
  if (!ticket) return absent('ticket');
  const note = await writeNote(app.db, actor, ticket.id, body.body, now);
  return done({ json: { ...note, at: note.at.toISOString() } });
});
