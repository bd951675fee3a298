import { randomUUID } from 'node:crypto';
import type { APIContext } from 'astro';
import { defineMiddleware, sequence } from 'astro:middleware';
import type { Logger } from 'pino';
import { gatePage } from '@/server/auth/gate';
import { readActor } from '@/server/auth/read-actor';
import { refuseAddress } from '@/server/http/api-address';
import { crossSite } from '@/server/http/origin';
import { crashResponse, problemResponse } from '@/server/http/problem';
import { secure } from '@/server/http/headers';
import { plainText, showPage } from '@/server/http/show-page';
import { refuse } from '@/server/refusal';
import { runtime } from '@/server/runtime';

/** Endpoints, and what is asked for under their roof without being there; the page about them is a page. */
const isApi = ({ routePattern, url }: APIContext) =>
  url.pathname.startsWith('/api/') && routePattern !== '/api/docs';

/** The shop cannot be opened: said in the form of whatever was asked for. */
function notOpen(context: APIContext): Response {
  const refusal = refuse(
    'unavailable',
    'The shop’s server is starting or cannot reach its database: try again soon.',
    { retryAfter: 5 },
  );
  return isApi(context)
    ? problemResponse(refusal)
    : plainText(refusal.reason, 503, { 'retry-after': '5' });
}

/** The page for a crash; should that crash too, its sentence alone. */
async function crashPage(context: APIContext, log: Logger, requestId: string): Promise<Response> {
  try {
    return await showPage(context, '/500');
  } catch (error) {
    log.error({ err: error }, 'the page for crashes crashed');
    return plainText(`Something went wrong on our side. Its number is ${requestId}.`, 500);
  }
}

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
  // A page shown instead of the one asked for goes through here again, with all of this done.
  if (context.locals.requestId) return next();
  const started = performance.now();
  const requestId = randomUUID();
  const api = isApi(context);
  context.locals.requestId = requestId;
  let app;
  try {
    app = await runtime();
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    return notOpen(context);
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
    response = api ? crashResponse(requestId) : await crashPage(context, log, requestId);
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
  return secure(response, { requestId, api, app });
});

/** Who asks, and whether another site made the browser ask. */
const person = defineMiddleware(async (context, next) => {
  if (context.locals.actor !== undefined) return next();
  const { app } = context.locals;
  const read = await readActor(
    app,
    context.request,
    context.cookies.get(app.sessions.cookieName)?.value,
    new Date(),
  );
  context.locals.actor = read.actor;
  context.locals.sessionCookie = read.cookie;
  if (!read.byToken && crossSite(context.request, app.settings.origin))
    return problemResponse(
      refuse(
        'not-allowed',
        'The request came from another site: open the page here and repeat it.',
      ),
    );
  const response = await next();
  if (read.renewed && !response.headers.has('set-cookie'))
    response.headers.append('set-cookie', read.renewed);
  return response;
});

/** Pages only: endpoints authorise by their own route. */
const gate = defineMiddleware((context, next) => {
  if (!isApi(context)) return gatePage(context) ?? next();
  const refusal = refuseAddress(context.routePattern, context.request.method);
  return refusal ? problemResponse(refusal) : next();
});

export const onRequest = sequence(boundary, person, gate);
