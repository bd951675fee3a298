/** Talking to the server: every refusal comes back as a value. */
import { faultRoutes, type FaultDetail, type NewFault } from '@/contracts/faults';
import { deskRoutes } from '@/contracts/desk';
import type { FaultStep } from '@/domain/faults/states';
import type { BoardPart, Draft, Wrong } from './types';

export type Refused = {
  ok: false;
  status: number;
  reason: string;
  wrong: Wrong;
  /** With a stale save: what stands there now. */
  current: FaultDetail | null;
};
export type Answered<T> = { ok: true; value: T } | Refused;

type Problem = {
  detail?: string;
  errors?: { path: string; message: string }[];
  current?: FaultDetail;
};

/** A path like `body.cause[2].attrs.from` belongs to its section. */
const fieldOf = (path: string) => /^body\.\w+/.exec(path)?.[0] ?? path.split(/[.[]/)[0] ?? path;

const unreachable: Refused = {
  ok: false,
  status: 0,
  reason: 'The server does not answer. What you typed is kept in this browser; try again.',
  wrong: {},
  current: null,
};

async function refusedBy(response: Response): Promise<Refused> {
  const problem = (await response.json().catch(() => ({}))) as Problem;
  const wrong: Wrong = {};
  for (const { path, message } of problem.errors ?? []) wrong[fieldOf(path)] ??= message;
  const reason =
    response.status === 401
      ? 'You are signed out. Sign in in another tab, then save again: what you typed is kept here.'
      : (problem.detail ?? `The server answered ${response.status}.`);
  return { ok: false, status: response.status, reason, wrong, current: problem.current ?? null };
}

async function call<T>(
  method: string,
  path: string,
  headers: Record<string, string>,
  body: unknown,
): Promise<Answered<T>> {
  try {
    const response = await fetch(path, {
      method,
      headers: { 'content-type': 'application/json', ...headers },
      body: JSON.stringify(body),
    });
    if (!response.ok) return await refusedBy(response);
    return { ok: true, value: (await response.json()) as T };
  } catch {
    return unreachable;
  }
}

const at = (path: string, id: number) => path.replace('{id}', String(id));

/** `key` makes a repeat after a broken line harmless; it must be new for every text. */
export const createNote = (draft: Draft, ticket: string | null, key: string) =>
  call<FaultDetail>('POST', faultRoutes.create.path, { 'idempotency-key': key }, {
    ...draft,
    ticket,
  } satisfies NewFault);

export const saveNote = (id: number, version: number, draft: Draft) =>
  call<FaultDetail>('PUT', at(faultRoutes.save.path, id), { 'if-match': `"${version}"` }, draft);

export const takeStep = (id: number, version: number, step: FaultStep) =>
  call<{ version: number }>(
    'POST',
    at(faultRoutes.step.path, id),
    { 'if-match': `"${version}"` },
    { step },
  );

/** The parts of a board, for the references; none when they cannot be had. */
export async function partsOf(boardId: number): Promise<BoardPart[]> {
  try {
    const response = await fetch(at(deskRoutes.network.path, boardId));
    if (!response.ok) return [];
    return ((await response.json()) as { parts: BoardPart[] }).parts;
  } catch {
    return [];
  }
}
