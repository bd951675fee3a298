import { photoRoutes } from '@/contracts/photos';
import { serve } from '@/server/http/endpoint';
import { addPin } from '@/server/photos/pins';
import { photoByPublicId, pinsOf } from '@/server/photos/queries';
import { absent, done } from '@/server/refusal';

export const GET = serve(photoRoutes.pins, async ({ app, params }) => {
  const photo = await photoByPublicId(app.db, params.id);
  if (photo?.state !== 'ready') return absent('photo');
  return done({ json: { items: await pinsOf(app.db, photo.id), next: null } });
});

export const POST = serve(photoRoutes.addPin, async ({ app, actor, params, body, now }) => {
  const pin = await addPin(app.db, actor, { ...body, photo: params.id }, now);
  return pin.ok ? done({ json: pin.value, version: pin.value.version }) : pin;
});
