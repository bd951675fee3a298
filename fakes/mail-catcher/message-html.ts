import { escapeHtml, Html } from './html';

/**
 * Policy of a message's own HTML: no script, no request to anywhere, pictures only from the message;
 * links may open, in a new window without these limits.
 */
export const messagePolicy =
  "default-src 'none'; img-src data:; style-src 'unsafe-inline'; form-action 'none'; " +
  "base-uri 'none'; frame-ancestors 'self'; " +
  'sandbox allow-popups allow-popups-to-escape-sandbox';

const anchor = /<a\b((?:"[^"]*"|'[^']*'|[^'"<>])*)>/gi;
const attribute = /([^\s"'=<>/]+)(?:\s*=\s*("[^"]*"|'[^']*'|[^\s"'=<>`]+))?/g;
const followed = /^["']?\s*(https?:|mailto:|tel:|#)/i;

/**
 * A message's HTML with every link opening a new window that knows nothing of this one. Links to
 * anything but the web, mail and telephone lose their address.
 */
export function prepareMessageHtml(source: string): string {
  return source.replace(anchor, (_, attributes: string) => {
    const kept = [...attributes.matchAll(attribute)].flatMap(([whole, given = '', value = '']) => {
      const name = given.toLowerCase();
      if (name === 'target' || name === 'rel' || name === 'ping') return [];
      return name === 'href' && !followed.test(value) ? [] : [whole];
    });
    return `<a ${[...kept, 'target="_blank"', 'rel="noopener noreferrer"'].join(' ')}>`;
  });
}

/** A message's text as HTML, web addresses made links. */
export function textToHtml(text: string): Html {
  const parts = text.split(/(https?:\/\/[^\s<>"']+[^\s<>"'.,;:!?)\]])/);
  return new Html(
    parts
      .map((part, index) => {
        const shown = escapeHtml(part);
        return index % 2 === 0
          ? shown
          : `<a href="${shown}" target="_blank" rel="noopener noreferrer">${shown}</a>`;
      })
      .join(''),
  );
}
