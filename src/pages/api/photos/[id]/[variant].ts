import { photoRoutes } from '@/contracts/photos';
import { serve } from '@/server/http/endpoint';
import { servePicture } from '@/server/photos/serve';

export const GET = serve(photoRoutes.variant, ({ app, actor, params, request }) =>
  servePicture(app, actor, {
    ...params,
    accept: request.headers.get('accept') ?? '',
    ifNoneMatch: request.headers.get('if-none-match'),
  }),
);
