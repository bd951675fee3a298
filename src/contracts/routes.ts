/** Every endpoint of the API, for the description and for the tests that walk them all. */
import type { Route } from './route';
import { photoRoutes } from './photos';
import { serviceRoutes } from './service';
import { sessionRoutes } from './session';

export const ROUTES: Route[] = [serviceRoutes, sessionRoutes, photoRoutes].flatMap((area) =>
  Object.values(area as Record<string, Route>),
);
