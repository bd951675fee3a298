import type { APIContext } from 'astro';
import { roleMay } from '@/domain/people';
import { plainText, showPage } from '../http/show-page';
import { PAGES } from './page-access';

/** Answers instead of the page when the person may not open it; null when they may. */
export function gatePage(context: APIContext): Response | Promise<Response> | null {
  const rule = PAGES[context.routePattern];
  // These two are shown instead of any page, whatever its method was.
  if (context.routePattern === '/404' || context.routePattern === '/500') return null;
  const notHere = () => showPage(context, '/404');
  if (!rule) return notHere();
  const { url } = context;
  const { method } = context.request;
  const reads = method === 'GET' || method === 'HEAD';
  const who = reads ? rule.get : method === 'POST' ? (rule.post ?? null) : null;
  if (who === null)
    return plainText('This address does not take that.', 405, {
      allow: [rule.get ? 'GET, HEAD' : '', rule.post ? 'POST' : ''].filter(Boolean).join(', '),
    });
  if (who === 'public') return null;
  const { actor } = context.locals;
  if (who === 'customer') {
    if (actor?.kind === 'customer') return null;
    return actor ? notHere() : context.redirect('/check', 303);
  }
  if (actor?.kind === 'staff' && roleMay(actor.role, who) && !actor.scopes) return null;
  if (actor) return notHere();
  // Also after a form: what was typed there may be kept by the browser, and the page is where it is looked for.
  const back = rule.get === null ? '' : `?then=${encodeURIComponent(url.pathname + url.search)}`;
  return context.redirect(`/sign-in${back}`, 303);
}
