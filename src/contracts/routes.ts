/** Every endpoint of the API, for the description and for the tests that walk them all. */
import type { Route } from './route';
import { auditRoutes } from './audit';
import { benchRoutes } from './bench';
import { computeRoutes } from './compute';
import { correctionRoutes } from './corrections';
import { deskRoutes } from './desk';
import { faultRoutes } from './faults';
import { searchRoutes } from './search';
import { statusRoutes } from './status';
import { ticketRoutes } from './tickets';
import { peopleRoutes } from './people';
import { photoRoutes } from './photos';
import { serviceRoutes } from './service';
import { sessionRoutes } from './session';
import { tokenRoutes } from './tokens';

export const ROUTES: Route[] = [
  serviceRoutes,
  sessionRoutes,
  ticketRoutes,
  correctionRoutes,
  benchRoutes,
  photoRoutes,
  deskRoutes,
  faultRoutes,
  searchRoutes,
  computeRoutes,
  tokenRoutes,
  peopleRoutes,
  auditRoutes,
  statusRoutes,
].flatMap((area) => Object.values(area as Record<string, Route>));
