import * as z from 'zod/v4';

/** A fault to come, as the control port takes it. */
export const mailFault = z
  .strictObject({
    match: z
      .strictObject({
        /** A recipient; a `*` at the end stands for any rest. */
        to: z.string().min(1).max(320).optional(),
      })
      .default({}),
    kind: z.enum(['reject', 'delay', 'drop']),
    /** Where it happens: when a client connects, names a recipient, or has sent the message. */
    stage: z.enum(['connect', 'rcpt', 'data']).default('rcpt'),
    /** For `reject`: 4xx asks the client to come again, 5xx not to. */
    code: z.int().min(400).max(599).default(451),
    message: z
      .string()
      .regex(/^[\x20-\x7e]{1,200}$/, 'needs one line of 1 to 200 printable ASCII characters')
      .default('a fault asked for'),
    /** For `delay`, in milliseconds. */
    ms: z.int().min(0).max(120_000).default(1000),
    /** For `drop` at `data`: before the message is kept, or after it with the answer lost. */
    when: z.enum(['before', 'after']).default('before'),
    times: z.int().min(1).max(100_000).default(1),
  })
  .refine(({ stage, match }) => stage !== 'connect' || match.to === undefined, {
    message: 'a fault at connect cannot know the recipient',
    path: ['match', 'to'],
  });
export type MailFault = z.infer<typeof mailFault>;

/** Whether a fault is meant for this stage and any of these recipients. */
export function fits(
  fault: MailFault,
  stage: MailFault['stage'],
  recipients: readonly string[],
): boolean {
  if (fault.stage !== stage) return false;
  const wanted = fault.match.to?.toLowerCase();
  if (wanted === undefined) return true;
  return recipients.some((address) =>
    wanted.endsWith('*')
      ? address.toLowerCase().startsWith(wanted.slice(0, -1))
      : address.toLowerCase() === wanted,
  );
}
