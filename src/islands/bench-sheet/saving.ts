/** The bench endpoints as the sheet uses them: every answer, and none, becomes something the row can say. */
import { benchRoutes, type BenchReading, type EditReading } from '@/contracts/bench';
import type { Problem } from '@/contracts/common';
import type { Field } from './rows';

export type Outcome =
  | { is: 'done'; reading: BenchReading }
  | { is: 'gone' }
  | { is: 'stale'; theirs: BenchReading }
  | { is: 'refused'; words: string; field: Field | null }
  /** Not reached, or not able right now: the same try may work later. */
  | { is: 'unreachable'; words: string };

export type Ask = (address: string, request: RequestInit) => Promise<Response>;

const LATER: Readonly<Record<number, string>> = {
  401: 'You are signed out: sign in again in another tab, then try again.',
  429: 'Too many tries in a short time: wait a moment, then try again.',
  503: 'The shop’s server is not available right now.',
};

const FIELD_OF: Readonly<Record<string, Field>> = {
  from: 'from',
  to: 'to',
  part: 'from',
  position: 'position',
  lifted: 'lifted',
  typed: 'typed',
};

async function understood(answer: Response): Promise<Outcome> {
  if (answer.status === 204) return { is: 'gone' };
  if (answer.ok) return { is: 'done', reading: (await answer.json()) as BenchReading };
  const later = LATER[answer.status];
  if (later !== undefined) return { is: 'unreachable', words: later };
  if (answer.status >= 500)
    return { is: 'unreachable', words: 'Something went wrong on the server; it was logged.' };
  const problem = (await answer.json().catch(() => null)) as
    (Problem & { current?: BenchReading }) | null;
  if (answer.status === 412 && problem?.current) return { is: 'stale', theirs: problem.current };
  const first = problem?.errors?.[0];
  const words = first?.message ?? problem?.detail ?? `The server answered ${answer.status}.`;
  const name = first?.path.replace(/[.[].*$/, '') ?? '';
  return { is: 'refused', words, field: FIELD_OF[name] ?? null };
}

/** Requests of one ticket's sheet. None throws. */
export function savingOf(number: string, ask: Ask) {
  const send = async (method: string, address: string, body?: unknown, version?: number) => {
    const headers = new Headers({ accept: 'application/json' });
    if (body !== undefined) headers.set('content-type', 'application/json');
    if (version !== undefined) headers.set('if-match', `"${version}"`);
    const answer = await ask(address, {
      method,
      headers,
      body: body === undefined ? null : JSON.stringify(body),
    }).catch(() => null);
    if (!answer)
      return { is: 'unreachable', words: 'The shop’s server does not answer.' } satisfies Outcome;
    return understood(answer).catch(
      () => ({ is: 'unreachable', words: 'The answer was cut short.' }) satisfies Outcome,
    );
  };
  const sheet = benchRoutes.add.path.replace('{number}', number);
  return {
    /** The same client key again is the same row, so a repeat after a lost answer is harmless. */
    add: (body: EditReading, clientKey: string): Promise<Outcome> =>
      send('POST', sheet, { ...body, clientKey }),
    edit: ({ id, version }: BenchReading, body: EditReading): Promise<Outcome> =>
      send('PATCH', `${sheet}/${id}`, body, version),
    /** A reading that is no longer there is struck as well. */
    strike: async ({ id, version }: BenchReading): Promise<Outcome> => {
      const outcome = await send('DELETE', `${sheet}/${id}`, undefined, version);
      const absent = outcome.is === 'refused' && outcome.words.startsWith('There is no such');
      return absent ? { is: 'gone' } : outcome;
    },
  };
}
