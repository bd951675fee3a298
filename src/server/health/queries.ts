import { sql } from 'drizzle-orm';
import type { Runtime } from '../runtime';

/** Whether the services the app leans on answer. */
export async function checkServices(app: Runtime) {
  const works = (check: Promise<unknown>) =>
    check.then(
      () => true,
      () => false,
    );
  const [database, store] = await Promise.all([
    works(app.db.execute(sql`SELECT 1`)),
    works(app.store.ensureBucket()),
  ]);
  return { ready: database && store, database, store };
}
