import { StoreError } from './errors';

/** An element read: attributes are not kept, text only where there are no children. */
export interface XmlNode {
  name: string;
  text: string;
  children: XmlNode[];
}

const malformed = () =>
  new StoreError('MalformedXML', 'The XML is not well-formed or not what this request takes.');

const depthLimit = 8;
const entities: Record<string, string> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };

function unescape(text: string): string {
  return text.replace(/&(#x[0-9a-fA-F]{1,6}|#\d{1,7}|\w*);?/g, (whole, name: string) => {
    if (!whole.endsWith(';')) throw malformed();
    if (!name.startsWith('#')) {
      const sign = entities[name];
      if (sign === undefined) throw malformed();
      return sign;
    }
    const code = name.startsWith('#x') ? parseInt(name.slice(2), 16) : Number(name.slice(1));
    if (!(code <= 0x10ffff)) throw malformed();
    return String.fromCodePoint(code);
  });
}

/**
 * Reads a small XML document: elements and text. No document type, no CDATA, no processing
 * instructions but the declaration, at most 8 levels deep.
 *
 * @throws StoreError MalformedXML
 */
export function readXml(document: string): XmlNode {
  const source = document.replace(/^\uFEFF?\s*(<\?xml[^>]*\?>)?/, '').trim();
  const root: XmlNode = { name: '', text: '', children: [] };
  const open: XmlNode[] = [root];
  const tag = /<(\/?)([A-Za-z][\w.:-]*)((?:\s+[\w.:-]+\s*=\s*(?:"[^"<]*"|'[^'<]*'))*)\s*(\/?)>/y;
  let at = 0;
  while (at < source.length) {
    const current = open.at(-1) ?? root;
    const next = source.indexOf('<', at);
    const end = next < 0 ? source.length : next;
    if (end > at) {
      current.text += unescape(source.slice(at, end));
      at = end;
      continue;
    }
    tag.lastIndex = at;
    const match = tag.exec(source);
    if (match === null) throw malformed();
    at = tag.lastIndex;
    const [, closing, name = '', attributes, empty] = match;
    if (closing === '/') {
      if (open.length < 2 || current.name !== name || attributes !== '' || empty === '/') {
        throw malformed();
      }
      open.pop();
      continue;
    }
    const node: XmlNode = { name, text: '', children: [] };
    current.children.push(node);
    if (empty !== '/') open.push(node);
    if (open.length > depthLimit) throw malformed();
  }
  const [only, ...more] = root.children;
  if (only === undefined || more.length > 0 || open.length > 1 || root.text.trim() !== '') {
    throw malformed();
  }
  return only;
}

/** The text of a child element, or undefined when there is none. */
export function childText(node: XmlNode, name: string): string | undefined {
  return node.children.find((child) => child.name === name)?.text;
}
