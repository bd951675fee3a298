import { migrate } from 'drizzle-orm/mysql2/migrator';
import { createConnection } from 'mysql2/promise';
import { drizzle } from 'drizzle-orm/mysql2';

/** Brings the schema up to date, one process at a time. @throws when another holds the lock for a minute. */
export async function migrateDatabase(url: string, folder = 'drizzle'): Promise<void> {
  const connection = await createConnection({
    uri: url,
    timezone: 'Z',
    charset: 'utf8mb4_unicode_ci',
  });
  try {
    const [rows] = await connection.query("SELECT GET_LOCK('meterwright-migrate', 60) AS held");
    if ((rows as { held: number }[])[0]?.held !== 1)
      throw new Error(
        'Another process has been migrating for a minute: wait for it, then start again.',
      );
    await migrate(drizzle(connection, { casing: 'snake_case' }), { migrationsFolder: folder });
    await connection.query("SELECT RELEASE_LOCK('meterwright-migrate')");
  } finally {
    await connection.end();
  }
}
