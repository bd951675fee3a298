/**
 * The other side of the serving rows: a bare node:http server that runs the very statements one of our pages runs,
 * by mysql2, and writes their rows as JSON. No sessions beyond the lookup, no template, no policy.
 */
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { createPool } from 'mysql2/promise';

export type Statement = { sql: string; params: unknown[] };

/** Serves each path's statements; answers its address and how to end it. */
export async function startBareServer(databaseUrl: string, pages: Record<string, Statement[]>) {
  const pool = createPool({ uri: databaseUrl, connectionLimit: 10, timezone: 'Z' });
  const server = createServer((request, response) => {
    const statements = pages[request.url ?? ''] ?? [];
    Promise.all(statements.map(({ sql, params }) => pool.query(sql, params)))
      .then((results) => {
        response.setHeader('content-type', 'application/json');
        response.end(JSON.stringify(results.map(([rows]) => rows)));
      })
      .catch((error: unknown) => {
        response.statusCode = 500;
        response.end(String(error));
      });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    origin: `http://127.0.0.1:${port}`,
    async stop() {
      server.closeAllConnections();
      server.close();
      await pool.end();
    },
  };
}
