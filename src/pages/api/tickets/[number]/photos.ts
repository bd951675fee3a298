import { photoRoutes } from '@/contracts/photos';
import { serve } from '@/server/http/endpoint';
import { beginPhoto } from '@/server/photos/commands';
import { photosOfTicket, ticketOfPhotos } from '@/server/photos/queries';
import { absent, done } from '@/server/refusal';

export const GET = serve(photoRoutes.list, async ({ app, params }) => {
  const ticket = await ticketOfPhotos(app.db, params.number);
  if (!ticket) return absent('ticket');
  return done({ json: { items: await photosOfTicket(app.db, ticket.id), next: null } });
});

export const POST = serve(photoRoutes.begin, async ({ app, actor, params, body, now }) => {
  const begun = await beginPhoto(app, actor, { ...body, number: params.number }, now);
  return begun.ok ? done({ json: begun.value }) : begun;
});
