/** What the intake's form does: one ticket for one form, however often it is sent. */
import type { Intake } from '@/contracts/tickets';
import { IntakeForm } from '@/contracts/intake-form';
import type { Database } from '@/db/client';
import type { Granted } from '../auth/actor';
import { readFormAs, refusedForm, type RefusedForm } from '../http/form';
import { onceForKey } from '../http/idempotency';
import { problemResponse } from '../http/problem';
import { done, refuse, REFUSALS, type Outcome, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';
import { takeIn } from './commands';

type Taken = { number: string; claimCode: string };
type Desk = Granted<'ticket.intake'>;

const USED = refuse(
  'conflict',
  'This form was taken in already, with other words: correct the ticket that it made, or open a new form.',
);

/** Takes in what a form says, once: sent again as it was, it answers the ticket that it made. */
async function takeInOnce(
  app: Runtime,
  actor: Desk,
  once: string,
  intake: Intake,
  now: Date,
): Promise<Outcome<Taken>> {
  const shop = shopOf(app.settings);
  let refusal: Refusal | null = null;
  const work = async (db: Database): Promise<Response> => {
    const taken = await takeIn(db, actor, intake, shop, now);
    refusal = taken.ok ? null : taken;
    return taken.ok ? Response.json(taken.value) : problemResponse(taken);
  };
  const repeat = { userId: actor.id, key: `intake:${once}`, secret: app.settings.secret };
  const asked = { path: '/intake', body: intake, now };
  const response = await onceForKey(app.db, repeat, asked, work);
  if (response.ok) return done((await response.json()) as Taken);
  return refusal ?? USED;
}

/** Handles the form of the intake page. */
export async function answerIntakeForm(
  app: Runtime,
  actor: Desk,
  request: Request,
  now: Date,
): Promise<
  ({ ok: true } & Taken) | (RefusedForm & { more?: Record<string, unknown> | undefined })
> {
  const form = await readFormAs(request, IntakeForm);
  if (!form.ok) return form;
  const { once, intake } = form.value;
  const taken =
    once === null
      ? await takeIn(app.db, actor, intake, shopOf(app.settings), now)
      : await takeInOnce(app, actor, once, intake, now);
  if (!taken.ok)
    return { ...refusedForm(form.typed, taken, REFUSALS[taken.kind].status), more: taken.more };
  app.worker?.nudge();
  return { ok: true, ...taken.value };
}
