import { sql } from 'drizzle-orm';
import type { Database } from './client';

/**
 * Drops every table of the database. `last` go in one statement after all others, so that what they say holds until
 * everything else is gone; interrupted anywhere, it can be done again.
 */
export async function emptyDatabase(
  db: Database,
  last: readonly string[] = ['revisions', '__drizzle_migrations'],
): Promise<void> {
  const [rows] = (await db.execute(
    sql`SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE() AND table_type = 'BASE TABLE'`,
  )) as unknown as [{ name: string }[]];
  const names = rows.map(({ name }) => name);
  const drop = async (some: readonly string[]) => {
    if (some.length === 0) return;
    const list = sql.join(
      some.map((name) => sql.identifier(name)),
      sql`, `,
    );
    // The setting belongs to one connection: a transaction holds on to it.
    await db.transaction(async (tx) => {
      await tx.execute(sql`SET SESSION foreign_key_checks = 0`);
      try {
        await tx.execute(sql`DROP TABLE ${list}`);
      } finally {
        await tx.execute(sql`SET SESSION foreign_key_checks = 1`);
      }
    });
  };
  await drop(names.filter((name) => !last.includes(name)));
  await drop(names.filter((name) => last.includes(name)));
}
