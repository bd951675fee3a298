/** HTML forms on pages: parsed by a schema; when the server says no, what was typed goes back into the fields. */
import type * as z from 'zod/v4';
import type { FieldError, Refusal } from '../refusal';
import { fieldErrors } from './problem';
import { readForm } from './read-body';

export type Typed = Record<string, string | string[]>;
export type FormResult<T> =
  | { ok: true; value: T; typed: Typed }
  | { ok: false; typed: Typed; errors: FieldError[]; reason: string; status: number };

/** A form that was not taken: what the page shows again. */
export type RefusedForm = Extract<FormResult<unknown>, { ok: false }>;

/** Fields named `x[]` come as arrays under `x`; files are ignored. */
export function typedOf(form: FormData): Typed {
  const typed: Typed = {};
  for (const name of new Set(form.keys())) {
    const all = form.getAll(name).filter((v): v is string => typeof v === 'string');
    if (name.endsWith('[]')) typed[name.slice(0, -2)] = all;
    else typed[name] = all[0] ?? '';
  }
  return typed;
}

/** Reads and validates the form of a POST. */
export async function readFormAs<S extends z.ZodType>(
  request: Request,
  schema: S,
): Promise<FormResult<z.output<S>>> {
  const form = await readForm(request);
  if (!form.ok) return { ok: false, typed: {}, errors: [], reason: form.reason, status: 400 };
  const typed = typedOf(form.value);
  const parsed = schema.safeParse(typed);
  if (parsed.success) return { ok: true, value: parsed.data, typed };
  const errors = fieldErrors(parsed.error.issues);
  return { ok: false, typed, errors, reason: 'Some fields need another value.', status: 422 };
}

/** A command's refusal shown on the form it came from. */
export const refusedForm = (typed: Typed, refusal: Refusal, status: number) => ({
  ok: false as const,
  typed,
  errors: refusal.errors ?? [],
  reason: refusal.reason,
  status,
});

/** The message for one field, or undefined. */
export const errorFor = (errors: readonly FieldError[], path: string): string | undefined =>
  errors.find((e) => e.path === path || e.path.startsWith(`${path}[`))?.message;

/** What was typed into a single field. */
export const typedText = (typed: Typed, name: string, otherwise = ''): string => {
  const value = typed[name];
  return typeof value === 'string' ? value : otherwise;
};
