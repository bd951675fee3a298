/** Turns a route's description and a handler into an Astro endpoint: parse → authorise → call → answer. */
import type { APIContext, APIRoute } from 'astro';
import type { Logger } from 'pino';
import type { AnswerOf, BodyOf, ParamsOf, QueryOf, Route } from '@/contracts/route';
import type { Permission } from '@/domain/people';
import { grant, type Actor, type CustomerActor, type Granted } from '../auth/actor';
import { refuse, type Outcome, type Refusal } from '../refusal';
import { runtime, type Runtime } from '../runtime';
import { onceForKey } from './idempotency';
import { fieldErrors, problemResponse } from './problem';
import { readJson } from './read-body';

type ActorOf<R extends Route> = R['who'] extends Permission
  ? Granted<R['who']>
  : R['who'] extends 'customer'
    ? CustomerActor
    : Actor | null;

export type Call<R extends Route> = {
  actor: ActorOf<R>;
  params: ParamsOf<R>;
  query: QueryOf<R>;
  body: BodyOf<R>;
  /** The version in `If-Match`; 0 where the route is not versioned. */
  version: number;
  now: Date;
  app: Runtime;
  log: Logger;
  requestId: string;
  request: Request;
  /** Where the request came from, for rate limits. */
  address: string;
  /** The value of the session cookie, if one was sent. */
  sessionCookie: string | undefined;
};
/** A JSON value with its version, or a finished response (images, streams, CSV). */
export type Answer<R extends Route> =
  { json: AnswerOf<R>; version?: number; headers?: HeadersInit } | Response;
type Handler<R extends Route> = (call: Call<R>) => Promise<Outcome<Answer<R>>>;

const signedOut = refuse('signed-out', 'You are not signed in, or no longer: sign in first.');

function authorise(route: Route, actor: Actor | null): { actor: Actor | null } | Refusal {
  if (route.who === 'public') return { actor };
  if (!actor) return signedOut;
  if (route.who === 'customer')
    return actor.kind === 'customer'
      ? { actor }
      : refuse('not-allowed', 'This is the customer’s own page: staff use the ticket.');
  return grant(actor, route.who)
    ? { actor }
    : refuse('not-allowed', 'Your role or token may not do this.');
}

function parse(
  schema: Route['body'],
  value: unknown,
  bad: 'bad-request' | 'invalid',
): Outcome<unknown> {
  if (!schema) return { ok: true, value: undefined };
  const parsed = schema.safeParse(value);
  if (parsed.success) return { ok: true, value: parsed.data };
  const errors = fieldErrors(parsed.error.issues);
  return refuse(
    bad,
    errors[0] ? `${errors[0].path || 'body'}: ${errors[0].message}` : 'Not valid.',
    { errors },
  );
}

function readVersion(route: Route, request: Request): Outcome<number> {
  if (!route.versioned) return { ok: true, value: 0 };
  const header = request.headers.get('if-match');
  const version = /^(?:W\/)?"?(\d{1,10})"?$/.exec(header ?? '')?.[1];
  return version
    ? { ok: true, value: Number(version) }
    : refuse('version-needed', 'If-Match is missing or not a version: send the ETag you read.');
}

/** A mistyped filter must not answer the whole list: names that the route does not know are refused. */
function unknownNames(route: Route, given: URLSearchParams): Refusal | null {
  const known = route.query ? Object.keys(route.query.shape) : [];
  const names = [...new Set(given.keys())].filter((name) => !known.includes(name));
  const needed = known.length > 0 ? `known are ${known.join(', ')}` : 'none is taken here';
  const errors = names
    .slice(0, 10)
    .map((name) => ({ path: name.slice(0, 60), message: `Not a query name: ${needed}.` }));
  const [first] = errors;
  return first ? refuse('invalid', `${first.path}: ${first.message}`, { errors }) : null;
}

/** Judges a body before its schema does, where one answer has to name more than a schema can see. */
type BodyRefusal = (raw: unknown) => Refusal | null;

async function answer(
  route: Route,
  context: APIContext,
  bodyRefusal: BodyRefusal | undefined,
): Promise<Response | { call: Call<Route> }> {
  const { actor: who, requestId, log, address, sessionCookie } = context.locals;
  const allowed = authorise(route, who);
  if ('ok' in allowed) return problemResponse(allowed);
  const params = parse(route.params, context.params, 'invalid');
  // A malformed key in the address names nothing: the same answer as for one that is not there.
  if (!params.ok)
    return problemResponse(refuse('absent', 'There is no such thing, or it is not open to you.'));
  const unknown = unknownNames(route, context.url.searchParams);
  if (unknown) return problemResponse(unknown);
  const query = parse(route.query, Object.fromEntries(context.url.searchParams), 'invalid');
  if (!query.ok) return problemResponse(query);
  const version = readVersion(route, context.request);
  if (!version.ok) return problemResponse(version);
  let body: unknown;
  if (route.body) {
    const raw = await readJson(context.request, route.bodyLimit ?? 262_144);
    if (!raw.ok) return problemResponse(raw);
    const refused = bodyRefusal?.(raw.value);
    if (refused) return problemResponse(refused);
    const parsed = parse(route.body, raw.value, 'invalid');
    if (!parsed.ok) return problemResponse(parsed);
    body = parsed.value;
  }
  const call = {
    actor: allowed.actor,
    params: params.value,
    query: query.value,
    body,
    version: version.value,
    now: new Date(),
    app: await runtime(),
    log,
    requestId,
    request: context.request,
    address,
    sessionCookie,
  };
  return { call: call as Call<Route> };
}

function toResponse(route: Route, value: Answer<Route>): Response {
  if (value instanceof Response) return value;
  const headers = new Headers(value.headers);
  if (value.version !== undefined) headers.set('etag', `"${value.version}"`);
  if (route.answer === null) return new Response(null, { status: route.status, headers });
  headers.set('content-type', 'application/json');
  return new Response(JSON.stringify(value.json), { status: route.status, headers });
}

/** The endpoint of a route. */
export function serve<R extends Route>(
  route: R,
  handler: Handler<R>,
  bodyRefusal?: BodyRefusal,
): APIRoute {
  return async (context) => {
    const ready = await answer(route, context, bodyRefusal);
    if (ready instanceof Response) return ready;
    const { call } = ready;
    const run = async (of: Call<Route>): Promise<Response> => {
      const outcome = await handler(of as unknown as Call<R>);
      return outcome.ok
        ? toResponse(route, outcome.value as Answer<Route>)
        : problemResponse(outcome);
    };
    const key = route.repeatable ? call.request.headers.get('idempotency-key') : null;
    if (key === null) return run(call);
    const { app, body, now } = call;
    const userId = (call.actor as Actor | null)?.id ?? 0;
    const response = await onceForKey(
      app.db,
      { userId, key, secret: app.settings.secret },
      { path: context.url.pathname, body, now },
      (db) => run({ ...call, app: { ...app, db, worker: null } }),
    );
    // What the work promised can be seen by the worker only now.
    app.worker?.nudge();
    return response;
  };
}
