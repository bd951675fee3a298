/** `tsx src/cli/migrate.ts`: brings the schema of DATABASE_URL up to date. */
import { migrateDatabase } from '@/db/migrate';

const url = process.env['DATABASE_URL'];
if (!url) {
  console.error('DATABASE_URL is not set: give the MariaDB address.');
  process.exit(1);
}
await migrateDatabase(url);
