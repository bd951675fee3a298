/** Which instrument a corrected label and serial number mean, and what becomes of the one that stood there. */
import { and, eq, notExists } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { instruments } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import type { IntakeRecord } from '@/domain/tickets/intake-fields';
import { isClosed } from '@/domain/tickets/stages';
import {
  keepInstrument,
  knownInstrument,
  modelFor,
  refuseInstrument,
  TakenMeanwhile,
  writeInstrument,
} from '../instruments/commands';
import { done, refuse, type Outcome } from '../refusal';
import { hasOtherTickets, leansOnBoard, type WrittenDown } from './queries';

export type Meant = {
  id: number;
  boardId: number | null;
  label: { maker: string; model: string; serial: string };
  /** Said in the event when the instrument was another customer's. */
  hands: string;
};

/** The instrument itself gets the right label: it was known by the wrong one alone. */
async function relabel(
  tx: Queryable,
  { instrument }: WrittenDown,
  to: { modelId: number; serial: string },
): Promise<number> {
  const { id, version } = instrument;
  const [changed] = await tx
    .update(instruments)
    .set({ ...to, version: version + 1 })
    .where(and(eq(instruments.id, id), eq(instruments.version, version)));
  if (changed.affectedRows !== 1) throw new TakenMeanwhile();
  return id;
}

/** Finds the instrument that was meant, or writes it. Refused as an intake of it would be. */
export async function instrumentMeant(
  tx: Queryable,
  before: WrittenDown,
  { maker, model: name, serial }: IntakeRecord,
  changedHands: boolean,
  now: Date,
): Promise<Outcome<Meant>> {
  const { ticket, instrument } = before;
  const label = { maker, model: name, serial };
  const known = await knownInstrument(tx, label);
  const other = known && known.id !== instrument.id ? known : null;
  if (other) {
    // A closed ticket leaves the other one's open ticket alone.
    const found = isClosed(ticket.stage) ? { ...other, openTicket: null } : other;
    const refusal = refuseInstrument(found, label, ticket.customerId, changedHands);
    if (refusal) return refusal;
  }
  const model = await modelFor(tx, maker, name, now);
  const boardId = model.id === before.model.id ? ticket.boardId : model.boardId;
  const left = ticket.boardId !== null && boardId !== ticket.boardId;
  if (left && (await leansOnBoard(tx, ticket.id))) {
    const message = `${model.maker} ${model.name} has another board: strike the readings and take off the pins made on the one it stands under first.`;
    return refuse('conflict', message, { errors: [{ path: 'instrument.model', message }] });
  }
  const to = { modelId: model.id, serial };
  const meant = (id: number, hands = ''): Outcome<Meant> =>
    done({ id, boardId, label: { maker: model.maker, model: model.name, serial }, hands });
  if (other) {
    await keepInstrument(tx, other, ticket.customerId);
    const changed = other.customerId !== ticket.customerId;
    return meant(other.id, changed ? `; it changed hands, before it was ${other.customer}’s` : '');
  }
  const shared = await hasOtherTickets(tx, instrument.id, ticket.id);
  if (!shared) return meant(await relabel(tx, before, to));
  return meant(await writeInstrument(tx, { ...to, customerId: ticket.customerId }, now));
}

/** An instrument that no ticket speaks of was never here. */
export async function dropUnused(tx: Queryable, id: number): Promise<void> {
  const ofIt = tx.select({ id: tickets.id }).from(tickets).where(eq(tickets.instrumentId, id));
  await tx.delete(instruments).where(and(eq(instruments.id, id), notExists(ofIt)));
}
