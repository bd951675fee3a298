import { photoRoutes } from '@/contracts/photos';
import { serve } from '@/server/http/endpoint';
import { completePhoto } from '@/server/photos/commands';
import { done } from '@/server/refusal';

export const POST = serve(photoRoutes.done, async ({ app, actor, params, now }) => {
  const photo = await completePhoto(app, actor, params.id, now);
  return photo.ok ? done({ json: photo.value, version: photo.value.version }) : photo;
});
