/** The demo shop as a whole. Written once; a writing that was interrupted is begun anew from empty tables. */
import { and, count, eq, isNull, lt } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { revisions } from '@/db/schema/faults';
import { outbox } from '@/db/schema/outbox';
import { users } from '@/db/schema/people';
import { tickets } from '@/db/schema/tickets';
import type { Runtime } from '../runtime';
import { shopOf } from '../shop';
import { writeBoard } from './boards';
import { chanceFrom } from './chance';
import { demoBoards, demoCustomers, demoScenarios } from './content';
import { seedFaults } from './faults';
import { seedPeople } from './people';
import { seedPhotos } from './photos';
import type { DemoShop } from './bench';
import { writeTickets } from './tickets';

const MARK = 'demo';
type State = 'empty' | 'begun' | 'done' | 'real';

/** What the database holds: nothing, half a demo shop, a whole one, or a shop's real data. */
export async function demoState(db: Database): Promise<State> {
  const [mark] = await db.select().from(revisions).where(eq(revisions.name, MARK));
  if (mark) return mark.value === 1 ? 'done' : 'begun';
  const [held] = await db.select({ n: count() }).from(tickets);
  const [people] = await db.select({ n: count() }).from(users);
  return (held?.n ?? 0) + (people?.n ?? 0) > 0 ? 'real' : 'empty';
}

async function personByEmail(db: Database, ids: Map<string, number>, email: string) {
  const [row] = await db
    .select()
    .from(users)
    .where(eq(users.id, ids.get(email) ?? 0));
  if (!row || row.role === 'customer') throw new Error(`No demo account ${email}.`);
  return { id: row.id, name: row.name, email: row.email, role: row.role };
}

/** Writes the demo shop into empty tables. */
export async function writeDemoShop(
  app: Pick<Runtime, 'db' | 'settings' | 'store' | 'log'>,
  now: Date,
  say: (what: string) => void,
): Promise<void> {
  const { db, settings } = app;
  await db.insert(revisions).values({ name: MARK, value: 0 });
  say('people');
  const ids = await seedPeople(db, now);
  const [counter, tech, senior] = await Promise.all(
    ['counter', 'tech', 'senior'].map((who) =>
      personByEmail(db, ids, `${who}@meterwright.example`),
    ),
  );
  if (!counter || !tech || !senior) throw new Error('The demo staff is not whole.');
  const others = ['odile.marrant', 'tamsin.quill'];
  const techs = [
    tech,
    tech,
    ...(await Promise.all(
      others.map((who) => personByEmail(db, ids, `${who}@meterwright.example`)),
    )),
  ];
  say('boards');
  const boards = demoBoards();
  const boardIds = new Map<string, number>();
  for (const board of boards) boardIds.set(board.code, await writeBoard(db, board, now));
  say('tickets');
  const demo: DemoShop = {
    db,
    shop: shopOf(settings),
    chance: chanceFrom(2612),
    boards,
    scenarios: demoScenarios(),
    customers: demoCustomers(),
    staff: { counter, techs, senior },
  };
  await writeTickets(demo, now);
  say('fault notes');
  await seedFaults(db, { userIdsByEmail: ids, boardIdByCode: boardIds, now });
  say('board photos');
  await seedPhotos(app, { uploader: tech, boards, boardIds }, now);
  // Letters of the past were sent long ago; only the last two days' reach the demo inbox.
  const past = new Date(now.getTime() - 2 * 86_400_000);
  await db
    .update(outbox)
    .set({ doneAt: now, payload: '' })
    .where(and(isNull(outbox.doneAt), lt(outbox.createdAt, past)));
  await db.update(revisions).set({ value: 1 }).where(eq(revisions.name, MARK));
}
