/** Taking in an instrument at the counter. */
import { eq, sql } from 'drizzle-orm';
import type { Intake } from '@/contracts/tickets';
import { inTransaction, isDuplicate, type Database, type Queryable } from '@/db/client';
import { ticketNumbers, tickets } from '@/db/schema/tickets';
import { monthOf, numberOf } from '@/domain/tickets/numbers';
import { dayOf } from '@/domain/time/shop-day';
import type { Granted } from '../auth/actor';
import { hashClaimCode, newClaimCode } from '../auth/secrets';
import { knownCustomer, writeCustomer, type NewCustomer } from '../customers/commands';
import {
  keepInstrument,
  knownInstrument,
  modelFor,
  refuseInstrument,
  TakenMeanwhile,
  writeInstrument,
} from '../instruments/commands';
import { receiptMail } from '../mail/letters';
import { promise } from '../outbox/commands';
import { done, refuse, refuseField, type Outcome } from '../refusal';
import { leaveEvent } from '../tickets/commands';
import type { Shop } from '../tickets/types';

/** The next number of the month. The row stays locked until the transaction ends, so none is given twice. */
async function nextNumber(tx: Queryable, now: Date, timeZone: string): Promise<string> {
  const month = monthOf(now, timeZone);
  await tx
    .insert(ticketNumbers)
    .values({ month, last: 1 })
    .onDuplicateKeyUpdate({ set: { last: sql`last + 1` } });
  const [row] = await tx.select().from(ticketNumbers).where(eq(ticketNumbers.month, month));
  if (!row) throw new Error('The number was not written.');
  return numberOf(month, row.last);
}

/** Nobody promises further ahead than this, ms. */
const FURTHEST_PROMISE = 366 * 24 * 3_600_000;

/** A promise lies between today and a year from now, by the shop's calendar. */
export function keepable(promisedOn: string, timeZone: string, now: Date): boolean {
  const last = new Date(now.getTime() + FURTHEST_PROMISE);
  return promisedOn >= dayOf(now, timeZone) && promisedOn <= dayOf(last, timeZone);
}

/** Takes in an instrument: customer, instrument, ticket, first event and the receipt mail in one transaction. */
export async function takeIn(
  db: Database,
  actor: Granted<'ticket.intake'>,
  input: Intake,
  shop: Shop,
  now: Date,
): Promise<Outcome<{ number: string; claimCode: string }>> {
  if (input.symptoms.length === 0 && input.symptomText === '')
    return refuseField('symptoms', 'No symptom was given: tick one or describe it.');
  if (input.promisedOn !== null && !keepable(input.promisedOn, shop.timeZone, now))
    return refuseField('promisedOn', 'Promise a day between today and a year from now.');
  const { customer: _c, instrument: label, changedHands, ...said } = input;
  const claimCode = newClaimCode();
  const attempt = () =>
    inTransaction(db, async (tx): Promise<Outcome<{ number: string; claimCode: string }>> => {
      const chosen = await knownCustomer(tx, input.customer);
      if (!chosen.ok) return chosen;
      const known = await knownInstrument(tx, label);
      const refusal =
        known && refuseInstrument(known, label, chosen.value?.id ?? null, changedHands);
      if (refusal) return refusal;
      // What was given can be taken in: only now is anything written.
      const customer =
        chosen.value ?? (await writeCustomer(tx, input.customer as NewCustomer, now));
      const model = await modelFor(tx, label.maker, label.model, now);
      const row = { modelId: model.id, serial: label.serial, customerId: customer.id };
      if (known) await keepInstrument(tx, known, customer.id);
      const instrumentId = known?.id ?? (await writeInstrument(tx, row, now));
      const note =
        known && known.customerId !== customer.id
          ? `Changed hands: brought by ${customer.name}, before by ${known.customer}.`
          : '';
      const number = await nextNumber(tx, now, shop.timeZone);
      const [made] = await tx
        .insert(tickets)
        .values({
          ...said,
          number,
          instrumentId,
          customerId: customer.id,
          boardId: model.boardId,
          stage: 'received',
          claimHash: hashClaimCode(shop.secret, number, claimCode),
          receivedAt: now,
          stageAt: now,
          createdBy: actor.id,
        })
        .$returningId();
      if (!made) throw new Error('The ticket was not written.');
      const event = { kind: 'step', toStage: 'received', note, open: true } as const;
      await leaveEvent(tx, made.id, actor, event, now);
      if (customer.email)
        await promise(
          tx,
          shop.secret,
          `receipt:${number}:1`,
          {
            kind: 'mail',
            mail: receiptMail(shop, customer, number, claimCode, label),
          },
          now,
        );
      return done({ number, claimCode });
    });
  for (let tries = 1; ; tries++) {
    try {
      return await attempt();
    } catch (error) {
      // Two counters took in the same new model, then the same serial, at once: the second finds the first one's row.
      const taken = error instanceof TakenMeanwhile;
      if (taken && tries === 3)
        return refuse(
          'conflict',
          'The instrument is being taken in by somebody else: see the queue.',
        );
      if ((!taken && !isDuplicate(error)) || tries === 3) throw error;
    }
  }
}
