const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * True when a browser sent a changing request on behalf of another site. Browsers say so by Sec-Fetch-Site, older
 * ones by Origin; a client that sends neither is no browser and carries no ambient cookie of a victim.
 */
export function crossSite(request: Request, origin: string): boolean {
  if (SAFE.has(request.method)) return false;
  const site = request.headers.get('sec-fetch-site');
  if (site !== null) return site !== 'same-origin' && site !== 'none';
  const from = request.headers.get('origin');
  return from !== null && from !== origin;
}
