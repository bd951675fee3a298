/** What the forms of a ticket's correction do, and what stands there meanwhile when somebody else was quicker. */
import { BoardForm, CorrectionForm } from '@/contracts/corrections';
import { INTAKE_FIELDS, intakeWords, type IntakeField } from '@/domain/tickets/intake-fields';
import { nameBoard } from '../boards/commands';
import { grant, type Granted } from '../auth/actor';
import { readFormAs, refusedForm, typedText, type RefusedForm, type Typed } from '../http/form';
import { refuse, REFUSALS, type Outcome } from '../refusal';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';
import { correctIntake } from './commands';
import type { WrittenDown } from './queries';

type Desk = Granted<'ticket.intake'>;
type About = { written: WrittenDown; requestId: string };
export type RefusedCorrection = RefusedForm & {
  did: 'correct' | 'board';
  stale: boolean;
  more?: Record<string, unknown> | undefined;
};

async function boardByForm(
  app: Runtime,
  actor: Desk,
  typed: Typed,
  { written, requestId }: About,
  now: Date,
): Promise<Outcome<unknown>> {
  const senior = grant(actor, 'board.edit');
  if (!senior) return refuse('not-allowed', 'A senior or the owner says which board it is.');
  const board = BoardForm.safeParse(typed);
  if (!board.success)
    return refuse('invalid', 'No board was given: choose one.', {
      errors: [{ path: 'board', message: 'No board was given: choose one.' }],
    });
  const input = { modelId: written.model.id, boardId: board.data.board, requestId };
  return nameBoard(app.db, senior, input, now);
}

/** Handles a form of the page. */
export async function answerCorrectionForm(
  app: Runtime,
  actor: Desk,
  request: Request,
  about: About,
  now: Date,
): Promise<{ ok: true } | RefusedCorrection> {
  const form = await readFormAs(request, CorrectionForm);
  const did = typedText(form.typed, 'do') === 'board' ? 'board' : 'correct';
  const answered = async (): Promise<Outcome<unknown> | RefusedForm> => {
    if (did === 'board') return boardByForm(app, actor, form.typed, about, now);
    if (!form.ok) return form;
    const { requestId, written } = about;
    const asked = { ...form.value, number: written.ticket.number, requestId };
    return correctIntake(app.db, actor, asked, shopOf(app.settings), now);
  };
  const answer = await answered();
  if (answer.ok) return { ok: true };
  if (!('kind' in answer)) return { ...answer, did, stale: false };
  const refused = refusedForm(form.typed, answer, REFUSALS[answer.kind].status);
  return { ...refused, did, stale: answer.kind === 'stale', more: answer.more };
}

/** The fields as the form sends them, of what is written down. */
export function typedOfRecord({ ticket, customer, record }: WrittenDown): Typed {
  const { symptoms, accessories, ...texts } = record;
  return {
    ...texts,
    symptoms: [...symptoms],
    accessories: [...accessories],
    version: String(ticket.version),
    customerVersion: String(customer.version),
  };
}

/** Fields that stand otherwise than they were typed, in words: what somebody else may have written meanwhile. */
export function newsOf(
  { record }: WrittenDown,
  typed: Typed,
): Partial<Record<IntakeField, string>> {
  const news: Partial<Record<IntakeField, string>> = {};
  for (const field of INTAKE_FIELDS) {
    const value = record[field];
    const mine = typed[field] ?? (Array.isArray(value) ? [] : '');
    const same = Array.isArray(value)
      ? [...value].sort().join() === [...mine].sort().join()
      : mine === value;
    if (!same) news[field] = `Stands there now: ${intakeWords(record, field) || 'nothing'}`;
  }
  return news;
}
