import { REFUSALS, type FieldError, type Refusal } from '../refusal';

/** The one place where a refusal becomes an answer (RFC 9457). */
export function problemResponse(refusal: Refusal): Response {
  const { status, title } = REFUSALS[refusal.kind];
  const headers = new Headers({ 'content-type': 'application/problem+json' });
  if (refusal.allow) headers.set('allow', refusal.allow);
  if (refusal.retryAfter) headers.set('retry-after', String(refusal.retryAfter));
  if (status === 401) headers.set('www-authenticate', 'Bearer realm="Meterwright"');
  const body = {
    type: `/api/docs#${refusal.kind}`,
    title,
    status,
    detail: refusal.reason,
    ...(refusal.errors ? { errors: refusal.errors } : {}),
    ...refusal.more,
  };
  return new Response(JSON.stringify(body), { status, headers });
}

/** What went wrong inside stays inside: the answer carries the request id and nothing else. */
export function crashResponse(requestId: string): Response {
  const body = {
    type: '/api/docs#crash',
    title: 'Something went wrong on our side',
    status: 500,
    detail: `It was logged. When you report it, give the number ${requestId}.`,
  };
  return new Response(JSON.stringify(body), {
    status: 500,
    headers: { 'content-type': 'application/problem+json' },
  });
}

/** zod's issues as fields with paths like `parts[3].nets[0]`, `most` of them. */
export function fieldErrors(
  issues: readonly { path: PropertyKey[]; message: string }[],
  most = 50,
): FieldError[] {
  return issues.slice(0, most).map((issue) => ({
    path: issue.path
      .map((p, i) => (typeof p === 'number' ? `[${p}]` : i === 0 ? String(p) : `.${String(p)}`))
      .join(''),
    message: issue.message,
  }));
}
