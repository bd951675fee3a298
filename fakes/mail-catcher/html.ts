/** HTML that is safe to place in a page as it stands. */
export class Html {
  constructor(readonly text: string) {}
}

type Value = string | number | undefined | Html | readonly Html[];

/** Text for element content and quoted attributes. Control characters become visible spaces. */
export function escapeHtml(text: string): string {
  return text
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;')
    .replace(/'/g, '&#39;')
    .replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/g, '\u2423');
}

function place(value: Value): string {
  if (value === undefined) return '';
  if (value instanceof Html) return value.text;
  if (typeof value === 'string' || typeof value === 'number') return escapeHtml(String(value));
  return value.map(({ text }) => text).join('');
}

/** A template whose values are escaped unless they are `Html` themselves. */
export function html(parts: TemplateStringsArray, ...values: Value[]): Html {
  return new Html(parts.map((part, index) => part + place(values[index])).join(''));
}
