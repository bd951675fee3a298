import type { RefusalKind } from '../refusal';

/** What each kind of problem means and what to do, for the page that its `type` points to. */
export const PROBLEM_WORDS: Readonly<Record<RefusalKind | 'crash', string>> = {
  'bad-request': 'The request is not HTTP or JSON as it should be. Put the request right.',
  'signed-out':
    'No session or token, or one that ended, was revoked or is unknown; or the sign-in itself was wrong.',
  'not-allowed': 'Your role, or the scopes of the token, do not reach that far. Ask the owner.',
  absent: 'There is no such thing, or it is not yours to know of: the two are not told apart.',
  'wrong-method': 'The address is there but does not take this method: see Allow.',
  'not-acceptable': 'The list is not offered in the form that Accept asks for.',
  conflict: 'It cannot be done as things stand; the detail says what has to be true first.',
  stale:
    'It was changed since you read it, and nothing was overwritten. The answer carries what stands now: read it again, then repeat the change.',
  'too-large': 'The body or the list is over the limit. Send less.',
  'wrong-media': 'The body has another Content-Type than the endpoint takes.',
  invalid: 'Fields have values that are not taken; `errors` names each by its path and says why.',
  'version-needed': 'Edits carry If-Match with the ETag that was read.',
  'too-many': 'Too many tries in a while. Retry-After says how many seconds to wait.',
  unavailable: 'The database, the object store or the shop’s server is not there. Try again soon.',
  crash: 'A fault on our side. It was logged under the request id that the detail gives.',
};
