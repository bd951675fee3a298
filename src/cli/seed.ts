/**
 * `tsx src/cli/seed.ts`: fills an empty database with the demo shop. A shop that is there, the demo's or a real one,
 * stays as it is; a writing that was cut off is taken away and begun anew.
 */
import pino from 'pino';
import { openDatabase } from '@/db/client';
import { emptyDatabase } from '@/db/empty';
import { migrateDatabase } from '@/db/migrate';
import { forgetPhotos } from '@/server/demo/forget';
import { demoState, writeDemoShop } from '@/server/demo/shop';
import { readSettings } from '@/server/settings';
import { openStore } from '@/server/storage/store';

const say = (what: string) => console.log(what);
const settings = readSettings(process.env);
await migrateDatabase(settings.databaseUrl);
const { db, pool } = openDatabase(settings.databaseUrl, settings.databasePool);
try {
  const state = await demoState(db);
  if (state === 'begun' || state === 'empty') {
    const log = pino({ level: settings.logLevel, base: { app: 'meterwright' } });
    const app = { db, settings, store: await openStore(settings.store), log };
    if (state === 'begun') {
      say('again');
      await forgetPhotos(app);
      await emptyDatabase(db);
      await migrateDatabase(settings.databaseUrl);
    }
    await writeDemoShop(app, new Date(), say);
  }
  say(state === 'real' ? 'real' : 'done');
} finally {
  await pool.end();
}
