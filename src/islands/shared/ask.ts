/** Asking the shop's API from an island. The route is a type alone, so that no schema travels to the browser. */
import type { Problem } from '@/contracts/common';
import type { AnswerOf, Route } from '@/contracts/route';
import type * as z from 'zod/v4';

export type Refused = {
  ok: false;
  /** 0 when no answer came. */
  status: number;
  /** What to tell the person. */
  sentence: string;
  /** The whole refusal, with such members as `current` of a stale edit. */
  problem: (Problem & Record<string, unknown>) | null;
  /** Seconds after which the server asks to be asked again. */
  retryAfter: number | null;
};
export type Asked<T> = { ok: true; value: T; version: number | null } | Refused;

export type Question<R extends Route> = {
  method: R['method'];
  path: string;
  version?: number;
  /** One key for all repeats of one deed. */
  key?: string;
  signal?: AbortSignal;
} & (R['body'] extends z.ZodType ? { body: z.input<R['body']> } : { body?: undefined });

const refused = (status: number, sentence: string): Refused => ({
  ok: false,
  status,
  sentence,
  problem: null,
  retryAfter: null,
});

async function readRefusal(answer: Response): Promise<Refused> {
  if (answer.status === 401)
    return refused(401, 'You are signed out: sign in again in another tab, then repeat this.');
  const problem = (await answer.json().catch(() => null)) as Refused['problem'];
  const after = Number(answer.headers.get('retry-after'));
  return {
    ...refused(
      answer.status,
      problem?.detail ?? 'The server did not answer as it should: try again.',
    ),
    problem,
    retryAfter: Number.isFinite(after) && after > 0 ? after : null,
  };
}

/** A random key for `Idempotency-Key`. */
export const newKey = (): string =>
  Array.from(crypto.getRandomValues(new Uint8Array(16)), (n) =>
    n.toString(16).padStart(2, '0'),
  ).join('');

/**
 * Asks and reads the answer; a refusal or a lost connection is a value too.
 *
 * @throws DOMException AbortError when `signal` was aborted.
 */
export async function ask<R extends Route>(question: Question<R>): Promise<Asked<AnswerOf<R>>> {
  const { method, path, version, key, signal, body } = question;
  const headers = new Headers({ accept: 'application/json' });
  if (version !== undefined) headers.set('if-match', `"${version}"`);
  if (key !== undefined) headers.set('idempotency-key', key);
  if (body !== undefined) headers.set('content-type', 'application/json');
  let answer: Response;
  try {
    const sent = body === undefined ? null : JSON.stringify(body);
    answer = await fetch(path, { method, headers, body: sent, signal: signal ?? null });
  } catch (error) {
    if (signal?.aborted) throw error;
    return refused(0, 'The server cannot be reached: check the connection and try again.');
  }
  if (!answer.ok) return readRefusal(answer);
  const etag = /^"(\d+)"$/.exec(answer.headers.get('etag') ?? '')?.[1];
  const value = answer.status === 204 ? null : ((await answer.json()) as unknown);
  return { ok: true, value: value as AnswerOf<R>, version: etag ? Number(etag) : null };
}
