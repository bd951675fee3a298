/** A server that runs until it is told to close. */
export interface Running {
  close(): Promise<void>;
}

/**
 * Starts a server from the command line: prints one `ready ...` line, closes it on SIGTERM or
 * SIGINT and leaves with 0. A refused start prints why and leaves with 2.
 */
export async function runUntilStopped<Server extends Running>(
  start: () => Promise<Server>,
  describe: (server: Server) => string,
): Promise<void> {
  let server: Server;
  try {
    server = await start();
  } catch (error) {
    console.error(error instanceof Error ? error.message : String(error));
    process.exit(2);
  }
  let closing = false;
  const stop = () => {
    if (closing) return;
    closing = true;
    server.close().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error(error);
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
  console.log(`ready ${describe(server)}`);
}
