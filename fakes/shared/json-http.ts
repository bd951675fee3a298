import type { IncomingMessage, ServerResponse } from 'node:http';
import * as z from 'zod/v4';

/** A request refused with a status and a sentence for the caller. */
export class Refused extends Error {
  constructor(
    readonly status: number,
    message: string,
  ) {
    super(message);
  }
}

/**
 * The JSON body of a request, checked against a schema.
 *
 * @throws Refused 413 above `limit` bytes, 400 when it is no JSON or does not fit the schema.
 */
export async function readJson<T>(
  request: IncomingMessage,
  schema: z.ZodType<T>,
  limit = 65_536,
): Promise<T> {
  const chunks: Buffer[] = [];
  let size = 0;
  for await (const chunk of request as AsyncIterable<Buffer>) {
    size += chunk.length;
    if (size > limit) throw new Refused(413, `body over ${limit} bytes`);
    chunks.push(chunk);
  }
  let value: unknown;
  try {
    value = JSON.parse(Buffer.concat(chunks).toString('utf8'));
  } catch {
    throw new Refused(400, 'body is not JSON');
  }
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw new Refused(400, z.prettifyError(parsed.error));
}

/** Sends a value as JSON. */
export function sendJson(response: ServerResponse, status: number, value: unknown): void {
  const body = Buffer.from(`${JSON.stringify(value, null, 2)}\n`);
  response.writeHead(status, {
    'content-type': 'application/json; charset=utf-8',
    'content-length': body.length,
    'cache-control': 'no-store',
    'x-content-type-options': 'nosniff',
    'content-security-policy': "default-src 'none'; frame-ancestors 'none'",
  });
  response.end(body);
}
