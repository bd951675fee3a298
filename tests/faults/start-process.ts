/** `npm start` as a process on a data folder of its own, and what it leaves running. */
import { spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo, type Server } from 'node:net';
import { tmpdir } from 'node:os';
import { setTimeout as pause } from 'node:timers/promises';
import { onTestFinished } from 'vitest';
import { checkout } from '../fixtures/services';

/** A data folder, removed when the test is over together with whatever still runs on it. */
export function dataFolder(): string {
  const folder = mkdtempSync(`${tmpdir()}/start-`);
  onTestFinished(async () => {
    for (const pid of processesOn(folder)) process.kill(pid, 'SIGKILL');
    await pause(200);
    rmSync(folder, { recursive: true, force: true });
  });
  return folder;
}

/** Living processes that were started for this data folder: their environment names it. */
export function processesOn(folder: string): number[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name) && Number(name) !== process.pid)
    .filter((name) => {
      try {
        const words = readFileSync(`/proc/${name}/environ`, 'utf8').split('\0');
        return words.includes(`METERWRIGHT_DATA=${folder}`);
      } catch {
        return false;
      }
    })
    .map(Number);
}

/** Starts the shop; `until` waits for a text in what it prints. */
export function start(folder: string, env: Record<string, string>) {
  const child = spawn(process.execPath, [`${checkout}src/cli/start.mjs`], {
    env: { ...process.env, NODE_ENV: '', METERWRIGHT_DATA: folder, ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let printed = '';
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (piece: Buffer) => (printed += piece.toString()));
  const exit = new Promise<number | string>((resolve) =>
    child.once('close', (code, signal) => resolve(code ?? signal ?? '')),
  );
  return {
    exit,
    kill: (signal: NodeJS.Signals) => child.kill(signal),
    printed: () => printed,
    async until(text: string) {
      while (!printed.includes(text)) {
        if (child.exitCode !== null) throw new Error(`It ended without "${text}":\n${printed}`);
        await pause(50);
      }
    },
  };
}

/** A listener on a free port of the loopback address. */
export async function occupyPort(): Promise<{ port: number; free: () => Promise<void> }> {
  const server: Server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return { port, free: () => new Promise((resolve) => server.close(() => resolve())) };
}
