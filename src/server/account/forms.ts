import { AccountForm } from '@/contracts/account';
import { readFormAs, refusedForm, type RefusedForm } from '../http/form';
import { REFUSALS } from '../refusal';
import type { Runtime } from '../runtime';
import { changePassword, rename, signOutEverywhere, type Self } from './commands';

type About = { sessionCookie: string; requestId: string };

/** Does what a form of one's own page asks; answers with where to go. */
export async function accountByForm(
  app: Runtime,
  actor: Self,
  request: Request,
  { sessionCookie, requestId }: About,
  now: Date,
): Promise<{ ok: true; location: string } | RefusedForm> {
  const form = await readFormAs(request, AccountForm);
  if (!form.ok) return form;
  const given = form.value;
  if (given.do === 'everywhere') {
    await signOutEverywhere(app.db, actor, requestId, now);
    return { ok: true, location: '/sign-in' };
  }
  if (given.do === 'name') {
    const renamed = await rename(app.db, actor, { name: given.name, requestId }, now);
    return renamed.ok
      ? { ok: true, location: '/account?done=name' }
      : refusedForm(form.typed, renamed, REFUSALS[renamed.kind].status);
  }
  const { current, password } = given;
  const revoke = given.tokens === 'revoke';
  const input = { current, password, revoke, sessionCookie, requestId };
  const changed = await changePassword(app, actor, input, now);
  if (!changed.ok) return refusedForm(form.typed, changed, REFUSALS[changed.kind].status);
  app.worker?.nudge();
  return { ok: true, location: `/account?done=${revoke ? 'password-tokens' : 'password'}` };
}
