import { faultRoutes } from '@/contracts/faults';
import { draftFault } from '@/server/faults/commands';
import { everyFault, listFaults } from '@/server/faults/queries';
import { faultsCsv } from '@/server/faults/views';
import { wantsCsv } from '@/server/http/csv';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(faultRoutes.list, async ({ app, actor, query, request }) => {
  if (wantsCsv(request)) return done(faultsCsv(request, everyFault(app.db, actor, query)));
  const page = await listFaults(app.db, actor, query);
  return page.ok ? done({ json: page.value }) : page;
});

export const POST = serve(faultRoutes.create, async ({ app, actor, body, now }) => {
  const made = await draftFault(app.db, actor, body, now);
  if (!made.ok) return made;
  const { id, version } = made.value;
  return done({ json: made.value, version, headers: { location: `/api/faults/${id}` } });
});
