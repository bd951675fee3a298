/** What one app process holds open: settings, log, database, sessions, limits, services. Opened on first use. */
import pino, { type Logger } from 'pino';
import type { Pool } from 'mysql2/promise';
import { openDatabase, type Database } from '@/db/client';
import { migrateDatabase } from '@/db/migrate';
import { makeLimits, type Limits } from './auth/limits';
import { sessionKeeper, type SessionKeeper } from './auth/sessions';
import { readSettings, type Settings } from './settings';
import { openStore, type Store } from './storage/store';
import { startWorker, type Worker } from './outbox/worker';

export type Runtime = {
  settings: Settings;
  log: Logger;
  db: Database;
  pool: Pool;
  sessions: SessionKeeper;
  limits: Limits;
  store: Store;
  worker: Worker | null;
};

async function open(): Promise<Runtime> {
  const settings = readSettings(process.env);
  const log = pino({ level: settings.logLevel, base: { app: 'meterwright' } });
  await migrateDatabase(settings.databaseUrl);
  const { db, pool } = openDatabase(settings.databaseUrl, settings.databasePool);
  const store = await openStore(settings.store);
  const runtime: Runtime = {
    settings,
    log,
    db,
    pool,
    sessions: sessionKeeper(db, settings.secureCookies),
    // Counted on connections of its own: a limit may be asked from within a transaction that holds one.
    limits: makeLimits(
      openDatabase(settings.databaseUrl, 2).pool,
      new URL(settings.databaseUrl).pathname.slice(1),
    ),
    store,
    worker: null,
  };
  if (settings.worker) runtime.worker = startWorker(runtime);
  log.info({ origin: settings.origin }, 'ready');
  return runtime;
}

// Kept on globalThis: the development server loads this module again after every edit.
const shelf = globalThis as { meterwright?: Promise<Runtime> };

/** The runtime; a failed opening is forgotten, so that the next request tries again. */
export function runtime(): Promise<Runtime> {
  shelf.meterwright ??= open().catch((error: unknown) => {
    delete shelf.meterwright;
    throw error;
  });
  return shelf.meterwright;
}
