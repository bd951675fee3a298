/** Putting right what an intake wrote down: each correction is an event on the ticket that says what changed. */
import { and, eq } from 'drizzle-orm';
import type { Correction } from '@/contracts/corrections';
import { inTransaction, isDuplicate, type Database, type Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import { customers } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import {
  changeWords,
  INTAKE_LABELS,
  intakeChanges,
  type IntakeChange,
  type IntakeRecord,
} from '@/domain/tickets/intake-fields';
import { isClosed } from '@/domain/tickets/stages';
import { record } from '../audit/commands';
import { grant, type Granted } from '../auth/actor';
import { TakenMeanwhile } from '../instruments/commands';
import { keepable } from '../intake/commands';
import { absent, done, refuse, refuseField, type Outcome, type Refusal } from '../refusal';
import { leaveEvent } from '../tickets/commands';
import type { Shop } from '../tickets/types';
import { dropUnused, instrumentMeant } from './instrument';
import { writtenDown, type WrittenDown } from './queries';

type Desk = Granted<'ticket.intake'>;
export type Asked = { number: string; version: number; correction: Correction; requestId: string };

/** The record as it is to be. */
function corrected(before: IntakeRecord, input: Correction): IntakeRecord {
  const { customer: { version: _version, ...customer } = {}, instrument = {}, ...rest } = input;
  const { changedHands: _hands, promisedOn, ...said } = rest;
  const given = Object.fromEntries(
    Object.entries({ ...customer, ...instrument, ...said })
      .filter(([, value]) => value !== undefined)
      .map(([name, value]) => [name, value ?? '']),
  );
  return {
    ...before,
    ...given,
    ...(promisedOn === undefined ? {} : { promisedOn: promisedOn ?? '' }),
  };
}

/** Why this may not be corrected so, before anything is looked up. */
function refusal(
  actor: Desk,
  { ticket, customer, record: before }: WrittenDown,
  after: IntakeRecord,
  { version, correction }: Asked,
  shop: Shop,
  now: Date,
): Refusal | null {
  if (isClosed(ticket.stage) && !grant(actor, 'ticket.amend'))
    return refuse('not-allowed', 'The ticket is closed: a senior or the owner corrects it.');
  const { customer: of } = correction;
  if (ticket.version !== version || (of && of.version !== customer.version))
    return refuse(
      'stale',
      'Somebody changed the ticket or its customer meanwhile: look at what stands there now, then save again.',
      { more: { yours: version, current: ticket.version, customer: customer.version } },
    );
  if (after.symptoms.length === 0 && after.symptomText === '')
    return refuseField('symptoms', 'No symptom was given: tick one or describe it.');
  const { promisedOn } = after;
  const moved = promisedOn !== '' && promisedOn !== before.promisedOn;
  return moved && !keepable(promisedOn, shop.timeZone, now)
    ? refuseField('promisedOn', 'Promise a day between today and a year from now.')
    : null;
}

/** The customer's own data, and the name of the account that they sign in with. */
async function writeCustomer(tx: Queryable, { customer }: WrittenDown, after: IntakeRecord) {
  const { name, email, phone, address } = after;
  const [changed] = await tx
    .update(customers)
    .set({
      name,
      email: email || null,
      phone: phone || null,
      address: address || null,
      version: customer.version + 1,
    })
    .where(and(eq(customers.id, customer.id), eq(customers.version, customer.version)));
  if (changed.affectedRows !== 1) throw new TakenMeanwhile();
  await tx.update(users).set({ name }).where(eq(users.customerId, customer.id));
}

const OF_CUSTOMER: readonly string[] = ['name', 'email', 'phone', 'address'];
const OF_INSTRUMENT: readonly string[] = ['maker', 'model', 'serial'];

/** For the audit log: what changed, by the names on the page. */
const audited = (changes: readonly IntakeChange[]) =>
  Object.fromEntries(changes.map(({ field, from, to }) => [INTAKE_LABELS[field], { from, to }]));

async function correctOnce(
  tx: Queryable,
  actor: Desk,
  asked: Asked,
  shop: Shop,
  now: Date,
): Promise<Outcome<{ version: number }>> {
  const { number, version, correction, requestId } = asked;
  const before = await writtenDown(tx, number);
  if (!before) return absent('ticket');
  const { ticket } = before;
  const wanted = corrected(before.record, correction);
  const refused = refusal(actor, before, wanted, asked, shop, now);
  if (refused) return refused;
  const moves = intakeChanges(before.record, wanted).some(({ field }) =>
    OF_INSTRUMENT.includes(field),
  );
  const meant = moves
    ? await instrumentMeant(tx, before, wanted, correction.changedHands, now)
    : null;
  if (meant && !meant.ok) return meant;
  // A label that the shop knows is written as the shop writes it.
  const after = { ...wanted, ...meant?.value.label };
  const changes = intakeChanges(before.record, after);
  if (changes.length === 0) return done({ version });
  const [changed] = await tx
    .update(tickets)
    .set({
      symptoms: [...after.symptoms],
      symptomText: after.symptomText,
      incident: after.incident,
      accessories: [...after.accessories],
      accessoryText: after.accessoryText,
      condition: after.condition,
      promisedOn: after.promisedOn || null,
      ...(meant ? { instrumentId: meant.value.id, boardId: meant.value.boardId } : {}),
      version: version + 1,
    })
    .where(and(eq(tickets.id, ticket.id), eq(tickets.version, version)));
  if (changed.affectedRows !== 1) throw new TakenMeanwhile();
  if (changes.some(({ field }) => OF_CUSTOMER.includes(field)))
    await writeCustomer(tx, before, after);
  if (meant) await dropUnused(tx, before.instrument.id);
  const note = changeWords(changes) + (meant?.value.hands ?? '');
  await leaveEvent(tx, ticket.id, actor, { kind: 'corrected', note, open: false }, now);
  const object = `ticket:${number}`;
  const detail = audited(changes);
  await record(tx, { actor, action: 'ticket.corrected', object, detail, requestId }, now);
  return done({ version: version + 1 });
}

/** Corrects a ticket from the version that was seen: all of it, or nothing with the reason. */
export async function correctIntake(
  db: Database,
  actor: Desk,
  asked: Asked,
  shop: Shop,
  now: Date,
): Promise<Outcome<{ version: number }>> {
  for (let tries = 1; ; tries++) {
    try {
      return await inTransaction(db, (tx) => correctOnce(tx, actor, asked, shop, now));
    } catch (error) {
      // Somebody wrote between the look and the write: the next try sees what they wrote.
      const again = error instanceof TakenMeanwhile || isDuplicate(error);
      if (!again || tries === 3) throw error;
    }
  }
}
