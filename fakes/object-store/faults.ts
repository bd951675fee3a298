import * as z from 'zod/v4';

/** A fault to come, as the control port takes it. */
export const storeFault = z
  .strictObject({
    match: z
      .strictObject({
        method: z.enum(['GET', 'HEAD', 'PUT', 'POST', 'DELETE', 'OPTIONS']).optional(),
        /** A key without its bucket; a `*` at the end stands for any rest. */
        key: z.string().min(1).max(1024).optional(),
      })
      .default({}),
    kind: z.enum(['status', 'delay', 'drop', 'truncate', 'corrupt']),
    /** For `status`. */
    status: z.int().min(400).max(599).default(503),
    /** For `delay`, in milliseconds. */
    ms: z.int().min(0).max(120_000).default(1000),
    /** For `drop`: before the work is done, or after it with the answer lost. */
    when: z.enum(['before', 'after']).default('before'),
    times: z.int().min(1).max(100_000).default(1),
  })
  .meta({ title: 'Fault of the object store' });
export type StoreFault = z.infer<typeof storeFault>;

/** Whether a fault is meant for a request. Preflights are meant only when named. */
export function fits(fault: StoreFault, method: string, key: string): boolean {
  const { method: wanted, key: pattern } = fault.match;
  if (wanted === undefined ? method === 'OPTIONS' : wanted !== method) return false;
  if (pattern === undefined) return true;
  return pattern.endsWith('*') ? key.startsWith(pattern.slice(0, -1)) : key === pattern;
}
