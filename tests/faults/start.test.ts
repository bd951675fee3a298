import { chmodSync, existsSync, readFileSync, writeFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { dataFolder, occupyPort, processesOn, start } from './start-process';

async function freePort(): Promise<string> {
  const { port, free } = await occupyPort();
  await free();
  return String(port);
}

test('a taken port is named, with what to do, and nothing is started', async () => {
  const folder = dataFolder();
  const { port, free } = await occupyPort();
  const run = start(folder, { PORT: String(port) });
  expect(await run.exit).toBe(1);
  await free();
  expect(run.printed()).toContain(`Port ${port} is taken`);
  expect(run.printed()).toContain(`PORT=${port + 1} npm start`);
  expect(processesOn(folder)).toEqual([]);
  expect(existsSync(`${folder}/mariadb`)).toBe(false);
  expect(existsSync(`${folder}/start.lock`)).toBe(false);
});

test('a port that is no number is refused with what is needed', async () => {
  const run = start(dataFolder(), { PORT: 'http' });
  expect(await run.exit).toBe(1);
  expect(run.printed()).toContain('PORT is "http"; a number from 1 to 65535 is needed.');
});

test('a MariaDB that will not start is shown with its last words, and nothing stays', async () => {
  const folder = dataFolder();
  const broken = `${folder}/broken-mariadbd`;
  writeFileSync(broken, '#!/bin/sh\necho "[ERROR] the tablespace is upside down" >&2\nexit 7\n');
  chmodSync(broken, 0o755);
  const run = start(folder, { PORT: await freePort(), METERWRIGHT_MARIADBD: broken });
  expect(await run.exit).toBe(1);
  expect(run.printed()).toContain('MariaDB did not start');
  expect(run.printed()).toContain('the tablespace is upside down');
  expect(processesOn(folder)).toEqual([]);
  expect(existsSync(`${folder}/start.lock`)).toBe(false);
});

test('a start cut off in the first filling is recovered by the next one', async () => {
  const folder = dataFolder();
  const port = await freePort();
  const first = start(folder, { PORT: port, DEMO: '0' });
  await first.until('Tables');
  first.kill('SIGKILL');
  await first.exit;
  const left = processesOn(folder);
  expect(left.length).toBeGreaterThan(2);

  const second = start(folder, { PORT: port, DEMO: '0' });
  await second.until('The shop is open');
  expect(second.printed()).toContain('An earlier run was cut off; ended what it left:');
  const still = processesOn(folder);
  expect(left.filter((pid) => still.includes(pid))).toEqual([]);
  expect((await fetch(`http://127.0.0.1:${port}/`)).status).toBe(200);

  const third = start(folder, { PORT: port, DEMO: '0' });
  expect(await third.exit).toBe(1);
  expect(third.printed()).toContain('Meterwright is already running here');
  expect((await fetch(`http://127.0.0.1:${port}/`)).status).toBe(200);

  const { children } = JSON.parse(readFileSync(`${folder}/children.json`, 'utf8')) as {
    children: { name: string; pid: number }[];
  };
  process.kill(children.find(({ name }) => name === 'app')?.pid ?? 0, 'SIGKILL');
  await second.until('The app is running again.');
  expect((await fetch(`http://127.0.0.1:${port}/`)).status).toBe(200);

  second.kill('SIGTERM');
  expect(await second.exit).toBe(0);
  expect(processesOn(folder)).toEqual([]);
  expect(existsSync(`${folder}/start.lock`)).toBe(false);
});
