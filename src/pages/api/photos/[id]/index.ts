import { photoRoutes } from '@/contracts/photos';
import { serve } from '@/server/http/endpoint';
import { editPhoto, removePhoto } from '@/server/photos/commands';
import { done } from '@/server/refusal';

export const PATCH = serve(photoRoutes.edit, async ({ app, actor, params, body, version, now }) => {
  const edited = await editPhoto(app, actor, { ...body, id: params.id, version }, now);
  return edited.ok ? done({ json: edited.value, version: edited.value.version }) : edited;
});

export const DELETE = serve(photoRoutes.remove, async ({ app, actor, params, version, now }) => {
  const removed = await removePhoto(app, actor, { id: params.id, version }, now);
  return removed.ok ? done({ json: null }) : removed;
});
