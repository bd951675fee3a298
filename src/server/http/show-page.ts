import type { APIContext } from 'astro';

/**
 * Shows another page at the same address. It is asked for anew, by GET and with the same cookies: the body of a form
 * that was posted may be read already, and cannot be handed on.
 */
export function showPage(
  context: Pick<APIContext, 'request' | 'url' | 'rewrite'>,
  path: '/404' | '/500',
): Promise<Response> {
  const { headers } = context.request;
  const cookie = headers.get('cookie');
  return context.rewrite(
    new Request(new URL(path, context.url), { headers: cookie === null ? {} : { cookie } }),
  );
}

export const plainText = (body: string, status: number, headers: HeadersInit = {}): Response =>
  new Response(body, {
    status,
    headers: { 'content-type': 'text/plain; charset=utf-8', ...headers },
  });
