import { renderXml, type Element } from './xml';
import type { StoreError } from './errors';

/** What a handler answers. A file is the content of an object, given open, to be closed once sent. */
export interface Answer {
  status: number;
  headers: Record<string, string>;
  body: Buffer | { descriptor: number; first: number; length: number };
}

/** An answer without content. */
export function emptyAnswer(status: number, headers: Record<string, string> = {}): Answer {
  return { status, headers, body: Buffer.alloc(0) };
}

/** An XML document as answer. */
export function xmlAnswer(root: Element, headers: Record<string, string> = {}): Answer {
  return {
    status: 200,
    headers: { 'content-type': 'application/xml', ...headers },
    body: Buffer.from(renderXml(root)),
  };
}

/** A refusal as S3 words it. */
export function errorAnswer(error: StoreError, resource: string, requestId: string): Answer {
  const document = renderXml(
    [
      'Error',
      [
        ['Code', error.code],
        ['Message', error.message],
        ['Resource', resource],
        ['RequestId', requestId],
      ],
    ],
    false,
  );
  return {
    status: error.status,
    headers: { 'content-type': 'application/xml' },
    body: Buffer.from(document),
  };
}
