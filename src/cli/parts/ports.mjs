// Ports on the loopback address, kept from one run to the next.
import { createServer } from 'node:net';
import { readJson, writeWhole } from './files.mjs';

export const loopback = '127.0.0.1';

/** The port if it can be listened on now, else undefined. 0 asks for any free one. */
export function tryPort(port) {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', () => resolve(undefined));
    server.listen({ port, host: loopback, exclusive: true }, () => {
      const free = server.address().port;
      server.close(() => resolve(free));
    });
  });
}

/**
 * Ports for the named services, all different. A service keeps the port it had in `ports.json`
 * unless somebody else has taken it since.
 */
export async function keepPorts(folder, names) {
  const file = `${folder}/ports.json`;
  const earlier = readJson(file, {});
  const ports = {};
  for (const name of names) {
    let port = Number.isInteger(earlier[name]) ? await tryPort(earlier[name]) : undefined;
    while (port === undefined || Object.values(ports).includes(port)) port = await tryPort(0);
    ports[name] = port;
  }
  writeWhole(file, JSON.stringify({ ...earlier, ...ports }, null, 2));
  return ports;
}
