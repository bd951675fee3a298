/** What a customer may do on their page: answer the estimate, write to the shop. */
import * as z from 'zod/v4';
import { MessageForm } from '@/contracts/status';
import type { CustomerActor } from '../auth/actor';
import { errorFor, readFormAs, type Typed } from '../http/form';
import { writeToShop } from '../messages/commands';
import { REFUSALS, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';
import { takeStep } from '../tickets/commands';
import { isOwn } from '../tickets/policy';
import { ticketByNumber } from '../tickets/queries';

const Form = z.discriminatedUnion('do', [
  MessageForm.extend({ do: z.literal('message') }),
  z.object({ do: z.enum(['approve', 'decline']), version: z.coerce.number().int().positive() }),
]);

type Answered =
  | { ok: true; did: 'message' | 'approve' | 'decline' }
  | {
      ok: false;
      problem: string | undefined;
      typed: Typed;
      error: string | undefined;
      status: number;
      /** Seconds to wait, when the refusal names some. */
      retryAfter?: number | undefined;
    };

/** Handles the forms of the status page. */
export async function answerStatusForm(
  app: Runtime,
  actor: CustomerActor,
  number: string,
  request: Request,
  now: Date,
): Promise<Answered> {
  const form = await readFormAs(request, Form);
  if (!form.ok) {
    const error = errorFor(form.errors, 'body');
    return {
      ok: false,
      typed: form.typed,
      error,
      problem: error ? undefined : form.reason,
      status: form.status,
    };
  }
  const refused = (r: Refusal): Answered => ({
    ok: false,
    problem: r.reason,
    typed: form.typed,
    error: undefined,
    status: REFUSALS[r.kind].status,
    retryAfter: r.retryAfter,
  });
  const { value } = form;
  if (value.do === 'message') {
    const ticket = await ticketByNumber(app.db, number);
    if (!ticket || !isOwn(actor, ticket))
      return refused({ ok: false, kind: 'absent', reason: 'There is no such ticket.' });
    const tooMany = await app.limits.take('message', String(actor.customerId));
    if (tooMany) return refused(tooMany);
    await writeToShop(app.db, actor, ticket, value.body, now);
    return { ok: true, did: 'message' };
  }
  const step = { step: value.do, note: '', estimate: null };
  const taken = await takeStep(
    app.db,
    actor,
    number,
    value.version,
    step,
    shopOf(app.settings),
    now,
  );
  if (!taken.ok) return refused(taken);
  app.worker?.nudge();
  return { ok: true, did: value.do };
}
