/** What a ticket hands to the note that is written about it. */
import { asc } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { boards } from '@/db/schema/shop';
import type { Ohms } from '@/domain/network/types';
import type { Incident, PartKind } from '@/domain/parts/kinds';
import { formatOhms } from '@/domain/quantities/format';
import type { Symptom } from '@/domain/tickets/vocabulary';
import { sheetOf, suspectsOf } from '../bench/queries';
import { boardNetwork } from '../boards/queries';
import { photosOfTicket } from '../photos/queries';
import { ticketByNumber } from '../tickets/queries';

export type Material = {
  number: string;
  boardId: number | null;
  readings: {
    from: string;
    to: string;
    position: string;
    typed: string;
    expected: string | null;
  }[];
  photos: { id: string; caption: string }[];
  parts: { ref: string; kind: PartKind; value: string }[];
  symptoms: Symptom[];
  incident: Incident;
};

/** Beyond this a usual meter shows OL, Ω: api.md's default over range. */
const OVER_RANGE_OHMS = 60e6;
const LONGEST = 40;

const written = (ohms: Ohms) => (ohms === 'OL' || ohms > OVER_RANGE_OHMS ? 'OL' : formatOhms(ohms));

type SheetRow = Awaited<ReturnType<typeof sheetOf>>[number];

function readingWords(reading: SheetRow, expected: Ohms | undefined) {
  const conditions = [
    reading.position ?? '',
    reading.lifted.length > 0 ? `${reading.lifted.join(', ')} lifted` : '',
    reading.phase === 'after-repair' ? 'after repair' : '',
  ];
  return {
    from: reading.part ?? reading.from ?? '',
    to: reading.part === null ? (reading.to ?? '') : '',
    position: conditions.filter(Boolean).join(', ').slice(0, LONGEST),
    typed: reading.typed,
    expected: expected === undefined ? null : written(expected),
  };
}

/** Readings with what the healthy network would show, photos, parts; null when there is no such ticket. */
export async function ticketMaterial(db: Queryable, number: string): Promise<Material | null> {
  const ticket = await ticketByNumber(db, number);
  if (!ticket) return null;
  const [sheet, found, after, photos, board] = await Promise.all([
    sheetOf(db, ticket.id),
    suspectsOf(db, ticket, 'as-found'),
    suspectsOf(db, ticket, 'after-repair'),
    photosOfTicket(db, ticket.id),
    ticket.boardId === null ? null : boardNetwork(db, ticket.boardId),
  ]);
  const expected = new Map(
    [...found.expected, ...after.expected].map(({ reading, ohms }) => [reading, ohms]),
  );
  return {
    number,
    boardId: ticket.boardId,
    readings: sheet.map((reading) => readingWords(reading, expected.get(reading.id))),
    photos: photos.map(({ id, caption, side, phase }) => ({
      id,
      caption: caption || `${side}, ${phase} repair`,
    })),
    parts: (board?.parts ?? []).map(({ ref, kind, value }) => ({ ref, kind, value })),
    symptoms: ticket.symptoms,
    incident: ticket.incident,
  };
}

/** The boards a note may stand on. */
export async function boardChoices(db: Queryable): Promise<{ id: number; label: string }[]> {
  const rows = await db.select().from(boards).orderBy(asc(boards.code), asc(boards.revision));
  return rows.map(({ id, code, revision, maker }) => ({
    id,
    label: `${code} rev ${revision} (${maker})`,
  }));
}
