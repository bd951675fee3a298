import { createServer, type IncomingMessage, type Server } from 'node:http';
import { Refused, sendJson } from './json-http';
import { isForeign } from './loopback';

/** What a control port answers: `'GET /requests'` to a function whose value is sent as JSON. */
export type ControlRoutes = Record<string, (request: IncomingMessage) => unknown>;

/** The HTTP server of a control port. Knows `GET /health` by itself. */
export function controlServer(routes: ControlRoutes): Server {
  const all: ControlRoutes = { 'GET /health': () => ({ ok: true }), ...routes };
  return createServer((request, response) => {
    const path = (request.url ?? '/').split('?')[0];
    const route = all[`${request.method} ${path}`];
    const answer = async () => {
      if (isForeign(request)) throw new Refused(403, 'the control port answers this machine only');
      if (route === undefined) {
        throw new Refused(404, `no such verb; known: ${Object.keys(all).join(', ')}`);
      }
      return route(request);
    };
    answer().then(
      (value) => sendJson(response, 200, value),
      (error: unknown) => {
        if (error instanceof Refused) sendJson(response, error.status, { error: error.message });
        else {
          console.error(error);
          sendJson(response, 500, { error: 'the control port failed' });
        }
      },
    );
  });
}
