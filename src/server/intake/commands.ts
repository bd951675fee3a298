/** Taking in an instrument at the counter. */
import { and, eq, sql } from 'drizzle-orm';
import type { Intake } from '@/contracts/tickets';
import { inTransaction, isDuplicate, type Database, type Queryable } from '@/db/client';
import { instruments, models } from '@/db/schema/shop';
import { ticketNumbers, tickets } from '@/db/schema/tickets';
import { monthOf, numberOf } from '@/domain/tickets/numbers';
import { dayOf } from '@/domain/time/shop-day';
import type { Granted } from '../auth/actor';
import { hashClaimCode, newClaimCode } from '../auth/secrets';
import { customerForIntake } from '../customers/commands';
import { receiptMail } from '../mail/letters';
import { promise } from '../outbox/commands';
import { done, refuseField, type Outcome } from '../refusal';
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

/** The model by its label, made when the shop meets it for the first time (its board is then not known yet). */
async function modelFor(tx: Queryable, maker: string, name: string, now: Date) {
  const byLabel = and(eq(models.maker, maker), eq(models.name, name));
  const [known] = await tx.select().from(models).where(byLabel);
  if (known) return { id: known.id, boardId: known.boardId };
  const [made] = await tx.insert(models).values({ maker, name, createdAt: now }).$returningId();
  if (!made) throw new Error('The model was not written.');
  return { id: made.id, boardId: null };
}

async function instrumentFor(
  tx: Queryable,
  modelId: number,
  serial: string,
  customerId: number,
  now: Date,
) {
  const bySerial = and(eq(instruments.modelId, modelId), eq(instruments.serial, serial));
  // Read without a lock: locking a row that is not there yet closes the gap to every other intake.
  const [known] = await tx.select().from(instruments).where(bySerial);
  if (known) {
    if (known.customerId !== customerId)
      await tx
        .update(instruments)
        .set({ customerId, version: sql`version + 1` })
        .where(eq(instruments.id, known.id));
    return known.id;
  }
  const [made] = await tx
    .insert(instruments)
    .values({ modelId, serial, customerId, createdAt: now })
    .$returningId();
  if (!made) throw new Error('The instrument was not written.');
  return made.id;
}

/** Nobody promises further ahead than this, ms. */
const FURTHEST_PROMISE = 366 * 24 * 3_600_000;

/** A promise lies between today and a year from now, by the shop's calendar. */
function keepable(promisedOn: string, timeZone: string, now: Date): boolean {
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
  const claimCode = newClaimCode();
  const attempt = () =>
    inTransaction(db, async (tx): Promise<Outcome<{ number: string; claimCode: string }>> => {
      const customer = await customerForIntake(tx, input.customer, now);
      if (!customer.ok) return customer;
      const model = await modelFor(tx, input.instrument.maker, input.instrument.model, now);
      const instrumentId = await instrumentFor(
        tx,
        model.id,
        input.instrument.serial,
        customer.value.id,
        now,
      );
      const number = await nextNumber(tx, now, shop.timeZone);
      const { customer: _c, instrument: _i, ...said } = input;
      const [made] = await tx
        .insert(tickets)
        .values({
          ...said,
          number,
          instrumentId,
          customerId: customer.value.id,
          boardId: model.boardId,
          stage: 'received',
          claimHash: hashClaimCode(shop.secret, number, claimCode),
          receivedAt: now,
          stageAt: now,
          createdBy: actor.id,
        })
        .$returningId();
      if (!made) throw new Error('The ticket was not written.');
      await leaveEvent(tx, made.id, actor, { kind: 'step', toStage: 'received', open: true }, now);
      if (customer.value.email)
        await promise(
          tx,
          shop.secret,
          `receipt:${number}:1`,
          {
            kind: 'mail',
            mail: receiptMail(shop, customer.value, number, claimCode, input.instrument),
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
      if (!isDuplicate(error) || tries === 3) throw error;
    }
  }
}
