import { setTimeout as pause } from 'node:timers/promises';
import { drizzle, type MySql2Database } from 'drizzle-orm/mysql2';
import { createPool, type Pool } from 'mysql2/promise';

export type Database = MySql2Database<Record<string, never>>;
/** A database or an open transaction: reads and writes take either. */
export type Queryable = Pick<
  Database,
  'select' | 'selectDistinct' | 'insert' | 'update' | 'delete' | 'execute' | 'transaction'
>;

/** Opens the pool. Sessions speak UTC and refuse what strict mode refuses. */
export function openDatabase(url: string, connections = 10): { db: Database; pool: Pool } {
  const pool = createPool({
    uri: url,
    connectionLimit: connections,
    timezone: 'Z',
    charset: 'utf8mb4_unicode_ci',
    supportBigNumbers: true,
    connectTimeout: 5000,
  });
  // TIME_ZONE matters for NOW() in raw statements only, but a stray one must not lie.
  pool.pool.on('connection', (connection) => {
    connection.query(
      "SET time_zone = '+00:00', sql_mode = 'STRICT_ALL_TABLES,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION,NO_ZERO_DATE,NO_ZERO_IN_DATE'",
    );
  });
  const db = drizzle(pool, { casing: 'snake_case' }) as unknown as Database;
  return { db, pool };
}

const codeOf = (error: unknown): string | undefined => {
  const cause = (error as { cause?: { code?: string } }).cause;
  return cause?.code ?? (error as { code?: string }).code;
};

/** True when a write met a unique index. */
export const isDuplicate = (error: unknown): boolean => codeOf(error) === 'ER_DUP_ENTRY';

const isLocked = (error: unknown): boolean =>
  ['ER_LOCK_DEADLOCK', 'ER_LOCK_WAIT_TIMEOUT'].includes(codeOf(error) ?? '');

/** Transactions that are open. */
const open = new WeakSet<object>();

/** One try. A deadlock takes the savepoints along, and giving one back then fails: the deadlock is what is told. */
async function attempt<T>(db: Queryable, work: (tx: Queryable) => Promise<T>): Promise<T> {
  let why: unknown;
  try {
    return await db.transaction(async (tx) => {
      open.add(tx);
      return await work(tx as unknown as Queryable).catch((error: unknown) => {
        why = error;
        throw error;
      });
    });
  } catch (error) {
    throw why ?? error;
  }
}

/**
 * Runs a transaction again, a little later each time, when MariaDB chose it as the victim of a deadlock. Inside another
 * transaction it is a part of that one, which then is run again as a whole.
 */
export async function inTransaction<T>(
  db: Queryable,
  work: (tx: Queryable) => Promise<T>,
): Promise<T> {
  for (let tries = 1; ; tries++) {
    try {
      return await attempt(db, work);
    } catch (error) {
      if (open.has(db) || !isLocked(error) || tries === 6) throw error;
      await pause(5 * 2 ** tries);
    }
  }
}
