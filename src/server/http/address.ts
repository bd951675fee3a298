import type * as z from 'zod/v4';

/**
 * What an address says, as far as it is right: parameters that their schema refuses count as not given. The schema has
 * a default for each.
 */
export function asFarAsRight<S extends z.ZodType>(
  schema: S,
  asked: Readonly<Record<string, string>>,
): z.output<S> {
  const parsed = schema.safeParse(asked);
  if (parsed.success) return parsed.data;
  const wrong = new Set(parsed.error.issues.map(({ path }) => path[0]));
  const right = Object.entries(asked).filter(([name]) => !wrong.has(name));
  return schema.parse(Object.fromEntries(right));
}
