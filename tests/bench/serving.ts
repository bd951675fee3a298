/** Three pages and one endpoint of the built app against a bare server running the same statements. */
import autocannon from 'autocannon';
import { drizzle } from 'drizzle-orm/mysql2';
import { createPool } from 'mysql2/promise';
import type { Database } from '@/db/client';
import { sessionKeeper } from '@/server/auth/sessions';
import type { CustomerActor } from '@/server/auth/actor';
import { sheetOf } from '@/server/bench/queries';
import { listBoards } from '@/server/boards/queries';
import { ownStatus } from '@/server/status/queries';
import { queue, ticketByNumber } from '@/server/tickets/queries';
import { wholeTicket } from '@/server/tickets/page';
import type { Runtime } from '@/server/runtime';
import { QueueQuery } from '@/contracts/tickets';
import { startApp } from '../fixtures/app';
import { startBareServer, type Statement } from './bare-server';
import { median, row, type BenchRow } from './row';

/** A database that writes down what it is asked. */
function recording(url: string) {
  const statements: Statement[] = [];
  const pool = createPool({ uri: url, timezone: 'Z' });
  const logger = {
    logQuery: (sql: string, params: unknown[]) => void statements.push({ sql, params }),
  };
  const db = drizzle(pool, { casing: 'snake_case', logger }) as unknown as Database;
  return {
    db,
    pool,
    async during(work: () => Promise<unknown>): Promise<Statement[]> {
      statements.length = 0;
      await work();
      return [...statements];
    },
  };
}

/** Milliseconds per request with eight connections, the middle of three rounds. */
async function perRequest(url: string, cookie: string): Promise<number> {
  const result = await autocannon({ url, connections: 8, duration: 4, headers: { cookie } });
  const wrong = result.non2xx + result.errors;
  if (wrong > 0) throw new Error(`${url}: ${wrong} requests were not answered as they should.`);
  return 4000 / result.requests.total;
}

/** Side by side: ours, other, ours, other, so that a busy moment hits both. */
async function sideBySide(name: string, ours: string, other: string, cookie: string, note: string) {
  const mine: number[] = [];
  const theirs: number[] = [];
  for (let round = 0; round < 3; round++) {
    mine.push(await perRequest(ours, cookie));
    theirs.push(await perRequest(other, cookie));
  }
  return row(name, median(mine), median(theirs), note);
}

export async function rows(): Promise<BenchRow[]> {
  const app = await startApp({ seed: true, env: { LOG_LEVEL: 'warn' } });
  const { db, pool, during } = recording(app.databaseUrl);
  try {
    const keeper = sessionKeeper(db, false);
    const [found] = await pool.query(
      "SELECT t.number, t.customer_id AS customer, u.id AS account FROM tickets t JOIN users u ON u.customer_id = t.customer_id WHERE t.stage = 'release-check' LIMIT 1",
    );
    const [staff] = await pool.query("SELECT id FROM users WHERE role = 'technician' LIMIT 1");
    const ticket = (found as { number: string; customer: number; account: number }[])[0];
    const tech = (staff as { id: number }[])[0];
    if (!ticket || !tech) throw new Error('The demo shop has no ticket at the release check.');
    const cookieOf = async (user: number) => (await keeper.open(user)).split(';')[0] ?? '';
    const bench = await cookieOf(tech.id);
    const customer = await cookieOf(ticket.account);
    const { number } = ticket;
    const reads = (cookie: string) => keeper.read(cookie.split('=')[1]);
    const actor: CustomerActor = {
      kind: 'customer',
      role: 'customer',
      id: ticket.account,
      name: '',
      customerId: ticket.customer,
      ticketId: null,
    };
    const pages = {
      '/queue': await during(async () => {
        await reads(bench);
        await queue(db, QueueQuery.parse({}), tech.id, 25, 0);
        await listBoards(db, '', 200, 0);
      }),
      [`/tickets/${number}`]: await during(async () => {
        await reads(bench);
        await wholeTicket({ db } as Runtime, number, 'technician');
      }),
      [`/status/${number}`]: await during(async () => {
        await reads(customer);
        await ownStatus(db, actor, number);
      }),
      [`/api/tickets/${number}/readings`]: await during(async () => {
        await reads(bench);
        const head = await ticketByNumber(db, number);
        await sheetOf(db, head?.id ?? 0);
      }),
    };
    const bare = await startBareServer(app.databaseUrl, pages);
    const measured: BenchRow[] = [];
    for (const [path, statements] of Object.entries(pages)) {
      const cookie = path.startsWith('/status') ? customer : bench;
      const note = `per request; a bare node:http server with mysql2, the same ${statements.length} statements`;
      const name = `serve ${path.replace(number, '{number}')}`;
      measured.push(await sideBySide(name, app.origin + path, bare.origin + path, cookie, note));
    }
    await bare.stop();
    return measured;
  } finally {
    await pool.end();
    await app.stop();
  }
}
