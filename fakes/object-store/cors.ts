import { isLoopbackOrigin } from '../shared/loopback';
import { StoreError } from './errors';

/** Origins whose pages may use the store: a list, or `*` for any page served by this machine. */
export type AllowedOrigins = '*' | readonly string[];

const methods = ['GET', 'HEAD', 'PUT', 'POST', 'DELETE'];
const exposed =
  'ETag, Content-Length, Content-Range, Accept-Ranges, x-amz-request-id, x-amz-checksum-crc32';

function allows(allowed: AllowedOrigins, origin: string): boolean {
  return allowed === '*' ? isLoopbackOrigin(origin) : allowed.includes(origin);
}

/** Headers that let a page of an allowed origin read an answer; none for others. */
export function corsHeaders(
  allowed: AllowedOrigins,
  origin: string | undefined,
): Record<string, string> {
  if (origin === undefined || !allows(allowed, origin)) return {};
  return {
    'access-control-allow-origin': origin,
    'access-control-expose-headers': exposed,
    vary: 'Origin, Access-Control-Request-Headers, Access-Control-Request-Method',
  };
}

/**
 * The answer to a browser's question before a request.
 *
 * @throws StoreError CORSForbidden when origin or method are not allowed, InvalidRequest without them
 */
export function preflight(
  allowed: AllowedOrigins,
  headers: ReadonlyMap<string, string>,
): Record<string, string> {
  const origin = headers.get('origin');
  const method = headers.get('access-control-request-method');
  if (origin === undefined || method === undefined) {
    throw new StoreError('InvalidRequest', 'Origin and Access-Control-Request-Method are needed.');
  }
  if (!allows(allowed, origin) || !methods.includes(method)) {
    throw new StoreError('CORSForbidden', 'This origin or method is not allowed here.');
  }
  const asked = headers.get('access-control-request-headers');
  return {
    ...corsHeaders(allowed, origin),
    'access-control-allow-methods': methods.join(', '),
    ...(asked === undefined ? {} : { 'access-control-allow-headers': asked }),
    'access-control-max-age': '300',
  };
}
