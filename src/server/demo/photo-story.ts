/** Which demo tickets have photos, and what was photographed: the harm before the repair, the new parts after it. */
import { and, asc, eq, inArray } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { ticketEvents, tickets } from '@/db/schema/tickets';
import type { PhotoPhase } from '@/domain/photos/files';
import type { Wear } from './board-drawing/bodies/brush';
import { closeTogether } from './board-drawing/photograph';
import { wearOf } from './board-drawing/wear';
import type { DemoBoard, DemoScenario } from './content';

/** One picture of a ticket's board. */
export type Picture = {
  phase: PhotoPhase;
  /** The parts it is close up on; none when it shows the whole board. */
  close: string[];
  caption: string;
  shared: boolean;
  at: Date;
};

export type Story = {
  number: string;
  board: DemoBoard;
  /** What failed, and how it looks. */
  wear: ReadonlyMap<string, Wear>;
  pictures: Picture[];
};

const MINUTE = 60_000;
/** Parts this near to each other, mm, are in one close-up. */
const NEAR = 30;
/** Close-ups are for what can be seen; these faults leave a mark. */
const SEEN = [
  'ptc-mov',
  'mov-short',
  'fuse-ma',
  'cx-mov',
  'ptc-open',
  'shunt-ma',
  'it-fuse',
  'ps-fuse',
  'clamp-22',
  'cx-ptc',
  'contact-ohms',
  'ps-pass',
  'cx-coil',
];

type Row = { id: number; number: string; symptomText: string; begun: Date; checked: Date | null };

/** The tickets that came to the bench, oldest first, with when they were opened and when the repair was checked. */
async function benchTickets(db: Queryable): Promise<Row[]> {
  const rows = await db
    .select({
      id: tickets.id,
      number: tickets.number,
      symptomText: tickets.symptomText,
      step: ticketEvents.step,
      at: ticketEvents.at,
    })
    .from(ticketEvents)
    .innerJoin(tickets, eq(tickets.id, ticketEvents.ticketId))
    .where(
      and(
        eq(ticketEvents.kind, 'step'),
        inArray(ticketEvents.step, ['begin', 'begin-release-check']),
      ),
    )
    .orderBy(asc(tickets.id), asc(ticketEvents.id));
  const found = new Map<number, Row>();
  for (const { id, number, symptomText, step, at } of rows) {
    const known = found.get(id);
    if (step === 'begin' && !known)
      found.set(id, { id, number, symptomText, begun: at, checked: null });
    else if (step !== 'begin' && known) known.checked = at;
  }
  return [...found.values()];
}

const later = (from: Date, minutes: number) => new Date(from.getTime() + minutes * MINUTE);

/**
 * What failed, close up, and the same place after the repair; `shared` ones begin with the whole board as it came, and
 * the customer sees their close-ups.
 */
function picturesOf(
  row: Row,
  { board, wear }: Pick<Story, 'board' | 'wear'>,
  shared: boolean,
): Picture[] {
  const groups = closeTogether(board, [...wear.keys()], NEAR);
  const whole: Picture = {
    phase: 'before',
    close: [],
    caption: 'As it came in, nothing touched.',
    shared: false,
    at: later(row.begun, 12),
  };
  const pictures: Picture[] = [
    ...(shared ? [whole] : []),
    ...groups.map((close, i) => ({
      phase: 'before' as const,
      close,
      caption: `${close.join(' and ')} as found.`,
      shared,
      at: later(row.begun, 15 + i),
    })),
  ];
  if (!row.checked) return pictures;
  for (const [i, close] of groups.entries()) {
    const cleaned = close.some((ref) => wear.get(ref) === 'dull');
    pictures.push({
      phase: 'after',
      close,
      caption: `${close.join(' and ')} ${cleaned ? 'cleaned and adjusted' : 'replaced by new parts of the same ratings'}.`,
      shared,
      at: later(row.checked, i - 18),
    });
  }
  return pictures;
}

/**
 * The stories of up to `most` tickets, each of another fault; repaired ones and open ones by turns, as far as there are
 * both. Every other one shares its close-ups with the customer.
 */
export async function photoStories(
  db: Queryable,
  boards: readonly DemoBoard[],
  scenarios: readonly DemoScenario[],
  most: number,
): Promise<Story[]> {
  const rows = await benchTickets(db);
  const stories: Story[] = [];
  for (const key of SEEN) {
    if (stories.length === most) break;
    const scenario = scenarios.find((s) => s.key === key);
    const board = boards.find((b) => b.code === scenario?.board);
    if (!scenario || !board) continue;
    const candidates = rows.filter((row) => row.symptomText === scenario.text);
    const wanted = stories.length % 2 === 0;
    const row = candidates.find((c) => (c.checked !== null) === wanted) ?? candidates[0];
    if (!row) continue;
    const wear = new Map<string, Wear>();
    for (const { ref, ohms } of scenario.faults) {
      const part = board.parts.find((p) => p.ref === ref);
      if (part) wear.set(ref, wearOf(part.kind, ohms));
    }
    const pictures = picturesOf(row, { board, wear }, stories.length % 2 === 0);
    stories.push({ number: row.number, board, wear, pictures });
  }
  return stories;
}
