import { TokenForm } from '@/contracts/account';
import type { ApiToken } from '@/contracts/tokens';
import { readFormAs, refusedForm, type RefusedForm } from '../http/form';
import { REFUSALS } from '../refusal';
import type { Runtime } from '../runtime';
import type { Self } from '../account/commands';
import { createToken, revokeToken } from './commands';

/** Makes a token, which the page shows this once, or revokes one, as the form asks. */
export async function tokenByForm(
  app: Runtime,
  actor: Self,
  request: Request,
  requestId: string,
  now: Date,
): Promise<{ ok: true; made: (ApiToken & { token: string }) | null } | RefusedForm> {
  const form = await readFormAs(request, TokenForm);
  if (!form.ok) return form;
  const given = form.value;
  const stop = given.do === 'make' ? await app.limits.take('token', String(actor.id)) : null;
  const result =
    stop ??
    (given.do === 'make'
      ? await createToken(app.db, actor, { ...given, requestId }, now)
      : await revokeToken(app.db, actor, { id: given.id, requestId }, now));
  return result.ok
    ? { ok: true, made: result.value }
    : refusedForm(form.typed, result, REFUSALS[result.kind].status);
}
