import { searchRoutes } from '@/contracts/search';
import { suggestionSet } from '@/server/search/queries';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const GET = serve(searchRoutes.suggestions, async ({ app, now }) =>
  done({ json: await suggestionSet(app.db, now) }),
);
