import type { Runtime } from '../runtime';

/** The headers every answer carries; Astro has put the policy with its hashes on pages already. */
export function secure(
  response: Response,
  about: { requestId: string; api: boolean; app: Runtime },
): Response {
  const { headers } = response;
  headers.set('x-request-id', about.requestId);
  headers.set('x-content-type-options', 'nosniff');
  headers.set('referrer-policy', 'same-origin');
  headers.set('x-frame-options', 'DENY');
  headers.set('cross-origin-opener-policy', 'same-origin');
  headers.set('cross-origin-resource-policy', 'same-origin');
  headers.set('permissions-policy', 'camera=(self), geolocation=(), microphone=(), serial=(self)');
  if (about.app.settings.secureCookies)
    headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains');
  if (!headers.has('cache-control')) headers.set('cache-control', 'no-store');
  const store = about.app.store.publicOrigin;
  const policy = headers.get('content-security-policy');
  if (about.api) {
    if (!policy)
      headers.set('content-security-policy', "default-src 'none'; frame-ancestors 'none'");
  } else if (policy) {
    headers.set(
      'content-security-policy',
      `${policy.replace(/;\s*$/, '')}; style-src-attr 'unsafe-inline'; connect-src 'self' ${store}`,
    );
  }
  // A page sets its status after the library wrote "OK" beside it.
  return response.statusText === 'OK' && response.status !== 200
    ? new Response(response.body, { status: response.status, headers })
    : response;
}
