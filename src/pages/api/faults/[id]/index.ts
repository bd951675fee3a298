import { faultRoutes } from '@/contracts/faults';
import { saveFault } from '@/server/faults/commands';
import { readFault } from '@/server/faults/queries';
import { serve } from '@/server/http/endpoint';
import { absent, done } from '@/server/refusal';

export const GET = serve(faultRoutes.read, async ({ app, actor, params }) => {
  const note = await readFault(app.db, actor, params.id, 'newest');
  return note ? done({ json: note, version: note.version }) : absent('fault note');
});

export const PUT = serve(faultRoutes.save, async ({ app, actor, params, version, body, now }) => {
  const saved = await saveFault(app.db, actor, params.id, version, body, now);
  return saved.ok ? done({ json: saved.value, version: saved.value.version }) : saved;
});
