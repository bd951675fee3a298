/** Writing what the shop knows of an instrument that is brought in: its label, its number, whose it is. */
import { and, eq, notInArray, sql } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { customers, instruments, models } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import { CLOSED_STAGES } from '@/domain/tickets/stages';
import { refuse, type Refusal } from '../refusal';

export type Label = { maker: string; model: string; serial: string };
export type KnownInstrument = NonNullable<Awaited<ReturnType<typeof knownInstrument>>>;

/** The instrument of this label and number, whose it was last, and the ticket that is open on it. */
export async function knownInstrument(tx: Queryable, { maker, model, serial }: Label) {
  // Read without a lock: locking a row that is not there yet closes the gap to every other intake.
  const [known] = await tx
    .select({
      id: instruments.id,
      version: instruments.version,
      customerId: instruments.customerId,
      customer: customers.name,
    })
    .from(instruments)
    .innerJoin(models, eq(models.id, instruments.modelId))
    .innerJoin(customers, eq(customers.id, instruments.customerId))
    .where(and(eq(models.maker, maker), eq(models.name, model), eq(instruments.serial, serial)));
  if (!known) return null;
  const [open] = await tx
    .select({ number: tickets.number })
    .from(tickets)
    .where(and(eq(tickets.instrumentId, known.id), notInArray(tickets.stage, [...CLOSED_STAGES])))
    .limit(1);
  return { ...known, openTicket: open?.number ?? null };
}

/** Why a known instrument cannot be put on a ticket of this customer as things stand; null when it can. */
export function refuseInstrument(
  known: KnownInstrument,
  { maker, model, serial }: Label,
  customerId: number | null,
  changedHands: boolean,
): Refusal | null {
  const what = `${maker} ${model}, serial ${serial},`;
  if (known.openTicket !== null) {
    const message = `${what} is in the shop already: ticket ${known.openTicket} is open. Go on there.`;
    return refuse('conflict', message, {
      errors: [{ path: 'instrument.serial', message }],
      more: { openTicket: known.openTicket },
    });
  }
  if (known.customerId === customerId || changedHands) return null;
  const message = `${what} was last brought by ${known.customer}: choose them as the customer, or say that it changed hands.`;
  return refuse('conflict', message, {
    errors: [{ path: 'changedHands', message }],
    more: { knownCustomer: { id: known.customerId, name: known.customer } },
  });
}

/** Thrown when another intake took the instrument since it was read: the transaction is to be run again. */
export class TakenMeanwhile extends Error {}

/** The known instrument is this customer's. @throws TakenMeanwhile */
export async function keepInstrument(
  tx: Queryable,
  { id, version }: KnownInstrument,
  customerId: number,
): Promise<void> {
  const [changed] = await tx
    .update(instruments)
    .set({ customerId, version: sql`version + 1` })
    .where(and(eq(instruments.id, id), eq(instruments.version, version)));
  if (changed.affectedRows !== 1) throw new TakenMeanwhile();
}

/** The model by its label, made when the shop meets it for the first time (its board is then not known yet). */
export async function modelFor(tx: Queryable, maker: string, name: string, now: Date) {
  const byLabel = and(eq(models.maker, maker), eq(models.name, name));
  const [known] = await tx.select().from(models).where(byLabel);
  if (known) return { id: known.id, boardId: known.boardId, maker: known.maker, name: known.name };
  const [made] = await tx.insert(models).values({ maker, name, createdAt: now }).$returningId();
  if (!made) throw new Error('The model was not written.');
  return { id: made.id, boardId: null, maker, name };
}

/** A new instrument; its key. */
export async function writeInstrument(
  tx: Queryable,
  row: { modelId: number; serial: string; customerId: number },
  now: Date,
): Promise<number> {
  const [made] = await tx
    .insert(instruments)
    .values({ ...row, createdAt: now })
    .$returningId();
  if (!made) throw new Error('The instrument was not written.');
  return made.id;
}
