/** An element to write: its name and its text or children. */
export type Element = readonly [name: string, content: string | number | boolean | Element[]];

const escapes: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  '\r': '&#13;',
};

/** Text for XML: markup escaped, control characters as references. */
export function escapeXml(text: string): string {
  return text.replace(
    /[&<>"\u0000-\u0008\u000b-\u001f]/g,
    (sign) => escapes[sign] ?? `&#${sign.charCodeAt(0)};`,
  );
}

function render([name, content]: Element): string {
  const inner = Array.isArray(content) ? content.map(render).join('') : escapeXml(String(content));
  return `<${name}>${inner}</${name}>`;
}

/** A whole document with S3's namespace on its root. */
export function renderXml([name, content]: Element, namespace = true): string {
  const body = render([name, content]);
  const root = namespace
    ? `<${name} xmlns="http://s3.amazonaws.com/doc/2006-03-01/">${body.slice(name.length + 2)}`
    : body;
  return `<?xml version="1.0" encoding="UTF-8"?>\n${root}`;
}
