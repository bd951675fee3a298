import * as z from 'zod/v4';
import { Id, line } from '@/contracts/common';
import { STAFF_ROLES } from '@/domain/people';
import type { Person, PersonChange } from '@/contracts/people';
import type { Granted } from '../auth/actor';
import { readFormAs, refusedForm, type FormResult } from '../http/form';
import { REFUSALS } from '../refusal';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';
import { changePerson, inviteAgain } from './commands';

/** The forms of one person's page; each carries the version that was shown. */
const PersonForm = z.discriminatedUnion('do', [
  z.object({
    do: z.literal('save'),
    version: Id,
    name: line(120, 1),
    role: z.enum(STAFF_ROLES, 'Not a role of the shop: choose one of the list.'),
  }),
  z.object({ do: z.literal('disable'), version: Id }),
  z.object({ do: z.literal('enable'), version: Id }),
  z.object({ do: z.literal('second-factor-off'), version: Id }),
  z.object({ do: z.literal('invite') }),
]);
type Given = z.output<typeof PersonForm>;

function changeOf(given: Exclude<Given, { do: 'invite' }>): PersonChange {
  if (given.do === 'save') return { name: given.name, role: given.role };
  if (given.do === 'second-factor-off') return { secondFactor: false };
  return { disabled: given.do === 'disable' };
}

/** Does what a form of the person's page asks; answers with what was done. */
export async function personByForm(
  app: Runtime,
  actor: Granted<'people.manage'>,
  request: Request,
  { person, requestId }: { person: Person; requestId: string },
  now: Date,
): Promise<{ ok: true; done: Given['do'] } | Extract<FormResult<Given>, { ok: false }>> {
  const form = await readFormAs(request, PersonForm);
  if (!form.ok) return form;
  const given = form.value;
  const { id } = person;
  const result =
    given.do === 'invite'
      ? await inviteAgain(app.db, actor, { id, requestId }, shopOf(app.settings), now)
      : await changePerson(
          app.db,
          actor,
          { id, version: given.version, change: changeOf(given), requestId },
          now,
        );
  if (!result.ok) return refusedForm(form.typed, result, REFUSALS[result.kind].status);
  app.worker?.nudge();
  return { ok: true, done: given.do };
}
