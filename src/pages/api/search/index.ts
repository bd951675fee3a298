import { searchRoutes } from '@/contracts/search';
import { searchFaults } from '@/server/search/queries';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(searchRoutes.search, async ({ app, query, now }) => {
  const found = await searchFaults(app.db, query, now);
  return found.ok ? done({ json: found.value }) : found;
});
