/** What happens to a ticket after intake: steps, cautions, assignment, claim codes. */
import { and, count, eq } from 'drizzle-orm';
import { inTransaction, type Database, type Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { customers } from '@/db/schema/shop';
import { ticketCautions, ticketEvents, tickets } from '@/db/schema/tickets';
import { MOST_MINOR, writeMoney } from '@/domain/money';
import { roleMay } from '@/domain/people';
import { decideStep, isClosed, type Stage, type Step } from '@/domain/tickets/stages';
import type { Caution } from '@/domain/tickets/vocabulary';
import type { CustomerActor, Granted } from '../auth/actor';
import { endClaimSessions } from '../auth/end-access';
import { hashClaimCode, newClaimCode } from '../auth/secrets';
import { promise } from '../outbox/commands';
import { absent, done, refuse, refuseField, type Outcome } from '../refusal';
import { receiptMail, stepMail } from '../mail/letters';
import { factsOf, isOwn } from './policy';
import type { TicketFull } from './queries';
import type { Shop, TicketHead } from './types';

type EventRow = typeof ticketEvents.$inferInsert;
export type EventInput = Pick<EventRow, 'kind' | 'open'> &
  Partial<Pick<EventRow, 'step' | 'fromStage' | 'toStage' | 'note'>>;

/** Leaves an event; nobody can edit it afterwards. */
export async function leaveEvent(
  tx: Queryable,
  ticketId: number,
  actor: { id: number; name: string },
  event: EventInput,
  now: Date,
): Promise<void> {
  await tx
    .insert(ticketEvents)
    .values({ ticketId, at: now, actorId: actor.id, actorName: actor.name, ...event });
}

/** What fits on the papers of an instrument that left with an exception. */
const EXCEPTION_LENGTH = 1000;

export type StepRequest = {
  step: Step;
  note: string;
  estimate: { total: { amount: number; currency: string }; work: string } | null;
};

const REFUSED = {
  'not-allowed': 'not-allowed',
  'not-from-here': 'conflict',
  missing: 'conflict',
} as const;

/** Moves a ticket one step: the machine decides, the write is guarded by the version, the customer is told. */
export async function takeStep(
  db: Database,
  actor: Granted<'ticket.step'> | CustomerActor,
  number: string,
  version: number,
  input: StepRequest,
  shop: Shop,
  now: Date,
): Promise<Outcome<{ stage: Stage; version: number }>> {
  return inTransaction(db, async (tx) => {
    const [row] = await tx.select().from(tickets).where(eq(tickets.number, number)).for('update');
    if (!row || (actor.kind === 'customer' && !isOwn(actor, row))) return absent('ticket');
    const { estimate } = input;
    const { amount = 1, currency = shop.currency } = estimate?.total ?? {};
    if (currency !== shop.currency || amount <= 0 || amount > MOST_MINOR)
      return refuseField(
        'estimate.total',
        `The total given is ${writeMoney(amount)} ${currency}: more than ${writeMoney(0)} and at most ${writeMoney(MOST_MINOR)} ${shop.currency} is needed.`,
      );
    const decided = decideStep(await factsOf(tx, row), actor.role, input.step, {
      note: input.note,
      estimate: estimate && { minor: estimate.total.amount, work: estimate.work },
    });
    if (!decided.ok)
      return decided.path
        ? refuseField(decided.path, decided.reason)
        : refuse(REFUSED[decided.why], decided.reason);
    if (row.version !== version)
      return refuse(
        'stale',
        'The ticket was changed meanwhile: look at it again, then repeat the step.',
        {
          more: { yours: version, current: row.version, stage: row.stage },
        },
      );
    if (decided.exception && input.note.length > EXCEPTION_LENGTH)
      return refuseField('note', `Longer than ${EXCEPTION_LENGTH} characters: shorten it.`);
    const bench =
      input.step === 'begin' && row.assignedTo === null && roleMay(actor.role, 'ticket.bench');
    const [changed] = await tx
      .update(tickets)
      .set({
        stage: decided.to,
        stageBefore: decided.to === 'waiting-for-parts' ? row.stage : null,
        stageAt: now,
        version: version + 1,
        ...(isClosed(decided.to) ? { closedAt: now } : {}),
        ...(bench ? { assignedTo: actor.id } : {}),
        ...(decided.exception ? { exceptionReason: input.note, exceptionBy: actor.id } : {}),
        ...(input.step === 'send-estimate' && estimate
          ? {
              estimateMinor: estimate.total.amount,
              estimateCurrency: estimate.total.currency,
              estimateFor: estimate.work,
            }
          : {}),
      })
      .where(and(eq(tickets.id, row.id), eq(tickets.version, version)));
    if (changed.affectedRows !== 1) return refuse('stale', 'The ticket was changed meanwhile.');
    await leaveEvent(
      tx,
      row.id,
      actor,
      {
        kind: 'step',
        step: input.step,
        fromStage: row.stage,
        toStage: decided.to,
        note: input.note,
        open: true,
      },
      now,
    );
    const mail = await stepMail(tx, shop, row.customerId, number, decided.to);
    if (mail)
      await promise(tx, shop.secret, `step:${number}:${version + 1}`, { kind: 'mail', mail }, now);
    return done({ stage: decided.to, version: version + 1 });
  });
}

/** Ticks or unticks a caution; readings can be entered once all are ticked. */
export async function tickCaution(
  db: Database,
  actor: Granted<'ticket.bench'>,
  ticket: TicketHead,
  caution: Caution,
  ticked: boolean,
  now: Date,
): Promise<Outcome<null>> {
  if (isClosed(ticket.stage))
    return refuse('conflict', 'The ticket is closed: nothing can be ticked.');
  return inTransaction(db, async (tx) => {
    const mine = and(eq(ticketCautions.ticketId, ticket.id), eq(ticketCautions.caution, caution));
    const [held] = await tx.select().from(ticketCautions).where(mine).for('update');
    if (!!held === ticked) return done(null);
    if (ticked) {
      await tx
        .insert(ticketCautions)
        .values({ ticketId: ticket.id, caution, at: now, byId: actor.id, byName: actor.name })
        .onDuplicateKeyUpdate({ set: { byName: actor.name } });
    } else await tx.delete(ticketCautions).where(mine);
    await leaveEvent(
      tx,
      ticket.id,
      actor,
      { kind: 'caution', step: caution, note: ticked ? 'ticked' : 'unticked', open: false },
      now,
    );
    return done(null);
  });
}

/** Gives the ticket to somebody at the bench (or to nobody). */
export async function assign(
  db: Database,
  actor: Granted<'ticket.bench'>,
  ticket: TicketHead,
  personId: number | null,
  version: number,
  now: Date,
): Promise<Outcome<{ version: number }>> {
  if (isClosed(ticket.stage))
    return refuse('conflict', 'The ticket is closed: it stays with whoever had it.');
  return inTransaction(db, async (tx) => {
    let name = 'nobody';
    if (personId !== null) {
      const [person] = await tx.select().from(users).where(eq(users.id, personId));
      if (!person || person.disabledAt || !roleMay(person.role, 'ticket.bench'))
        return refuseField('personId', 'Nobody at the bench has that number: choose a technician.');
      name = person.name;
    }
    const [changed] = await tx
      .update(tickets)
      .set({ assignedTo: personId, version: version + 1 })
      .where(and(eq(tickets.id, ticket.id), eq(tickets.version, version)));
    if (changed.affectedRows !== 1)
      return refuse('stale', 'The ticket was changed meanwhile: look at it again.', {
        more: { yours: version, current: ticket.version },
      });
    await leaveEvent(tx, ticket.id, actor, { kind: 'assigned', note: name, open: false }, now);
    return done({ version: version + 1 });
  });
}

/** A new claim code: the old one stops working, and so does what it opened. The receipt is mailed again with it. */
export async function renewClaim(
  db: Database,
  actor: Granted<'ticket.intake'>,
  ticket: TicketFull,
  shop: Shop,
  now: Date,
): Promise<Outcome<{ claimCode: string; mailedTo: string | null }>> {
  const claimCode = newClaimCode();
  const mailedTo = await inTransaction(db, async (tx) => {
    await tx
      .update(tickets)
      .set({ claimHash: hashClaimCode(shop.secret, ticket.number, claimCode) })
      .where(eq(tickets.id, ticket.id));
    await leaveEvent(
      tx,
      ticket.id,
      actor,
      { kind: 'claim', note: 'new claim code', open: false },
      now,
    );
    await endClaimSessions(tx, ticket.id);
    const [customer] = await tx.select().from(customers).where(eq(customers.id, ticket.customerId));
    if (!customer?.email) return null;
    const [codes] = await tx
      .select({ n: count() })
      .from(ticketEvents)
      .where(and(eq(ticketEvents.ticketId, ticket.id), eq(ticketEvents.kind, 'claim')));
    const onceKey = `receipt:${ticket.number}:${1 + (codes?.n ?? 0)}`;
    const mail = receiptMail(shop, customer, ticket.number, claimCode, ticket);
    await promise(tx, shop.secret, onceKey, { kind: 'mail', mail }, now);
    return customer.email;
  });
  return done({ claimCode, mailedTo });
}
