import { ROUTES } from '@/contracts/routes';
import { absent, refuse, type Refusal } from '../refusal';

const METHODS = new Map<string, Set<string>>();
for (const { path, method } of ROUTES) {
  const pattern = path.replace(/\{(\w+)\}/g, '[$1]');
  METHODS.set(pattern, (METHODS.get(pattern) ?? new Set()).add(method));
}

/**
 * What an address under `/api` that is not there, or does not take the method, is answered: the same problem form as
 * everything else. Null when an endpoint takes it.
 *
 * @param pattern Astro's pattern of the route, `/api/people/[id]`.
 */
export function refuseAddress(pattern: string, method: string): Refusal | null {
  if (!pattern.startsWith('/api/')) return absent('address');
  const methods = METHODS.get(pattern);
  if (!methods || methods.has(method) || (method === 'HEAD' && methods.has('GET'))) return null;
  const allow = [...methods, ...(methods.has('GET') ? ['HEAD'] : [])].sort().join(', ');
  return refuse('wrong-method', `${method} was given: ${allow} is taken here.`, { allow });
}
