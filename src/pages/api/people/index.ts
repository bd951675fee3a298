import { peopleRoutes } from '@/contracts/people';
import { wantsCsv } from '@/server/http/csv';
import { serve } from '@/server/http/endpoint';
import { invitePerson } from '@/server/people/commands';
import { peopleFile, peoplePage } from '@/server/people/views';
import { done } from '@/server/refusal';
import { shopOf } from '@/server/shop';

export const GET = serve(peopleRoutes.list, async ({ app, query, request }) => {
  if (wantsCsv(request)) return done(peopleFile(request, app.db, query));
  const page = await peoplePage(app.db, query);
  return page.ok ? done({ json: page.value }) : page;
});

export const POST = serve(peopleRoutes.invite, async ({ app, actor, body, requestId, now }) => {
  const shop = shopOf(app.settings);
  const invited = await invitePerson(app.db, actor, { ...body, requestId }, shop, now);
  if (!invited.ok) return invited;
  app.worker?.nudge();
  return done({ json: invited.value, version: invited.value.version });
});
