import { randomUUID } from 'node:crypto';
import type { APIContext } from 'astro';
import { defineMiddleware, sequence } from 'astro:middleware';
import { gatePage } from '@/server/auth/gate';
import { readActor } from '@/server/auth/read-actor';
import { crossSite } from '@/server/http/origin';
import { crashResponse, problemResponse } from '@/server/http/problem';
import { secure } from '@/server/http/headers';
import { runtime } from '@/server/runtime';

const isApi = (path: string) => path.startsWith('/api/') && path !== '/api/docs';

/**
 * Where the request came from. Astro's clientAddress believes any X-Forwarded-For, so without a trusted proxy
 * those who send one share one bucket of the rate limits.
 */
function addressOf(context: APIContext, trustProxy: boolean): string {
  const forwarded = context.request.headers.get('x-forwarded-for');
  if (forwarded === null) return context.clientAddress;
  return trustProxy ? (forwarded.split(',').at(-1)?.trim() ?? 'unknown') : 'forged';
}

/** Request id, log line, one error boundary, security headers. */
const boundary = defineMiddleware(async (context, next) => {
  const started = performance.now();
  const requestId = randomUUID();
  const { pathname } = context.url;
  context.locals.requestId = requestId;
  let app;
  try {
    app = await runtime();
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    return problemResponse({
      ok: false,
      kind: 'unavailable',
      reason: 'The shop’s server is starting or cannot reach its database: try again soon.',
      retryAfter: 5,
    });
  }
  const log = app.log.child({ requestId });
  context.locals.app = app;
  context.locals.log = log;
  context.locals.address = addressOf(context, app.settings.trustProxy);
  let response: Response;
  try {
    response = await next();
  } catch (error) {
    log.error({ err: error, path: context.routePattern }, 'crashed');
    response = isApi(pathname) ? crashResponse(requestId) : await context.rewrite('/500');
  }
  // The route's pattern is logged, not the address: addresses can hold one-time secrets.
  log.info(
    {
      method: context.request.method,
      route: context.routePattern,
      status: response.status,
      ms: Math.round(performance.now() - started),
      person: context.locals.actor?.id,
    },
    'request',
  );
  return secure(response, { requestId, api: isApi(pathname), app });
});

/** Who asks, and whether another site made the browser ask. */
const person = defineMiddleware(async (context, next) => {
  const { app } = context.locals;
  const read = await readActor(
    app,
    context.request,
    context.cookies.get(app.sessions.cookieName)?.value,
    new Date(),
  );
  context.locals.actor = read.actor;
  context.locals.sessionCookie = read.cookie;
  if (
    !read.byToken &&
    crossSite(context.request, app.settings.origin) &&
    context.url.pathname !== '/api/payments/webhook'
  )
    return problemResponse({
      ok: false,
      kind: 'not-allowed',
      reason: 'The request came from another site: open the page here and repeat it.',
    });
  const response = await next();
  if (read.renewed && !response.headers.has('set-cookie'))
    response.headers.append('set-cookie', read.renewed);
  return response;
});

/** Pages only: endpoints authorise by their own route. */
const gate = defineMiddleware((context, next) => {
  if (isApi(context.url.pathname)) return next();
  return gatePage(context) ?? next();
});

export const onRequest = sequence(boundary, person, gate);
