/** What the forms on the ticket page do: steps, cautions, who works on it, messages, notes. */
import * as z from 'zod/v4';
import { prose } from '@/contracts/common';
import { CAUTION_CODES } from '@/domain/tickets/vocabulary';
import { STEPS } from '@/domain/tickets/stages';
import { parseMoney } from '@/domain/money';
import type { Permission } from '@/domain/people';
import { grant, type Actor, type Granted } from '../auth/actor';
import { readFormAs, type Typed } from '../http/form';
import { seeMessages, writeNote, writeToCustomer } from '../messages/commands';
import { REFUSALS, refuse, refuseField, type FieldError, type Outcome } from '../refusal';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';
import { assign, takeStep, tickCaution } from './commands';
import { ticketByNumber, type TicketFull } from './queries';

const version = z.coerce.number().int().positive();
/** The last message that was on the screen. */
const upTo = z.coerce.number().int().positive().optional();
const Form = z.discriminatedUnion('do', [
  z.object({
    do: z.literal('step'),
    version,
    step: z.enum(STEPS),
    note: prose(2000).default(''),
    total: z.string().trim().max(20).default(''),
    work: prose(1000).default(''),
  }),
  z.object({
    do: z.literal('caution'),
    caution: z.enum(CAUTION_CODES),
    ticked: z.enum(['yes', 'no']),
  }),
  z.object({
    do: z.literal('assign'),
    version,
    person: z.union([z.literal('').transform(() => null), z.coerce.number().int().positive()]),
  }),
  z.object({ do: z.literal('message'), body: prose(4000, 1), upTo }),
  z.object({ do: z.literal('seen'), upTo }),
  z.object({ do: z.literal('note'), note: prose(4000, 1) }),
]);
type Asked = z.output<typeof Form>;

export type TicketFormAnswer =
  | { ok: true; anchor: string }
  | { ok: false; did: string; problem: string; errors: FieldError[]; typed: Typed; status: number };

const needed = {
  step: 'ticket.step',
  caution: 'ticket.bench',
  assign: 'ticket.bench',
  message: 'ticket.message',
  seen: 'ticket.message',
  note: 'ticket.message',
} as const satisfies Record<Asked['do'], Permission>;

async function act(
  app: Runtime,
  actor: Actor | null,
  ticket: TicketFull,
  asked: Asked,
  now: Date,
): Promise<Outcome<unknown>> {
  const permitted = grant(actor, needed[asked.do]);
  if (!permitted) return refuse('not-allowed', 'Your role may not do this.');
  const { db } = app;
  const shop = shopOf(app.settings);
  const may = <P extends Permission>() => permitted as unknown as Granted<P>;
  switch (asked.do) {
    case 'step': {
      const { step, note, total, work } = asked;
      let estimate = null;
      if (step === 'send-estimate') {
        const minor = parseMoney(total);
        if (minor === null) return refuseField('total', 'Not a sum: write it like 72.48.');
        if (work === '') return refuseField('work', 'Write what the total covers.');
        estimate = { total: { amount: minor, currency: shop.currency }, work };
      }
      const input = { step, note, estimate };
      return takeStep(db, may<'ticket.step'>(), ticket.number, asked.version, input, shop, now);
    }
    case 'caution':
      return tickCaution(
        db,
        may<'ticket.bench'>(),
        ticket,
        asked.caution,
        asked.ticked === 'yes',
        now,
      );
    case 'assign':
      return assign(db, may<'ticket.bench'>(), ticket, asked.person, asked.version, now);
    case 'message':
      return {
        ok: true,
        value: await writeToCustomer(
          db,
          may<'ticket.message'>(),
          ticket,
          asked.body,
          shop,
          now,
          asked.upTo,
        ),
      };
    case 'seen':
      return {
        ok: true,
        value: await seeMessages(db, may<'ticket.message'>(), ticket.id, asked.upTo, now),
      };
    case 'note':
      return {
        ok: true,
        value: await writeNote(db, may<'ticket.message'>(), ticket.id, asked.note, now),
      };
  }
}

const ANCHORS = {
  step: 'stage',
  caution: 'cautions',
  assign: 'stage',
  message: 'messages',
  seen: 'messages',
  note: 'notes',
} as const satisfies Record<Asked['do'], string>;

/** Handles one form of the ticket page. */
export async function answerTicketForm(
  app: Runtime,
  actor: Actor | null,
  number: string,
  request: Request,
  now: Date,
): Promise<TicketFormAnswer> {
  const form = await readFormAs(request, Form);
  const did = typeof form.typed['do'] === 'string' ? form.typed['do'] : '';
  const { typed } = form;
  if (!form.ok) {
    const first = form.errors[0]?.message ?? form.reason;
    return { ok: false, did, typed, problem: first, errors: form.errors, status: form.status };
  }
  const ticket = await ticketByNumber(app.db, number);
  const done = ticket
    ? await act(app, actor, ticket, form.value, now)
    : refuse('absent', 'There is no such ticket.');
  if (!done.ok) {
    const { status } = REFUSALS[done.kind];
    return { ok: false, did, typed, problem: done.reason, errors: done.errors ?? [], status };
  }
  app.worker?.nudge();
  return { ok: true, anchor: ANCHORS[form.value.do] };
}
