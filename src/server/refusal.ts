/** An expected refusal is a value; one table maps it to HTTP, for endpoints and pages alike. */

export const REFUSALS = {
  'bad-request': { status: 400, title: 'The request cannot be read' },
  'signed-out': { status: 401, title: 'Sign-in is needed' },
  'not-allowed': { status: 403, title: 'Not allowed' },
  absent: { status: 404, title: 'Not there' },
  'wrong-method': { status: 405, title: 'The address does not take that method' },
  'not-acceptable': { status: 406, title: 'That form of answer is not offered' },
  conflict: { status: 409, title: 'Not possible as things stand' },
  stale: { status: 412, title: 'Somebody changed it meanwhile' },
  'too-large': { status: 413, title: 'Too much' },
  'wrong-media': { status: 415, title: 'That kind of content is not taken' },
  invalid: { status: 422, title: 'Some fields need another value' },
  'version-needed': { status: 428, title: 'The version is missing' },
  'too-many': { status: 429, title: 'Too many tries' },
  unavailable: { status: 503, title: 'Not available right now' },
} as const;
export type RefusalKind = keyof typeof REFUSALS;

export type FieldError = { path: string; message: string };
export type Refusal = {
  ok: false;
  kind: RefusalKind;
  reason: string;
  errors?: FieldError[];
  /** Seconds, with `too-many`. */
  retryAfter?: number;
  /** Methods, with `wrong-method`. */
  allow?: string;
  /** More members of the problem answer, such as both versions of a stale edit. */
  more?: Record<string, unknown>;
};
export type Done<T> = { ok: true; value: T };
export type Outcome<T> = Done<T> | Refusal;

export const done = <T>(value: T): Done<T> => ({ ok: true, value });
export const refuse = (
  kind: RefusalKind,
  reason: string,
  more: Omit<Refusal, 'ok' | 'kind' | 'reason'> = {},
): Refusal => ({ ok: false, kind, reason, ...more });

/** A refusal of one field. */
export const refuseField = (path: string, message: string): Refusal =>
  refuse('invalid', message, { errors: [{ path, message }] });

/** Not there, or not yours to know of: the same answer. */
export const absent = (what: string): Refusal =>
  refuse('absent', `There is no such ${what}, or it is not open to you.`);
