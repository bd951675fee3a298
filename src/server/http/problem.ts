import { NOTHING_GIVEN, NO_FORM_FITS } from '@/contracts/wrong-words';
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

type Issue = {
  path: PropertyKey[];
  message: string;
  code?: string;
  /** Of a union: why each of its forms did not fit. */
  errors?: Issue[][];
};

const lacking = (form: Issue[]) =>
  form.some(({ code, message }) => code === 'invalid_type' && message === NOTHING_GIVEN);

/**
 * Where one of several forms was to be given, what is wrong is told of the form that was meant: the one of which
 * nothing is missing.
 */
function ofMeantForm(issue: Issue): Issue[] {
  const { errors: forms = [], message, path } = issue;
  if (forms.length === 0 || message !== NO_FORM_FITS) return [issue];
  const whole = forms.filter((form) => !lacking(form));
  const plain = forms.every((form) => form.every((one) => one.path.length === 0));
  const meant = whole.length === 1 ? whole[0] : plain ? forms[0] : forms.at(-1);
  return (meant ?? []).flatMap((one) => ofMeantForm({ ...one, path: [...path, ...one.path] }));
}

/** zod's issues as fields with paths like `parts[3].nets[0]`, `most` of them. */
export function fieldErrors(issues: readonly Issue[], most = 50): FieldError[] {
  return issues
    .slice(0, most)
    .flatMap(ofMeantForm)
    .slice(0, most)
    .map((issue) => ({
      path: issue.path
        .map((p, i) => (typeof p === 'number' ? `[${p}]` : i === 0 ? String(p) : `.${String(p)}`))
        .join(''),
      message: issue.message,
    }));
}
