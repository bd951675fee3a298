import { SecondFactorForm } from '@/contracts/account';
import { readFormAs, refusedForm, type RefusedForm } from '../http/form';
import { REFUSALS } from '../refusal';
import type { Runtime } from '../runtime';
import type { Self } from '../account/commands';
import { turnOff, turnOn } from './commands';

/** Turns one's own second factor on or off, as the form asks. */
export async function secondFactorByForm(
  app: Runtime,
  actor: Self,
  request: Request,
  about: { sessionCookie: string; requestId: string },
  now: Date,
): Promise<{ ok: true } | RefusedForm> {
  const form = await readFormAs(request, SecondFactorForm);
  if (!form.ok) return form;
  const given = form.value;
  const turned =
    given.do === 'on'
      ? await turnOn(app, actor, { ...given, ...about }, now)
      : await turnOff(app, actor, { ...given, requestId: about.requestId }, now);
  return turned.ok ? { ok: true } : refusedForm(form.typed, turned, REFUSALS[turned.kind].status);
}
