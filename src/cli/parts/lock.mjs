// One run at a time on a data folder. The kernel holds the lock (an abstract socket goes with its
// process, also at kill -9); the file says who holds it and is how a killed run is recognised.
import { createHash, randomBytes } from 'node:crypto';
import { realpathSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { readJson, writeWhole } from './files.mjs';
import { identify, stillLives } from './process-table.mjs';
import { Stop } from './say.mjs';

/**
 * Take the lock of a folder. Returns `{runId, stale, release}`; `stale` is the record of a run that
 * ended without giving its lock back.
 * @throws Stop (with `alreadyRunning`) when another run holds it
 */
export async function takeLock(folder, file, purpose) {
  const path = `${folder}/${file}`;
  const socket = await holdName(`meterwright-${digest(`${realpathSync(folder)}/${file}`)}`);
  const earlier = readJson(path, undefined);
  if (!socket || stillLives(earlier)) {
    socket?.close();
    const stop = new Stop(
      `${purpose} is already running here${earlier ? ` (process ${earlier.pid})` : ''}: ` +
        'use that one, or end it with Ctrl-C in its terminal first.',
    );
    stop.alreadyRunning = true;
    throw stop;
  }
  const runId = randomBytes(12).toString('hex');
  writeWhole(path, JSON.stringify({ ...identify(process.pid), runId }, null, 2));
  return {
    runId,
    stale: earlier,
    release() {
      rmSync(path, { force: true });
      socket.close();
    },
  };
}

const digest = (text) => createHash('sha256').update(text).digest('hex').slice(0, 32);

/** A listening abstract socket of this name, or undefined when somebody has it. */
function holdName(name) {
  return new Promise((resolve, reject) => {
    const server = createServer((caller) => caller.destroy());
    server.once('error', (error) =>
      error.code === 'EADDRINUSE' ? resolve(undefined) : reject(error),
    );
    server.listen(`\0${name}`, () => {
      server.unref();
      resolve(server);
    });
  });
}
