import { simpleParser, type AddressObject, type ParsedMail } from 'mailparser';

/** An attachment with its content. */
export interface MailAttachment {
  filename: string;
  contentType: string;
  content: Buffer;
}

/** A message read from its source. */
export interface ReadMail {
  from: string;
  to: string;
  cc: string;
  replyTo: string;
  subject: string;
  /** ISO 8601, when the message has a Date. */
  date: string | undefined;
  /** Header fields in their order, unfolded. */
  headers: Array<{ name: string; value: string }>;
  /** Undefined when the message has no such part. */
  text: string | undefined;
  html: string | undefined;
  /** Web addresses in text and HTML, each once. */
  links: string[];
  attachments: MailAttachment[];
}

const addresses = (value: AddressObject | AddressObject[] | undefined) =>
  [value ?? []]
    .flat()
    .map(({ text }) => text)
    .join(', ');

const entities: Record<string, string> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };

function decodeEntities(text: string): string {
  return text.replace(/&(?:#(\d{1,6})|#x([0-9a-f]{1,5})|(\w+));/gi, (whole, decimal, hex, name) => {
    if (name !== undefined) return entities[String(name)] ?? whole;
    return String.fromCodePoint(decimal === undefined ? parseInt(hex, 16) : Number(decimal));
  });
}

function findLinks({ text, html }: Pick<ParsedMail, 'text' | 'html'>): string[] {
  const inText = (text ?? '').match(/https?:\/\/[^\s<>"']+[^\s<>"'.,;:!?)\]]/g) ?? [];
  const inHtml = [...(html || '').matchAll(/\bhref\s*=\s*(?:"([^"]*)"|'([^']*)')/gi)]
    .map((match) => decodeEntities((match[1] ?? match[2] ?? '').trim()))
    .filter((address) => /^https?:\/\//i.test(address));
  return [...new Set([...inText, ...inHtml])];
}

/** Reads a message. What is malformed in it is read as well as it goes; this never refuses. */
export async function readMail(source: Buffer): Promise<ReadMail> {
  const mail = await simpleParser(source, { skipTextToHtml: true, skipHtmlToText: true });
  return {
    from: addresses(mail.from),
    to: addresses(mail.to),
    cc: addresses(mail.cc),
    replyTo: addresses(mail.replyTo),
    subject: mail.subject ?? '',
    date: mail.date?.toISOString(),
    headers: mail.headerLines.map(({ line }) => {
      const colon = line.indexOf(':');
      const value = line.slice(colon + 1).replace(/\r?\n\s*/g, ' ');
      return { name: line.slice(0, colon), value: value.trim() };
    }),
    // A message of HTML alone is read with an empty text.
    text: mail.text === '' ? undefined : mail.text,
    html: mail.html === false ? undefined : mail.html,
    links: findLinks(mail),
    attachments: mail.attachments.map(({ filename, contentType, content }, index) => ({
      filename: filename ?? `part-${index + 1}`,
      contentType,
      content,
    })),
  };
}
