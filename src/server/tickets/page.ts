/** Everything the ticket page shows, read at once. */
import type { Role } from '@/domain/people';
import { offeredSteps } from '@/domain/tickets/stages';
import { judged } from '../bench/judged';
import { sheetOf } from '../bench/queries';
import { boardNetwork, labelsOf } from '../boards/queries';
import { contactOf } from '../customers/queries';
import { proposeNotes } from '../faults/queries';
import { photosOfTicket } from '../photos/queries';
import type { Runtime } from '../runtime';
import { factsOf } from './policy';
import {
  benchPeople,
  cautionsOf,
  eventsOf,
  messagesOf,
  notesOf,
  ticketByNumber,
  ticketRecord,
  type TicketFull,
} from './queries';
import { boardOf } from './views';

/** The bench: network, readings of both phases and what they say. */
async function benchOf({ db }: Runtime, ticket: TicketFull) {
  const [file, readings, labels] = await Promise.all([
    ticket.boardId === null ? null : boardNetwork(db, ticket.boardId),
    sheetOf(db, ticket.id),
    ticket.boardId === null ? [] : labelsOf(db, ticket.boardId),
  ]);
  const positions = file?.positions ?? [];
  const parts = file?.parts ?? [];
  const judge = (phase: 'as-found' | 'after-repair') => {
    const sheet = readings.filter((r) => r.phase === phase);
    return judged({ positions, parts }, sheet, ticket.incident);
  };
  const repaired = readings.some((r) => r.phase === 'after-repair');
  return {
    positions,
    parts,
    nets: file?.nets ?? [],
    readings,
    suspects: { asFound: judge('as-found'), afterRepair: repaired ? judge('after-repair') : null },
    otherLabels: labels.filter((l) => l.id !== ticket.modelId).map((l) => `${l.maker} ${l.name}`),
  };
}

/** The published notes that fit what is known so far. */
function proposalsOf(app: Runtime, ticket: TicketFull, bench: Awaited<ReturnType<typeof benchOf>>) {
  const { diagnosis, alone } = bench.suspects.asFound;
  const kindOf = new Map(bench.parts.map((p) => [p.ref, p.kind]));
  const ranked = (diagnosis?.hypotheses ?? []).slice(0, 3).flatMap((h) => h.faults);
  const suspects = [
    ...ranked.flatMap(({ ref, mode }) => {
      const kind = kindOf.get(ref);
      return kind ? [{ ref, kind, mode }] : [];
    }),
    ...alone.flatMap((v) =>
      v.verdict === 'suspect' && v.mode ? [{ ref: v.ref, kind: v.kind, mode: v.mode }] : [],
    ),
  ];
  const { boardId, symptoms, incident } = ticket;
  return proposeNotes(app, { boardId, symptoms, incident, suspects }, new Date());
}

/** The whole ticket for its page, or null when there is none of that number. */
export async function wholeTicket(app: Runtime, number: string, role: Role) {
  const { db } = app;
  const ticket = await ticketByNumber(db, number);
  if (!ticket) return null;
  const [record, contact, events, cautions, messages, notes, people, facts, photos, bench] =
    await Promise.all([
      ticketRecord(db, ticket.id),
      contactOf(db, ticket.customerId),
      eventsOf(db, ticket.id),
      cautionsOf(db, ticket.id),
      messagesOf(db, ticket.id),
      notesOf(db, ticket.id),
      benchPeople(db),
      factsOf(db, ticket),
      photosOfTicket(db, ticket.id),
      benchOf(app, ticket),
    ]);
  return {
    ticket,
    board: boardOf(ticket),
    record,
    contact,
    events,
    cautions,
    messages,
    notes,
    people,
    photos,
    steps: offeredSteps(facts, role),
    proposals: await proposalsOf(app, ticket, bench),
    ...bench,
  };
}
