import type { APIContext } from 'astro';
import { roleMay } from '@/domain/people';
import { PAGES } from './page-access';

const text = (body: string, status: number, headers: HeadersInit = {}) =>
  new Response(body, {
    status,
    headers: { 'content-type': 'text/plain; charset=utf-8', ...headers },
  });

/** Answers instead of the page when the person may not open it; null when they may. */
export function gatePage(context: APIContext): Response | Promise<Response> | null {
  const rule = PAGES[context.routePattern];
  if (!rule) return context.routePattern === '/404' ? null : context.rewrite('/404');
  const { method } = context.request;
  const reads = method === 'GET' || method === 'HEAD';
  const who = reads ? rule.get : method === 'POST' ? (rule.post ?? null) : null;
  if (who === null)
    return text('This address does not take that.', 405, {
      allow: [rule.get ? 'GET, HEAD' : '', rule.post ? 'POST' : ''].filter(Boolean).join(', '),
    });
  if (who === 'public') return null;
  const { actor } = context.locals;
  if (who === 'customer') {
    if (actor?.kind === 'customer') return null;
    return actor ? context.rewrite('/404') : context.redirect('/check', 303);
  }
  if (actor?.kind === 'staff' && roleMay(actor.role, who) && !actor.scopes) return null;
  if (actor) return context.rewrite('/404');
  const back = reads
    ? `?then=${encodeURIComponent(context.url.pathname + context.url.search)}`
    : '';
  return context.redirect(`/sign-in${back}`, 303);
}
