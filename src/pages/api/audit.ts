import { auditRoutes } from '@/contracts/audit';
import { auditFile, auditPage } from '@/server/audit/views';
import { wantsCsv } from '@/server/http/csv';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(auditRoutes.list, async ({ app, query, request }) => {
  const zone = app.settings.shop.timeZone;
  if (wantsCsv(request)) return done(auditFile(request, app.db, query, zone));
  const page = await auditPage(app.db, query, zone);
  return page.ok ? done({ json: page.value }) : page;
});
