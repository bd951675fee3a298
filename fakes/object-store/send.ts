import { createReadStream } from 'node:fs';
import type { ServerResponse } from 'node:http';
import type { Answer } from './answer';
import type { Damage } from './body';

async function* content(body: Answer['body']): AsyncGenerator<Buffer> {
  if (Buffer.isBuffer(body)) {
    if (body.length > 0) yield body;
    return;
  }
  const { descriptor, first, length } = body;
  const stream = createReadStream('', { fd: descriptor, start: first, end: first + length - 1 });
  yield* stream as AsyncIterable<Buffer>;
}

/** Waits until the response takes more; ends early when the other side has gone. */
function drained(response: ServerResponse): Promise<void> {
  return new Promise((resolve) => {
    const done = () => {
      response.off('drain', done);
      response.off('close', done);
      resolve();
    };
    response.once('drain', done);
    response.once('close', done);
  });
}

/**
 * Sends an answer. A damage is done to its content: the first byte changed, or the connection cut
 * after half of it.
 */
export async function send(
  response: ServerResponse,
  method: string,
  answer: Answer,
  damage: Damage,
): Promise<void> {
  const length = answer.body.length;
  const bare = method === 'HEAD' || answer.status === 204 || answer.status === 304;
  const headers = { ...answer.headers };
  if (bare && answer.status !== 200 && answer.status !== 206) delete headers['content-length'];
  if (!bare) headers['content-length'] = String(length);
  response.writeHead(answer.status, headers);
  let sent = 0;
  for await (const piece of bare ? [] : content(answer.body)) {
    if (response.destroyed) break;
    if (damage === 'corrupt' && sent === 0) piece.writeUInt8(piece.readUInt8(0) ^ 0xff, 0);
    const half = Math.floor(length / 2);
    if (damage === 'truncate' && sent + piece.length >= half) {
      response.write(piece.subarray(0, half - sent), () => response.destroy());
      return;
    }
    sent += piece.length;
    if (!response.write(piece)) await drained(response);
  }
  response.end();
}
