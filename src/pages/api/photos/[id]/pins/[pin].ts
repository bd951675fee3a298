import { photoRoutes } from '@/contracts/photos';
import { serve } from '@/server/http/endpoint';
import { editPin, removePin } from '@/server/photos/pins';
import { done } from '@/server/refusal';

export const PATCH = serve(photoRoutes.editPin, async (call) => {
  const { app, actor, params, body, version, now } = call;
  const pin = { ...body, photo: params.id, pin: params.pin, version };
  const edited = await editPin(app.db, actor, pin, now);
  return edited.ok ? done({ json: edited.value, version: edited.value.version }) : edited;
});

export const DELETE = serve(photoRoutes.removePin, async ({ app, actor, params, version, now }) => {
  const removed = await removePin(
    app.db,
    actor,
    { photo: params.id, pin: params.pin, version },
    now,
  );
  return removed.ok ? done({ json: null }) : removed;
});
