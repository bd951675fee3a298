/** Tickets as the API shows them. */
import type { Queryable } from '@/db/client';
import type { QueueQuery, TicketRow } from '@/contracts/tickets';
import type { Role } from '@/domain/people';
import { offeredSteps } from '@/domain/tickets/stages';
import { boardLabel } from '../boards/queries';
import { contactOf } from '../customers/queries';
import { csvResponse } from '../http/csv';
import { everyRow, pageOf, readCursor } from '../http/cursor';
import { done, type Outcome } from '../refusal';
import { factsOf } from './policy';
import {
  cautionsOf,
  eventsOf,
  heldBy,
  placeOfTicket,
  queueRows,
  ticketRecord,
  type TicketFull,
} from './queries';

export const boardOf = (t: { boardCode: string | null; boardRevision: string | null }) =>
  t.boardCode !== null && t.boardRevision !== null
    ? boardLabel({ code: t.boardCode, revision: t.boardRevision })
    : null;

export const ticketRow = (t: TicketFull) => ({
  number: t.number,
  stage: t.stage,
  instrument: { id: t.instrumentId, maker: t.maker, model: t.model, serial: t.serial },
  board: boardOf(t),
  customer: { id: t.customerId, name: t.customerName },
  symptoms: t.symptoms,
  incident: t.incident,
  assignedTo:
    t.assignedId !== null && t.assignedName !== null
      ? { id: t.assignedId, name: t.assignedName }
      : null,
  promisedOn: t.promisedOn,
  receivedAt: t.receivedAt.toISOString(),
  stageAt: t.stageAt.toISOString(),
  unseen: t.unseen,
});

export const cautionList = (ticked: Awaited<ReturnType<typeof cautionsOf>>) =>
  ticked.map((c) => ({ ...c, at: c.at.toISOString() }));

export const writtenView = (m: {
  id: number;
  side: 'customer' | 'shop';
  author: string;
  body: string;
  at: Date;
}) => ({ id: m.id, side: m.side, author: m.author, body: m.body, at: m.at.toISOString() });

export async function ticketPage(
  db: Queryable,
  query: QueueQuery,
  me: number,
): Promise<Outcome<{ json: { items: TicketRow[]; next: string | null } }>> {
  const { sort, limit } = query;
  const after = readCursor(sort, query.cursor, heldBy(sort));
  if (!after.ok) return after;
  const rows = await queueRows(db, query, me, { limit: limit + 1, after: after.value });
  const { items, next } = pageOf(rows, limit, sort, (t) => placeOfTicket(sort, t));
  return done({ json: { items: items.map(ticketRow), next } });
}

export async function ticketDetail(db: Queryable, ticket: TicketFull, role: Role) {
  const [record, contact, events, cautions, facts] = await Promise.all([
    ticketRecord(db, ticket.id),
    contactOf(db, ticket.customerId),
    eventsOf(db, ticket.id),
    cautionsOf(db, ticket.id),
    factsOf(db, ticket),
  ]);
  return {
    ...ticketRow(ticket),
    version: ticket.version,
    symptomText: record.symptomText,
    accessories: record.accessories,
    accessoryText: record.accessoryText,
    condition: record.condition,
    estimate:
      record.estimateMinor !== null && record.estimateCurrency !== null
        ? {
            total: { amount: record.estimateMinor, currency: record.estimateCurrency },
            work: record.estimateFor ?? '',
          }
        : null,
    exception: record.exceptionReason,
    contact,
    cautions: cautionList(cautions),
    steps: offeredSteps(facts, role),
    events: events.map((e) => ({
      at: e.at.toISOString(),
      who: e.actorName,
      kind: e.kind,
      from: e.fromStage,
      to: e.toStage,
      note: e.note,
    })),
  };
}

/** The queue as a file. */
export const queueCsv = (db: Queryable, request: Request, query: QueueQuery, me: number) =>
  csvResponse(
    request,
    'tickets',
    [
      { name: 'ticket', value: (t) => t.number },
      { name: 'stage', value: (t) => t.stage },
      { name: 'maker', value: (t) => t.maker },
      { name: 'model', value: (t) => t.model },
      { name: 'serial', value: (t) => t.serial },
      { name: 'board', value: (t) => boardOf(t) },
      { name: 'customer', value: (t) => t.customerName },
      { name: 'symptoms', value: (t) => t.symptoms.join('; ') },
      { name: 'incident', value: (t) => t.incident },
      { name: 'bench', value: (t) => t.assignedName },
      { name: 'received', value: (t) => t.receivedAt },
      { name: 'promised', value: (t) => t.promisedOn },
    ],
    everyRow(
      (limit, after) => queueRows(db, query, me, { limit, after }),
      (t) => placeOfTicket(query.sort, t),
    ),
  );
