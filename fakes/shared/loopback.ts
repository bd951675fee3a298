import type { IncomingMessage, Server } from 'node:http';
import type { Server as NetServer } from 'node:net';

const loopbackName = /^(127(\.\d{1,3}){3}|localhost|\[::1\])(:\d{1,5})?$/;

/** Listens on 127.0.0.1 only and returns the port taken. */
export function listen(server: NetServer, port: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      server.off('error', reject);
      const address = server.address();
      if (address === null || typeof address === 'string') reject(new Error('no TCP address'));
      else resolve(address.port);
    });
  });
}

/** Stops taking connections, gives requests under way `graceMs`, then cuts what is left. */
export function stopListening(server: Server, graceMs = 2000): Promise<void> {
  return new Promise((resolve) => {
    const cut = setTimeout(() => server.closeAllConnections(), graceMs);
    server.close(() => {
      clearTimeout(cut);
      resolve();
    });
    server.closeIdleConnections();
  });
}

/** Whether an origin such as `http://localhost:4321` names this machine. */
export function isLoopbackOrigin(origin: string): boolean {
  const [scheme, rest] = origin.split('://');
  return (scheme === 'http' || scheme === 'https') && loopbackName.test(rest ?? '');
}

/**
 * Whether a request was sent by a page that is not ours: its Host is not this machine (a foreign
 * name pointed at 127.0.0.1), or it would change something and comes from another origin.
 */
export function isForeign(request: IncomingMessage): boolean {
  const { host, origin } = request.headers;
  if (host === undefined || !loopbackName.test(host)) return true;
  if (request.method === 'GET' || request.method === 'HEAD') return false;
  return origin !== undefined && origin !== `http://${host}`;
}
